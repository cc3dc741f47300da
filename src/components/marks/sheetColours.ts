import { useEffect, useState } from 'react';

const NAMES = ['paper', 'sheet', 'ink', 'ink-2', 'hair', 'land', 'shoal', 'shelf', 'magenta'] as const;

export type SheetColours = Readonly<Record<(typeof NAMES)[number], string>>;

/** The tokens as the page has them, for a canvas; null until the page is there. Read again for night, day and print. */
export function useSheetColours(): SheetColours | null {
  const [colours, setColours] = useState<SheetColours | null>(null);
  useEffect(() => {
    const read = () => setColours(readColours());
    const media = ['(prefers-color-scheme: dark)', 'print'].map((query) => matchMedia(query));
    const forced = new MutationObserver(read);
    read();
    media.forEach((query) => query.addEventListener('change', read));
    forced.observe(document.documentElement, { attributes: true, attributeFilter: ['data-scheme'] });
    return () => {
      media.forEach((query) => query.removeEventListener('change', read));
      forced.disconnect();
    };
  }, []);
  return colours;
}

function readColours(): SheetColours {
  const style = getComputedStyle(document.documentElement);
  return Object.fromEntries(
    NAMES.map((name) => [name, style.getPropertyValue(`--color-${name}`).trim()]),
  ) as SheetColours;
}

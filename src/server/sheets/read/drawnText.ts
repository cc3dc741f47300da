/** Texts that stand in shapes over a sheet: shown to the analyst, never read as figures. Runs in the gate, on bytes. */
import type { ReadNote } from '#core/statements/workbookReading.ts';

const MOST_SHOWN = 5;
const MOST_LETTERS = 200;

/** The texts of the shapes in one drawing part. */
export function textsOfDrawing(name: string, content: Buffer): string[] {
  if (!/^xl\/drawings\/[^/]+\.xml$/i.test(name)) return [];
  const shapes = content
    .toString('utf8')
    .split(/<(?:xdr:)?sp[ >]/)
    .slice(1);
  return shapes.flatMap((shape) => {
    const words = [...shape.matchAll(/<a:t(?: [^>]*)?>([^<]*)<\/a:t>/g)].map((match) => match[1] ?? '');
    const text = plain(words.join(' '));
    return text === '' ? [] : [text];
  });
}

/** The file names that external links point to, without their folders. */
export function namesOfLinks(name: string, content: Buffer): string[] {
  if (!/^xl\/externalLinks\/_rels\/[^/]+\.rels$/i.test(name)) return [];
  return [...content.toString('utf8').matchAll(/Target\s*=\s*["']([^"']+)["']/g)].map((match) =>
    lastOf(plain(match[1] ?? '')),
  );
}

export function textBoxNote(texts: readonly string[]): ReadNote[] {
  if (texts.length === 0) return [];
  const count = texts.length === 1 ? 'One text box was' : `${texts.length} text boxes were`;
  return [{ code: 'text-boxes', text: `${count} not read: ${quoted(texts)}.`, where: null }];
}

export function quoted(texts: readonly string[]): string {
  const shown = texts.slice(0, MOST_SHOWN).map((text) => `'${text.slice(0, MOST_LETTERS)}'`);
  return texts.length > MOST_SHOWN
    ? `${shown.join(', ')} and ${texts.length - MOST_SHOWN} more`
    : shown.join(', ');
}

const plain = (text: string): string =>
  text
    .replace(/&lt;/g, '<')
    .replace(/&gt;/g, '>')
    .replace(/&quot;/g, '"')
    .replace(/&apos;/g, "'")
    .replace(/&amp;/g, '&')
    .replace(/\s+/g, ' ')
    .trim();

function lastOf(target: string): string {
  const name = target.split(/[\\/]/).at(-1) ?? target;
  try {
    return decodeURIComponent(name);
  } catch (error) {
    if (error instanceof URIError) return name;
    throw error;
  }
}

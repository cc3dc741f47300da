import { useEffect, useRef } from 'react';

/** What a key does on this page; `?` lists them all. */
export interface KeyBinding {
  readonly key: string;
  readonly does: string;
}

export const SHEET_KEYS: readonly KeyBinding[] = [
  { key: '/', does: 'Find a borrower' },
  { key: '?', does: 'List the keys' },
];

export const ROW_KEYS: readonly KeyBinding[] = [
  { key: 'j', does: 'Next row' },
  { key: 'k', does: 'Row before' },
  { key: 'Enter', does: 'Open the row' },
];

/** Keys belong to the page only while nobody types, no dialog is open and no modifier is held. */
export function keyIsFree(event: Pick<KeyboardEvent, 'target' | 'altKey' | 'ctrlKey' | 'metaKey'>): boolean {
  if (event.altKey || event.ctrlKey || event.metaKey) return false;
  const target = event.target as { closest?: (selector: string) => unknown } | null;
  return !target?.closest?.('input, textarea, select, [contenteditable="true"], dialog[open]');
}

/** Listens on the whole page. `act` answers true where it took the key. */
export function useKeys(act: (key: string, event: KeyboardEvent) => boolean): void {
  const latest = useRef(act);
  useEffect(() => {
    latest.current = act;
  });
  useEffect(() => {
    const listen = (event: KeyboardEvent) => {
      if (!event.defaultPrevented && keyIsFree(event) && latest.current(event.key, event))
        event.preventDefault();
    };
    document.addEventListener('keydown', listen);
    return () => document.removeEventListener('keydown', listen);
  }, []);
}

/** The row that j or k leads to; stays inside the list. Starts at the first where none is selected. */
export function nextRow(key: 'j' | 'k', selected: number | null, count: number): number | null {
  if (count === 0) return null;
  if (selected === null) return 0;
  return key === 'j' ? Math.min(selected + 1, count - 1) : Math.max(selected - 1, 0);
}

interface RowKeys {
  readonly count: number;
  readonly selected: number | null;
  readonly onSelect: (row: number) => void;
  readonly onOpen: (row: number) => void;
}

/** j and k move, Enter opens. Enter on a link or a button keeps its own meaning. */
export function useRowKeys({ count, selected, onSelect, onOpen }: RowKeys): void {
  useKeys((key, event) => {
    if (key === 'j' || key === 'k') {
      const row = nextRow(key, selected, count);
      if (row === null) return false;
      onSelect(row);
      return true;
    }
    const onControl = event.target instanceof Element && event.target.closest('a, button, summary');
    if (key !== 'Enter' || selected === null || onControl) return false;
    onOpen(selected);
    return true;
  });
}

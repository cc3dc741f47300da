import { useEffect, useId, useRef, useState } from 'react';
import type { BorrowerRow } from '../../contracts/borrowers.ts';
import type { Page } from '../../contracts/paging.ts';
import { get } from '../ui/api.ts';
import { useKeys } from '../ui/keys.ts';

type FoundBorrower = Pick<BorrowerRow, 'id' | 'name' | 'sectorLabel' | 'deskName'>;

type Search =
  | { readonly kind: 'idle' }
  | { readonly kind: 'found'; readonly rows: readonly FoundBorrower[] }
  | { readonly kind: 'failed'; readonly why: string };

const PAUSE_MS = 180;
const SHOWN = 8;

/** Finds a borrower by its name from anywhere: `/`, some letters, Enter. Without a script it is a plain form. */
export function BorrowerSearch() {
  const [text, setText] = useState('');
  const [search, setSearch] = useState<Search>({ kind: 'idle' });
  const [active, setActive] = useState(0);
  const input = useRef<HTMLInputElement>(null);
  const listId = useId();

  useKeys((key) => {
    if (key !== '/') return false;
    input.current?.focus();
    return true;
  });

  // What was typed before this island woke up counts too.
  useEffect(() => {
    setText(input.current?.value ?? '');
  }, []);

  useEffect(() => {
    const wanted = text.trim();
    if (wanted === '') return;
    const latest = new AbortController();
    const timer = setTimeout(() => {
      void findBorrowers(wanted, latest.signal).then((found) => {
        if (latest.signal.aborted) return;
        setSearch(found);
        setActive(0);
      });
    }, PAUSE_MS);
    return () => {
      clearTimeout(timer);
      latest.abort();
    };
  }, [text]);

  const open = text.trim() !== '' && search.kind !== 'idle';
  const rows = open && search.kind === 'found' ? search.rows : [];
  const close = () => {
    setText('');
    setSearch({ kind: 'idle' });
  };

  const onKeyDown = (event: React.KeyboardEvent) => {
    if (event.key === 'Escape') close();
    if (rows.length === 0) return;
    if (event.key === 'ArrowDown') setActive((active + 1) % rows.length);
    else if (event.key === 'ArrowUp') setActive((active + rows.length - 1) % rows.length);
    else if (event.key === 'Enter') location.assign(addressOf(rows[active] ?? rows[0]!));
    else return;
    event.preventDefault();
  };

  return (
    <form
      className="search"
      role="search"
      action="/borrowers"
      onBlur={(event) => {
        if (!event.currentTarget.contains(event.relatedTarget)) setSearch({ kind: 'idle' });
      }}
    >
      <input
        ref={input}
        className="search-input"
        name="search"
        type="text"
        role="combobox"
        autoComplete="off"
        placeholder="Find a borrower"
        aria-label="Find a borrower"
        aria-expanded={rows.length > 0}
        aria-controls={listId}
        aria-autocomplete="list"
        aria-activedescendant={rows.length > 0 ? `${listId}-${active}` : undefined}
        value={text}
        onChange={(event) => setText(event.target.value)}
        onKeyDown={onKeyDown}
      />
      <kbd className="key" aria-hidden="true">
        /
      </kbd>
      <div
        className="search-results"
        id={listId}
        role="listbox"
        aria-label="Borrowers found"
        hidden={rows.length === 0}
      >
        {rows.map((row, position) => (
          <a
            key={row.id}
            id={`${listId}-${position}`}
            className="search-result"
            role="option"
            tabIndex={-1}
            aria-selected={position === active}
            href={addressOf(row)}
          >
            {row.name}
            <span className="type-second type-fine block">
              {row.sectorLabel}, {row.deskName}
            </span>
          </a>
        ))}
      </div>
      {open && rows.length === 0 && (
        <p className="search-results px-3 py-2" role="status">
          {search.kind === 'failed' ? search.why : `No borrower that you can see is called “${text.trim()}”.`}
        </p>
      )}
    </form>
  );
}

const addressOf = (row: FoundBorrower): string => `/borrowers/${row.id}`;

/** An aborted search is not an answer: the caller looks at its signal first. */
async function findBorrowers(wanted: string, signal: AbortSignal): Promise<Search> {
  const query = new URLSearchParams({ search: wanted, sort: 'name', perPage: String(SHOWN) });
  try {
    const answer = await get<Page<FoundBorrower>>(`/borrowers?${query.toString()}`, signal);
    return answer.ok
      ? { kind: 'found', rows: answer.value.rows }
      : { kind: 'failed', why: answer.problem.detail };
  } catch (cause) {
    if (cause instanceof DOMException && cause.name === 'AbortError') return { kind: 'idle' };
    throw cause;
  }
}

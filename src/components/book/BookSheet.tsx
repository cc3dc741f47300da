import { keepPreviousData, useQuery } from '@tanstack/react-query';
import { useEffect, useState } from 'react';
import type { BookView } from '../../contracts/book.ts';
import { Refusal, getOrThrow } from '../ui/api.ts';
import { ErrorState } from '../ui/ErrorState.tsx';
import { IslandQueries } from '../ui/IslandQueries.tsx';
import { EmptyState, LiveRegion } from '../ui/States.tsx';
import { Panel } from '../ui/Panel.tsx';
import { BookFilters } from './BookFilters.tsx';
import { BookPanels } from './BookPanels.tsx';
import { bookSearch, CHART_WIDTHS, readBookLook, type BookLook } from './bookView.ts';

interface BookSheetProps {
  readonly look: BookLook;
  readonly first: BookView | null;
}

/** Where the results of all tests land, and whether more of them land just inside their limits than one expects. */
export function BookSheet(props: BookSheetProps) {
  return (
    <IslandQueries>
      <Book {...props} />
    </IslandQueries>
  );
}

function Book({ look: firstLook, first }: BookSheetProps) {
  const [look, setLook] = useState(firstLook);
  const part = bookSearch({ ...look, width: CHART_WIDTHS[0] });
  const book = useQuery({
    queryKey: ['book', part],
    queryFn: ({ signal }) => getOrThrow<BookView | null>(`/book${part}`, signal),
    placeholderData: keepPreviousData,
    ...(look.query === firstLook.query && { initialData: first }),
  });
  useEffect(() => {
    const back = () => setLook(readBookLook(new URLSearchParams(location.search)));
    addEventListener('popstate', back);
    return () => removeEventListener('popstate', back);
  }, []);
  const show = (next: BookLook) => {
    history.pushState(null, '', `/book${bookSearch(next)}`);
    setLook(next);
  };
  if (book.error instanceof Refusal)
    return <ErrorState problem={book.error.problem} onRetry={() => void book.refetch()} />;
  if (!book.data)
    return (
      <Panel label="Book">
        <EmptyState title="No night has looked over the book yet">
          The figures of this page are computed every night over all desks. They stand here after the next
          run.
        </EmptyState>
      </Panel>
    );
  return (
    <>
      <BookFilters look={look} book={book.data} onShow={show} />
      <LiveRegion message={book.isFetching ? 'Loading this part of the book' : ''} />
      <BookPanels look={look} book={book.data} />
    </>
  );
}

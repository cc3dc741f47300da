import type { BookView } from '../../contracts/book.ts';
import { FilterSelect, Segments } from '../ui/Filters.tsx';
import { CHART_WIDTHS, type BookLook, type ChartWidth } from './bookView.ts';

interface BookFiltersProps {
  readonly look: BookLook;
  readonly book: Pick<BookView, 'measures' | 'sectors'>;
  readonly onShow: (look: BookLook) => void;
}

/** Which part of the book, and how wide the chart's intervals are. */
export function BookFilters({ look, book, onShow }: BookFiltersProps) {
  const { query, width } = look;
  const measure = book.measures.find(({ code }) => code === query.measure);
  return (
    <div className="filter-line">
      <FilterSelect
        label="Type of covenant"
        value={query.measure ?? ''}
        options={[
          { value: '', label: 'all' },
          ...book.measures.map(({ code, name }) => ({ value: code, label: name })),
          ...(query.measure !== undefined && !measure
            ? [{ value: query.measure, label: query.measure }]
            : []),
        ]}
        onChange={(value) => {
          const chosen = book.measures.find(({ code }) => code === value);
          onShow({ ...look, query: { ...query, measure: chosen?.code } });
        }}
      />
      <FilterSelect
        label="Sector"
        value={query.sector ?? ''}
        options={[
          { value: '', label: 'all' },
          ...book.sectors.map(({ code, label }) => ({ value: code, label })),
        ]}
        onChange={(value) =>
          onShow({ ...look, query: { ...query, sector: value === '' ? undefined : value } })
        }
      />
      <Segments
        label="Width of the chart’s intervals"
        value={width}
        segments={CHART_WIDTHS.toSorted().map((each) => ({ value: each, label: `${each}\u00a0%` }))}
        onChange={(value) => onShow({ ...look, width: value as ChartWidth })}
      />
    </div>
  );
}

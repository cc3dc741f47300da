import { columnVisibilityFeature, metaHelper, rowSortingFeature, tableFeatures } from '@tanstack/react-table';
import type { MethodTopic } from '../../contracts/methodTopics.ts';
import type { EntryPlace } from './Table.tsx';

/** What the sheet needs to know of a column besides its content. */
export interface GridColumnMeta {
  readonly numeric?: boolean;
  readonly entry?: EntryPlace;
  readonly nowrap?: boolean;
  /** Content is a whole NameCell and brings its own <th>. */
  readonly namesRow?: boolean;
  /** Name in the column choice. */
  readonly name?: string;
  /** The head shows nothing and is read as `name`: a column of marks. */
  readonly markOnly?: boolean;
  /** How the figures of the column are computed. */
  readonly method?: MethodTopic;
  /** Stays whatever is chosen. */
  readonly fixed?: boolean;
}

/**
 * The features that every table of the product uses: sorting and the choice of columns. Rows come sorted from the
 * server (pass `manualSorting: true`), so that a page of a long list is right.
 */
export const gridFeatures = tableFeatures({
  rowSortingFeature,
  columnVisibilityFeature,
  columnMeta: metaHelper<GridColumnMeta>(),
});
export type GridFeatures = typeof gridFeatures;

import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import type { ImportView } from '../../contracts/imports.ts';
import type { CellRef } from '../../contracts/reading.ts';
import { Refusal, getOrThrow } from '../ui/api.ts';
import { ErrorState } from '../ui/ErrorState.tsx';
import { Segments } from '../ui/Filters.tsx';
import { IslandQueries } from '../ui/IslandQueries.tsx';
import { Panel } from '../ui/Panel.tsx';
import { LiveRegion } from '../ui/States.tsx';
import { AcceptImport, WithdrawImport } from './AcceptImport.tsx';
import { Checks } from './Checks.tsx';
import { Questions } from './Questions.tsx';
import { SheetGrid } from './SheetGrid.tsx';

interface ImportSheetProps {
  readonly first: ImportView;
  readonly target: CellRef | null;
}

/** What was read, from which cells, what is unclear, what was checked; and the acceptance. */
export function ImportSheet(props: ImportSheetProps) {
  return (
    <IslandQueries>
      <Import {...props} />
    </IslandQueries>
  );
}

function Import({ first, target: firstTarget }: ImportSheetProps) {
  const view = useQuery({
    queryKey: ['import', first.id],
    queryFn: ({ signal }) => getOrThrow<ImportView>(`/imports/${first.id}`, signal),
    initialData: first,
  });
  const [target, setTarget] = useState(firstTarget);
  const [sheetName, setSheetName] = useState(
    firstTarget?.sheet ??
      first.reading.sheets.find((sheet) => sheet.part !== null)?.name ??
      first.reading.sheets[0]?.name ??
      '',
  );
  const { data } = view;
  const { reading } = data;
  const sheet = reading.sheets.find((each) => each.name === sheetName) ?? reading.sheets[0];
  const show = (at: CellRef) => {
    setSheetName(at.sheet);
    setTarget(at);
  };
  const refresh = () => void view.refetch();
  return (
    <>
      <div className="filter-line">
        <Segments
          label="Sheets"
          value={sheet?.name ?? ''}
          segments={reading.sheets.map((each) => ({
            value: each.name,
            label: `${each.name} ${each.grid.length} rows${each.hidden ? ', hidden' : ''}`,
          }))}
          onChange={setSheetName}
        />
        <span className="filter">{unitText(reading.unit)}</span>
        <span className="filter">{reading.currency ?? 'currency not known'}</span>
        {data.basis && <span className="filter">{data.basis} accounts</span>}
      </div>
      {view.error instanceof Refusal && <ErrorState problem={view.error.problem} onRetry={refresh} />}
      <LiveRegion
        message={
          data.state === 'draft' ? `${data.openQuestions} questions open` : `This import is ${data.state}`
        }
      />
      <div className="with-evidence">
        <Panel label={`Sheet ${sheet?.name ?? ''}`}>
          {sheet && (
            <SheetGrid
              sheet={sheet}
              reading={reading}
              target={target?.sheet === sheet.name ? target.cell : null}
            />
          )}
          <p className="type-second mt-2">
            Every accepted figure keeps its file, sheet and cell. No figure counts until it is accepted.
          </p>
        </Panel>
        <div className="stack">
          <Questions view={data} onShow={show} onChanged={refresh} />
          {data.mayEdit && data.state === 'draft' && <AcceptImport view={data} onChanged={refresh} />}
          <Checks view={data} onShow={show} />
          {data.mayEdit && <WithdrawImport view={data} onChanged={refresh} />}
        </div>
      </div>
    </>
  );
}

function unitText(unit: string | null): string {
  if (unit === null) return 'unit not known';
  return (
    { '1': 'Amounts in units', '1000': 'Amounts in thousands', '1000000': 'Amounts in millions' }[unit] ??
    `Amounts in ${unit}`
  );
}

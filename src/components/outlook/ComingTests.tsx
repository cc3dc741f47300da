import type { CovenantView } from '../../contracts/borrowers.ts';
import type { ComingTestView, ProjectionView } from '../../contracts/outlook.ts';
import { dayText } from '../../core/calendar/printDay.ts';
import { spokenTest } from '../../core/covenants/spokenTest.ts';
import { OURS } from '../../core/covenants/wording.ts';
import { limitText, testedText } from '../borrowers/figures.ts';
import { MethodLink } from '../marks/MethodLink.tsx';
import { RuledScale } from '../marks/QualityBar.tsx';
import { Panel } from '../ui/Panel.tsx';
import { Caution, EmptyState } from '../ui/States.tsx';
import { Cell, HeadCell, NameCell, Row, Table, TableBody, TableHead } from '../ui/Table.tsx';
import { NO_FORECAST, wholeShare } from './outlookWords.ts';

interface ComingTestsProps {
  readonly covenants: readonly CovenantView[];
  readonly projections: readonly ProjectionView[];
}

/** The tests of the next four quarters, each with how often the peers' changes lead beyond its level. */
export function ComingTests({ covenants, projections }: ComingTestsProps) {
  return (
    <Panel title="Tests to come" aside={<MethodLink topic="coming-tests" />}>
      {covenants.length === 0 ? (
        <EmptyState title="No covenant result yet">
          Tests to come are projected from the latest result. Import the borrower’s figures, or wait for the
          nightly run.
        </EmptyState>
      ) : (
        <div className="stack">
          {covenants.map((covenant) => (
            <ComingTestsOf
              key={covenant.id}
              covenant={covenant}
              projection={projections.find(({ covenantId }) => covenantId === covenant.id) ?? null}
            />
          ))}
          <Caution>{NO_FORECAST}</Caution>
        </div>
      )}
    </Panel>
  );
}

interface ComingTestsOfProps {
  readonly covenant: CovenantView;
  readonly projection: ProjectionView | null;
}

function ComingTestsOf({ covenant, projection }: ComingTestsOfProps) {
  const latest = spokenTest(covenant.tests);
  const tests = projection?.tests ?? [];
  return (
    <section>
      <h3 className="type-heading">
        {covenant.name}
        {covenant.isOurs && <span className="type-second">, {OURS}</span>}
        {latest && projection?.fromTestDate && (
          <span className="type-second">
            {' '}
            {testedText(covenant, latest)} on {dayText(projection.fromTestDate)}, {latest.outcome}
          </span>
        )}
      </h3>
      {tests.length === 0 ? (
        <p className="type-second">Not projected: {reasonOf(projection)}.</p>
      ) : (
        <Table caption={`${covenant.name}, tests to come`} entries>
          <TableHead>
            <tr role="row">
              <HeadCell>Test</HeadCell>
              <HeadCell>{covenant.isOurs ? 'Past our trigger' : 'Not met'}</HeadCell>
              <HeadCell numeric>Peer changes</HeadCell>
              <HeadCell numeric>By its own tests</HeadCell>
            </tr>
          </TableHead>
          <TableBody>
            {tests.map((test) => (
              <ComingTest key={test.testDate} covenant={covenant} test={test} />
            ))}
          </TableBody>
        </Table>
      )}
    </section>
  );
}

const reasonOf = (projection: ProjectionView | null): string =>
  projection
    ? (projection.reason ?? 'no test within four quarters')
    : 'this result was computed before tests to come were';

function ComingTest({ covenant, test }: { readonly covenant: CovenantView; readonly test: ComingTestView }) {
  return (
    <Row>
      <NameCell
        name={dayText(test.testDate)}
        second={test.kind === 'nothing to project' ? undefined : limitText(covenant, test.level)}
        keepSecond
      />
      {test.kind === 'projected' ? (
        <>
          <Cell entry="figure">
            <span className="inline-flex items-center gap-3">
              <RuledScale score={100 * test.share} />
              <span>
                <span className="type-name">{test.word}</span>, {wholeShare(test.share)}
              </span>
            </span>
          </Cell>
          <Cell numeric entry="extra">
            {test.notMet} of {test.n}
            <span className="type-second type-small block">
              {test.borrowers} borrowers, {test.peers === 'book' ? 'whole book' : test.peers}
            </span>
          </Cell>
          <Cell numeric>{test.check === null ? '–' : wholeShare(test.check)}</Cell>
        </>
      ) : (
        <Cell colSpan={3} entry="extra">
          <span className="type-second">
            {test.kind === 'too few peers' ? 'too few peers' : `nothing to project: ${test.reason}`}
          </span>
        </Cell>
      )}
    </Row>
  );
}

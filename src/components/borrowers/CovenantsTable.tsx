import { dayText } from '../../core/calendar/printDay.ts';
import type { CovenantView } from '../../contracts/borrowers.ts';
import { OURS } from '../../core/covenants/wording.ts';
import { spokenTest } from '../../core/covenants/spokenTest.ts';
import { decimal } from '../../core/money/decimal.ts';
import { formatShare } from '../../core/money/print.ts';
import { FoldedMethodLinks } from '../marks/MethodLink.tsx';
import { HeadroomText, OutcomeText } from '../marks/OutcomeText.tsx';
import { SoundingStrip } from '../marks/SoundingStrip.tsx';
import { Cell, HeadCell, NameCell, Row, Table, TableBody, TableHead } from '../ui/Table.tsx';
import { limitText, testedText } from './figures.ts';

const STRIP_LENGTH = 12;

interface CovenantsTableProps {
  readonly covenants: readonly CovenantView[];
  readonly selected: number | null;
  readonly hrefOf: (covenantId: number) => string;
}

/** Every covenant with its latest test; one of them is shown below with its chart. */
export function CovenantsTable({ covenants, selected, hrefOf }: CovenantsTableProps) {
  return (
    <>
      <Table caption="Covenants, latest test of each" entries>
        <TableHead>
          <tr role="row">
            <HeadCell>Covenant</HeadCell>
            <HeadCell>Limit</HeadCell>
            <HeadCell numeric>Result</HeadCell>
            <HeadCell method="sounding-strip">Last 12 tests</HeadCell>
            <HeadCell numeric method="headroom">
              Earnings may fall
            </HeadCell>
            <HeadCell>What is left</HeadCell>
            <HeadCell>Outcome</HeadCell>
          </tr>
        </TableHead>
        <TableBody>
          {covenants.map((covenant) => {
            const test = covenant.tests.at(-1);
            const tested = spokenTest(covenant.tests);
            return (
              <Row key={covenant.id} current={covenant.id === selected}>
                <NameCell
                  name={covenant.name}
                  href={hrefOf(covenant.id)}
                  current={covenant.id === selected}
                  keepSecond={covenant.isOurs}
                  second={`${covenant.facilityName}, ${covenant.isOurs ? OURS : `clause ${covenant.clause}`}`}
                />
                <Cell nowrap>{limitText(covenant, tested?.level ?? null)}</Cell>
                <Cell numeric nowrap>
                  <span className="type-name">{tested ? testedText(covenant, tested) : '–'}</span>
                </Cell>
                <Cell entry="strip">
                  <SoundingStrip
                    tests={covenant.tests.slice(-STRIP_LENGTH)}
                    size="row"
                    label={covenant.name}
                  />
                </Cell>
                <Cell numeric entry="figure">
                  {tested && (
                    <HeadroomText
                      mayFall={tested.mayFall}
                      outcome={tested.outcome}
                      justPassing={tested.justPassing}
                    />
                  )}
                  {covenant.fallOf === 'tested amount' && (
                    <span className="type-second type-small block">of the tested amount</span>
                  )}
                  <Ahead covenant={covenant} />
                </Cell>
                <Cell>
                  {covenant.whatIsLeft}
                  {tested && tested.outcome === 'cured' && (
                    <span className="type-second type-small block">on the borrower’s own figures</span>
                  )}
                </Cell>
                <Cell entry="extra">
                  {test && (
                    <OutcomeText
                      outcome={test.outcome}
                      justPassing={test.justPassing}
                      reason={test.reason === covenant.whatIsLeft ? null : test.reason}
                    />
                  )}
                  <span className="type-second type-small block">
                    {test && `${dayText(test.testDate)}, ${covenant.checking}`}
                    {tested?.isFirstUnderReset && ', first under a reset'}
                  </span>
                </Cell>
              </Row>
            );
          })}
        </TableBody>
      </Table>
      <FoldedMethodLinks topics={['sounding-strip', 'headroom']} />
    </>
  );
}

/** The tightest level agreed for later, beside today's. */
function Ahead({ covenant }: { readonly covenant: CovenantView }) {
  const tightest = covenant.laterLevels
    .filter(({ mayFall }) => mayFall !== null)
    .toSorted((one, other) => decimal(one.mayFall ?? 0).comparedTo(decimal(other.mayFall ?? 0)))[0];
  const today = covenant.headroom?.mayFall ?? null;
  if (!tightest || tightest.mayFall === null) return null;
  if (today !== null && decimal(tightest.mayFall).gte(decimal(today))) return null;
  return (
    <span className="type-second type-small block">
      {formatShare(decimal(tightest.mayFall))} from {dayText(tightest.from)}
    </span>
  );
}

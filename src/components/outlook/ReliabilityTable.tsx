import type { ProjectionRecordView } from '../../contracts/outlook.ts';
import { dayText } from '../../core/calendar/printDay.ts';
import type { HorizonRecord, WordRecord } from '../../core/outlook/backTest.ts';
import { FEWEST_PEERS } from '../../core/outlook/nextTest.ts';
import { MethodLink } from '../marks/MethodLink.tsx';
import { Panel } from '../ui/Panel.tsx';
import { ScrollRegion } from '../ui/ScrollRegion.tsx';
import { EmptyState } from '../ui/States.tsx';
import { Cell, HeadCell, NameCell, Row, Table, TableBody, TableHead } from '../ui/Table.tsx';
import { quartersText, wholeShare } from './outlookWords.ts';

interface ReliabilityProps {
  readonly record: ProjectionRecordView | null;
}

const TITLE = 'What was said, and what came';

/** Beside a borrower: each word over each horizon, how many of them came not met. */
export function ReliabilityPanel({ record }: ReliabilityProps) {
  if (!record || record.record.from === null) return <NothingSaid />;
  const { horizons } = record.record;
  const [first] = horizons;
  return (
    <Panel title={TITLE} aside={<MethodLink topic="coming-tests" />}>
      <p className="type-second">{placeText(record)} Share that was not met, of how many said.</p>
      <ScrollRegion label="Share not met by what was said" className="mt-2">
        <Table caption="Share not met by what was said, by quarters ahead">
          <TableHead>
            <tr role="row">
              <HeadCell>Said</HeadCell>
              {horizons.map(({ quarters }) => (
                <HeadCell key={quarters} numeric>
                  {quarters === 1 ? '1 qtr' : `${quarters} qtrs`}
                </HeadCell>
              ))}
            </tr>
          </TableHead>
          <TableBody>
            {first?.words.map(({ word }, place) => (
              <Row key={word}>
                <NameCell name={word} />
                {horizons.map(({ quarters, words }) => (
                  <Cell key={quarters} numeric>
                    <CameNotMet {...words[place]!} />
                  </Cell>
                ))}
              </Row>
            ))}
            <Row>
              <NameCell name="Brier score" />
              {horizons.map(({ quarters, said, brier }) => (
                <Cell key={quarters} numeric>
                  {scoreText(said, brier)}
                </Cell>
              ))}
            </Row>
          </TableBody>
        </Table>
      </ScrollRegion>
      <p className="mt-2">
        <a href="/book/projections">The whole table</a>
      </p>
    </Panel>
  );
}

/** Over the book: one table a horizon, with what the words stand for and the scores. */
export function ReliabilityTables({ record }: ReliabilityProps) {
  if (!record || record.record.from === null) return <NothingSaid />;
  return (
    <Panel title={TITLE} aside={<MethodLink topic="coming-tests" />}>
      <div className="stack">
        <p>
          {placeText(record)} Every past quarter end was projected with the changes that had ended by then,
          and held against the tests that came, as their figures are known today. Levels are those in force
          when the tests came, also where they were agreed only later.
        </p>
        {record.record.horizons.map((horizon) => (
          <HorizonTable key={horizon.quarters} horizon={horizon} />
        ))}
      </div>
    </Panel>
  );
}

const NothingSaid = () => (
  <Panel title={TITLE} aside={<MethodLink topic="coming-tests" />}>
    <EmptyState title="Nothing to look back at yet">
      The nightly run holds past projections against what came, once the book has enough quarter ends with at
      least {FEWEST_PEERS} changes before them.
    </EmptyState>
  </Panel>
);

const placeText = ({ asOf, record: { from, until } }: ProjectionRecordView): string =>
  `Whole book, said from ${dayText(from ?? asOf)} to ${dayText(until ?? asOf)}, as of the night of ${dayText(asOf)}.`;

function HorizonTable({ horizon }: { readonly horizon: HorizonRecord }) {
  const { quarters, words, said, notMet, tooFewPeers, brier, brierOfBaseRate } = horizon;
  const name = quartersText(quarters);
  return (
    <section>
      <h2 className="type-heading">{name} ahead</h2>
      <ScrollRegion label={`${name} ahead`}>
        <Table caption={`What was said ${name} ahead, and what came`}>
          <TableHead>
            <tr role="row">
              <HeadCell>Said</HeadCell>
              <HeadCell numeric>n</HeadCell>
              <HeadCell numeric>Mean share said</HeadCell>
              <HeadCell numeric>Came not met</HeadCell>
              <HeadCell numeric>Of those met when it was said</HeadCell>
            </tr>
          </TableHead>
          <TableBody>
            {words.map((record) => (
              <Row key={record.word}>
                <NameCell name={record.word} />
                <Cell numeric>{record.said}</Cell>
                <Cell numeric>{record.meanSaid === null ? '–' : wholeShare(record.meanSaid)}</Cell>
                <Cell numeric>
                  <CameNotMet {...record} />
                </Cell>
                <Cell numeric>
                  <CameNotMet {...record.afterMet} />
                </Cell>
              </Row>
            ))}
          </TableBody>
        </Table>
      </ScrollRegion>
      <p className="type-second mt-1">
        {said} said, {notMet} came not met; {tooFewPeers} not said for want of peers. Brier score{' '}
        {scoreText(said, brier)}; always saying the share of all of them would score{' '}
        {scoreText(said, brierOfBaseRate)}. The lower the better.
      </p>
    </section>
  );
}

const scoreText = (said: number, score: number | null): string =>
  score === null || said < FEWEST_PEERS ? 'too few' : score.toFixed(3);

/** Below thirty a share would say more than there is: the count alone stands. */
function CameNotMet({ said, notMet }: Pick<WordRecord, 'said' | 'notMet'>) {
  if (said === 0) return <span className="type-second">–</span>;
  if (said < FEWEST_PEERS)
    return (
      <>
        <span className="whitespace-nowrap">
          {notMet} of {said}
        </span>
        <span className="type-second type-small block">too few</span>
      </>
    );
  return (
    <>
      <span className="type-name">{wholeShare(notMet / said)}</span>
      <span className="type-second type-small block">of {said}</span>
    </>
  );
}

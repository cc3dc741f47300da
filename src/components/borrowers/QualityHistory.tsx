import { dayText } from '../../core/calendar/printDay.ts';
import { QUALITY_BLOCKS, type QuarterScore, type ReportingQuality } from '../../core/quality/score.ts';
import { Panel } from '../ui/Panel.tsx';
import { ScrollRegion } from '../ui/ScrollRegion.tsx';
import { Cell, HeadCell, Row, Table, TableBody, TableHead } from '../ui/Table.tsx';
import { blockScore } from './QualitySummary.tsx';

/** The score quarter by quarter, newest first, with its blocks and how many peers it was held against. */
export function QualityHistory({ quality }: { readonly quality: ReportingQuality }) {
  const quarters = quality.history.toReversed();
  const blocks = QUALITY_BLOCKS.filter((name) =>
    quarters.some((quarter) => quarter.blocks.some((block) => block.name === name)),
  );
  return (
    <Panel title="Quarter by quarter">
      <ScrollRegion label="Scores quarter by quarter">
        <Table caption="Score of each quarter end; 100 is earnings well supported">
          <TableHead>
            <tr role="row">
              <HeadCell>Quarter end</HeadCell>
              <HeadCell numeric>Score</HeadCell>
              {blocks.map((name) => (
                <HeadCell key={name} numeric>
                  {name.charAt(0).toUpperCase() + name.slice(1)}
                </HeadCell>
              ))}
              <HeadCell numeric>Coverage</HeadCell>
              <HeadCell numeric>Peers</HeadCell>
            </tr>
          </TableHead>
          <TableBody>
            {quarters.map((quarter) => (
              <Row key={quarter.quarterEnd}>
                <Cell nowrap>{dayText(quarter.quarterEnd)}</Cell>
                <Cell numeric>{scoreText(quarter)}</Cell>
                {blocks.map((name) => (
                  <Cell key={name} numeric>
                    {blockText(quarter, name)}
                  </Cell>
                ))}
                <Cell numeric>{quarter.coverage}</Cell>
                <Cell numeric>{quarter.sectorPeers}</Cell>
              </Row>
            ))}
          </TableBody>
        </Table>
      </ScrollRegion>
      <p className="type-second mt-2">
        The headline is the mean of the last three quarter ends: one quarter alone moves by about 20 points
        for clean firms. A move under 10 points is not news.
      </p>
    </Panel>
  );
}

const scoreText = (quarter: QuarterScore) =>
  quarter.score === null ? (
    <span className="type-second">no score: {quarter.noScoreReason}</span>
  ) : (
    <span className="type-name">{Math.round(quarter.score)}</span>
  );

function blockText(quarter: QuarterScore, name: QuarterScore['blocks'][number]['name']): string {
  const block = quarter.blocks.find((each) => each.name === name);
  const score = block && blockScore(block);
  return score === null || score === undefined ? '–' : String(score);
}

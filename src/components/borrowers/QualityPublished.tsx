import type { PublishedMeasure } from '../../core/quality/publishedMeasure.ts';
import { PUBLISHED_REGISTER, saidOf, type PublishedEntry } from '../../core/quality/publishedRegister.ts';
import { percent } from '../../core/quality/wording.ts';
import { MethodLink } from '../marks/MethodLink.tsx';
import { Panel } from '../ui/Panel.tsx';
import { ScrollRegion } from '../ui/ScrollRegion.tsx';
import { Cell, HeadCell, Row, Table, TableBody, TableHead } from '../ui/Table.tsx';
import { plainScore } from './plainScore.ts';

/** Every published measure at the latest quarter end, with its published lines and what it is not. */
export function QualityPublished({ measures }: { readonly measures: readonly PublishedMeasure[] }) {
  if (measures.length === 0) return null;
  return (
    <Panel title="Published measures, beside the score">
      <ScrollRegion label="Published measures">
        <Table caption="Published measures at the latest quarter end, with their published lines">
          <TableHead>
            <tr role="row">
              <HeadCell>Measure</HeadCell>
              <HeadCell numeric>Value</HeadCell>
              <HeadCell>Published lines</HeadCell>
              <HeadCell>What it is not</HeadCell>
            </tr>
          </TableHead>
          <TableBody>
            {measures.map((measure) => (
              <MeasureRow key={measure.key} measure={measure} />
            ))}
          </TableBody>
        </Table>
      </ScrollRegion>
      <p className="type-second mt-2">
        Estimated on public firms: ranks and published lines, not probabilities. Those that enter the score
        say so; the others stand beside it and change nothing.
      </p>
    </Panel>
  );
}

function MeasureRow({ measure }: { readonly measure: PublishedMeasure }) {
  const { key, value, reason, remarks } = measure;
  const entry = PUBLISHED_REGISTER[key];
  return (
    <Row>
      <Cell>
        {entry.name} <MethodLink topic={entry.topic} />
        <span className="type-second type-small block">
          {entry.source}
          {entry.inScore !== null && `; in the score as ${entry.inScore}`}
        </span>
      </Cell>
      <Cell numeric>{value === null ? '–' : valueText(entry, value)}</Cell>
      <Cell>
        {linesText(measure, entry)}
        {[...(reason === null ? [] : [reason]), ...remarks].map((remark) => (
          <span key={remark} className="type-second type-small block">
            {remark}
          </span>
        ))}
      </Cell>
      <Cell>{entry.isNot}</Cell>
    </Row>
  );
}

const valueText = ({ print }: PublishedEntry, value: number): string =>
  print === 'share' ? percent(value, 1) : plainScore(value);

/** Every line, and what the furthest one that the value is past calls it. */
function linesText({ key, value }: PublishedMeasure, entry: PublishedEntry): string {
  if (entry.lines.length === 0) return 'none';
  const lines = entry.lines.map(({ at, side, says }) => `${side} ${plainScore(at)} ${says}`).join('; ');
  const said = value === null ? null : saidOf(key, value);
  return said === null ? lines : `${said} (${lines})`;
}

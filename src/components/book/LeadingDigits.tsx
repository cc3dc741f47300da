import type { DigitTests } from '../../core/patterns/statementDigits.ts';
import { formatProbability } from '../../core/patterns/patternWording.ts';
import type { DigitTest } from '../../core/statistics/leadingDigits.ts';
import { MethodLink } from '../marks/MethodLink.tsx';
import { Panel } from '../ui/Panel.tsx';
import { Caution } from '../ui/States.tsx';
import { Cell, HeadCell, Row, Table, TableBody, TableHead } from '../ui/Table.tsx';
import { countText, errorText, shareText } from './bookWords.ts';

/** Leading digits of the statement amounts of the whole book, against Benford's law. */
export function LeadingDigits({ digits }: { readonly digits: DigitTests }) {
  return (
    <Panel
      title="Leading digits of statement amounts, whole book"
      aside={<MethodLink topic="leading-digits" />}
    >
      <div className="two-panels">
        {(['first', 'second'] as const).map((place) => (
          <Digits key={place} place={place} test={digits[place]} />
        ))}
      </div>
      <div className="cautions">
        <Caution>
          A difference from Benford’s law is a difference, no finding: minimum amounts, price points, rounding
          and few kinds of borrowers make them too. It speaks of the book, never of one borrower.
        </Caution>
      </div>
    </Panel>
  );
}

function Digits({ place, test }: { readonly place: 'first' | 'second'; readonly test: DigitTests['first'] }) {
  const title = place === 'first' ? 'First digit' : 'Second digit';
  if (!test.ok)
    return (
      <section>
        <h3 className="type-heading">{title}</h3>
        <p>
          Refused:{' '}
          {test.error.kind === 'too-few-points'
            ? `${countText(test.error.given)} amounts, ${countText(test.error.needed)} are needed. With fewer, honest amounts look marginal.`
            : errorText(test.error)}
        </p>
      </section>
    );
  return (
    <section>
      <h3 className="type-heading">{title}</h3>
      <p>{summary(test.value)}</p>
      <details className="mt-2">
        <summary className="cursor-pointer">Each digit</summary>
        <DigitTable title={title} test={test.value} />
      </details>
    </section>
  );
}

const summary = ({ n, chiSquared, degreesOfFreedom, pValue, meanDeviation }: DigitTest): string =>
  `${countText(n)} amounts: chi-squared ${chiSquared.toFixed(1)} at ${degreesOfFreedom} degrees of freedom, p ${formatProbability(pValue)}${
    meanDeviation
      ? `; mean absolute deviation ${meanDeviation.value.toFixed(4)}, ${conformityText(meanDeviation.conformity)}`
      : ''
  }.`;

const conformityText = (conformity: 'close' | 'acceptable' | 'marginal' | 'none'): string =>
  conformity === 'none'
    ? 'no conformity by Nigrini’s cut-offs'
    : `${conformity} conformity by Nigrini’s cut-offs`;

function DigitTable({ title, test }: { readonly title: string; readonly test: DigitTest }) {
  const from = test.place === 'first' ? 1 : 0;
  return (
    <Table
      caption={`${title}: share of the amounts, share by Benford’s law, and normal score of the difference`}
    >
      <TableHead>
        <tr role="row">
          <HeadCell numeric>Digit</HeadCell>
          <HeadCell numeric>Share</HeadCell>
          <HeadCell numeric>Benford</HeadCell>
          <HeadCell numeric>Score</HeadCell>
        </tr>
      </TableHead>
      <TableBody>
        {test.observed.map((share, at) => (
          <Row key={at + from}>
            <Cell numeric>{at + from}</Cell>
            <Cell numeric>{shareText(share, 1)}</Cell>
            <Cell numeric>{shareText(test.expected[at] ?? 0, 1)}</Cell>
            <Cell numeric>{(test.z[at] ?? 0).toFixed(1)}</Cell>
          </Row>
        ))}
      </TableBody>
    </Table>
  );
}

import type { ReactNode } from 'react';
import type { BookPattern } from '../../core/patterns/bookPattern.ts';
import type { SplitPart } from '../../core/patterns/splits.ts';
import { FEWEST_BORROWERS } from '../../core/patterns/bookParts.ts';
import { MethodLink } from '../marks/MethodLink.tsx';
import { Panel } from '../ui/Panel.tsx';
import { Cell, HeadCell, NameCell, Row, Table, TableBody, TableHead } from '../ui/Table.tsx';
import { countText, crossDeskCount, errorText, pText, shortRefusal, zText } from './bookWords.ts';

interface BookSplitsProps {
  readonly pattern: BookPattern;
  readonly nameOfMeasure: (code: string) => string;
  readonly nameOfSector: (code: string) => string;
  /** Where the part is looked at by itself; nothing where it is already. */
  readonly measureHref: ((code: string) => string) | null;
  readonly sectorHref: ((code: string) => string) | null;
}

/** The same counts in each part of what is shown. */
export function BookSplits(props: BookSplitsProps) {
  const { pattern, nameOfMeasure, nameOfSector, measureHref, sectorHref } = props;
  return (
    <>
      {measureHref && (
        <Split
          title="By type of covenant"
          parts={pattern.byMeasure}
          nameOf={nameOfMeasure}
          hrefOf={measureHref}
        />
      )}
      {sectorHref && (
        <Split title="By sector" parts={pattern.bySector} nameOf={nameOfSector} hrefOf={sectorHref} />
      )}
      <Split title="By tests met in a row before" parts={pattern.byRun.parts} nameOf={runText}>
        <Trend pattern={pattern} />
      </Split>
    </>
  );
}

const runText = (name: string): string => (name === '1' ? '1 test' : `${name} tests`);

interface SplitProps {
  readonly title: string;
  readonly parts: readonly SplitPart[];
  readonly nameOf: (name: string) => string;
  readonly hrefOf?: (name: string) => string;
  readonly children?: ReactNode;
}

function Split({ title, parts, nameOf, hrefOf, children }: SplitProps) {
  return (
    <Panel flush title={title} aside={<MethodLink topic="book-pattern" />}>
      <Table caption={`${title}: tests just passing, observed and expected`} entries>
        <TableHead>
          <tr role="row">
            <HeadCell>Part</HeadCell>
            <HeadCell numeric>Borrowers</HeadCell>
            <HeadCell numeric>Tests</HeadCell>
            <HeadCell numeric>Just passing</HeadCell>
            <HeadCell numeric>Expected</HeadCell>
            <HeadCell numeric>Standardized difference</HeadCell>
            <HeadCell numeric>One-sided</HeadCell>
          </tr>
        </TableHead>
        <TableBody>
          {parts.map((part) => (
            <PartRow key={part.name} part={part} name={nameOf(part.name)} href={hrefOf?.(part.name)} />
          ))}
        </TableBody>
      </Table>
      {children && <div className="px-5 py-4">{children}</div>}
    </Panel>
  );
}

function PartRow({
  part,
  name,
  href,
}: {
  readonly part: SplitPart;
  readonly name: string;
  readonly href?: string | undefined;
}) {
  const { sides, borrowers } = part;
  if (!sides.ok || borrowers < FEWEST_BORROWERS)
    return (
      <Row>
        <NameCell name={name} />
        <Cell numeric>{crossDeskCount(borrowers)}</Cell>
        <Cell colSpan={5} entry="strip">
          <span className="type-second">
            {borrowers < FEWEST_BORROWERS || sides.ok
              ? 'Not shown: too few borrowers'
              : `Not shown: ${shortRefusal(sides.error)}`}
          </span>
        </Cell>
      </Row>
    );
  const { bins, right, pRight, n } = sides.value;
  return (
    <Row>
      <NameCell name={name} {...(href !== undefined && { href })} />
      <Cell numeric>{countText(borrowers)}</Cell>
      <Cell numeric>{countText(n)}</Cell>
      <Cell numeric entry="strip">
        <span className="entry-label">Just passing </span>
        {countText(bins.right)}
      </Cell>
      <Cell numeric entry="extra">
        <span className="entry-label">expected </span>
        {right.expected.toFixed(1)}
      </Cell>
      <Cell numeric entry="figure">
        {zText(right.zMultinomial)}
      </Cell>
      <Cell numeric>{pText(pRight)}</Cell>
    </Row>
  );
}

function Trend({ pattern: { byRun } }: { readonly pattern: BookPattern }) {
  if (!byRun.trend.ok)
    return (
      <p className="type-second">
        Whether the share just inside the limit rises with the run:{' '}
        {byRun.trend.error.kind === 'too-few-points'
          ? `not shown, ${crossDeskCount(byRun.trend.error.given)} tests at the limit in the smallest group, ${byRun.trend.error.needed} are needed in each.`
          : `${errorText(byRun.trend.error)}.`}
      </p>
    );
  const { statistic, pValue } = byRun.trend.value;
  return (
    <p>
      Whether the share just inside the limit rises with the run (Cochran and Armitage): z {zText(statistic)},{' '}
      {pText(pValue)}.
    </p>
  );
}

import type { BookView, ListedCovenant } from '../../contracts/book.ts';
import { POPULATION_NOT_BORROWER } from '../../core/cautions.ts';
import { formatProbability, isDebtToEbitda, LEVERAGE_SENTENCE } from '../../core/patterns/patternWording.ts';
import { MethodLink } from '../marks/MethodLink.tsx';
import { Panel } from '../ui/Panel.tsx';
import { Caution } from '../ui/States.tsx';
import { Cell, HeadCell, NameCell, Row, Table, TableBody, TableHead } from '../ui/Table.tsx';
import { countText, pText, shareText, shortRefusal } from './bookWords.ts';

interface PatternListProps {
  readonly book: BookView;
  readonly nameOfMeasure: (code: string) => string;
}

/** For which types a list may be shown at all, and whom of the person's own desks it names. */
export function PatternList({ book, nameOfMeasure }: PatternListProps) {
  const { window } = book.standing;
  return (
    <Panel flush title="Where a list may be shown" aside={<MethodLink topic="just-passing-patterns" />}>
      <Gates book={book} nameOfMeasure={nameOfMeasure} />
      <div className="stack px-5 py-4">
        <p>{whyOrWho(book)}</p>
        {book.listed.length > 0 && <Listed listed={book.listed} />}
        {book.listed.some(({ measure }) => isDebtToEbitda(measure)) && <p>{LEVERAGE_SENTENCE}</p>}
        <p className="type-second">
          Near the limit is up to {shareText(window.band)} of the level on the passing side and{' '}
          {shareText(window.gap)} on the failing side. Only covenants with three or more tests there can be
          listed, and only so many that the mean local false-discovery rate stays at or below 0.10.
        </p>
        <Caution>{POPULATION_NOT_BORROWER}</Caution>
      </div>
    </Panel>
  );
}

function Gates({ book: { standing }, nameOfMeasure }: PatternListProps) {
  const byName = (a: { readonly measure: string }, b: { readonly measure: string }): number =>
    nameOfMeasure(a.measure).localeCompare(nameOfMeasure(b.measure), 'en');
  return (
    <Table caption="The book’s own test of each type of covenant, corrected for their number" entries>
      <TableHead>
        <tr role="row">
          <HeadCell>Type of covenant</HeadCell>
          <HeadCell numeric>Tests</HeadCell>
          <HeadCell>Test</HeadCell>
          <HeadCell numeric>One-sided</HeadCell>
          <HeadCell numeric>After Holm</HeadCell>
          <HeadCell>List</HeadCell>
        </tr>
      </TableHead>
      <TableBody>
        {standing.gates.toSorted(byName).map((gate) => (
          <Row key={gate.measure}>
            <NameCell name={nameOfMeasure(gate.measure)} />
            <Cell numeric>{countText(gate.n)}</Cell>
            <Cell entry="strip">
              {gate.test}
              {gate.hasLowPower && ', low power'}
            </Cell>
            <Cell numeric>{pText(gate.pValue)}</Cell>
            <Cell numeric entry="figure">
              {pText(gate.adjusted)}
            </Cell>
            <Cell entry="extra">{gate.isOpen ? 'may be shown' : 'is not shown'}</Cell>
          </Row>
        ))}
        {standing.refused.toSorted(byName).map(({ measure, error }) => (
          <Row key={measure}>
            <NameCell name={nameOfMeasure(measure)} />
            <Cell colSpan={4} entry="strip">
              <span className="type-second">Not tested: {shortRefusal(error)}</span>
            </Cell>
            <Cell entry="extra">is not shown</Cell>
          </Row>
        ))}
      </TableBody>
    </Table>
  );
}

function whyOrWho({ standing, listed, listedElsewhere, readsAll }: BookView): string {
  if (!standing.gates.some(({ isOpen }) => isOpen))
    return 'No type’s own test rejects at 5\u00a0% after Holm’s correction, so no borrower is listed.';
  const elsewhere = readsAll
    ? ''
    : ` On borrowers of other desks: ${listedElsewhere === null ? 'fewer than 5' : countText(listedElsewhere)}.`;
  return listed.length === 0
    ? `No covenant of ${readsAll ? 'the book' : 'your desks'} is on the list of a type whose own test rejects.${elsewhere}`
    : `${countText(listed.length)} ${listed.length === 1 ? 'covenant' : 'covenants'} of ${readsAll ? 'the book' : 'your desks'}, the lowest rate first.${elsewhere}`;
}

function Listed({ listed }: { readonly listed: readonly ListedCovenant[] }) {
  return (
    <Table caption="Covenants on the list" entries>
      <TableHead>
        <tr role="row">
          <HeadCell>Borrower</HeadCell>
          <HeadCell numeric>Near, passing</HeadCell>
          <HeadCell numeric>Expected</HeadCell>
          <HeadCell numeric>Exact test</HeadCell>
          <HeadCell numeric>Local false-discovery rate</HeadCell>
          <HeadCell>Fitted with</HeadCell>
        </tr>
      </TableHead>
      <TableBody>
        {listed.map((each) => (
          <Row key={each.covenantId}>
            <NameCell
              name={each.borrowerName}
              href={`/borrowers/${each.borrowerId}?covenant=${each.covenantId}`}
              beside={each.covenantName}
            />
            <Cell numeric entry="strip">
              {each.passing} of {each.near}
            </Cell>
            <Cell numeric>{each.expectedPassing.toFixed(1)}</Cell>
            <Cell numeric>{pText(each.pAtLeast)}</Cell>
            <Cell numeric entry="figure">
              {formatProbability(each.localFdr)}
            </Cell>
            <Cell>
              {countText(each.peerCount)} covenants of the {each.peers === 'sector' ? 'sector' : 'whole book'}
            </Cell>
          </Row>
        ))}
      </TableBody>
    </Table>
  );
}

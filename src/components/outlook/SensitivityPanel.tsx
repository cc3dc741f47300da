import type { CovenantView } from '../../contracts/borrowers.ts';
import type { BreakEvenView, SensitivityView } from '../../contracts/outlook.ts';
import { dayText } from '../../core/calendar/printDay.ts';
import { OURS } from '../../core/covenants/wording.ts';
import { decimal } from '../../core/money/decimal.ts';
import { formatShare } from '../../core/money/print.ts';
import type { Factor } from '../../core/outlook/sensitivity.ts';
import { MethodLink } from '../marks/MethodLink.tsx';
import { Panel } from '../ui/Panel.tsx';
import { ScrollRegion } from '../ui/ScrollRegion.tsx';
import { EmptyState } from '../ui/States.tsx';
import { Cell, HeadCell, NameCell, Row, Table, TableBody, TableHead } from '../ui/Table.tsx';
import { breakEvenText, FACTOR_NAMES, firstText, moneyText, shareText } from './outlookWords.ts';

interface SensitivityPanelProps {
  readonly covenants: readonly CovenantView[];
  readonly sensitivity: SensitivityView | null;
}

const SINGLE = ['earnings', 'sales', 'working capital', 'rates'] as const satisfies readonly Factor[];

/** How far one figure at a time may move before each test is not met, and all three together. */
export function SensitivityPanel({ covenants, sensitivity }: SensitivityPanelProps) {
  if (!sensitivity || sensitivity.tests.length === 0)
    return (
      <Panel title="How far figures may move" aside={<MethodLink topic="sensitivity" />}>
        <EmptyState title="No test with a result">
          Without a tested figure there is nothing that could move it. See the covenants for what is missing.
        </EmptyState>
      </Panel>
    );
  const nameOf = namesOf(covenants);
  const isOurs = (covenantId: number): boolean =>
    covenants.some((covenant) => covenant.id === covenantId && covenant.isOurs);
  return (
    <Panel title="How far figures may move" aside={<MethodLink topic="sensitivity" />}>
      <div className="stack">
        <ScrollRegion label="How far figures may move before each test is not met">
          <Table caption="How far one figure at a time may move before each test is not met">
            <TableHead>
              <tr role="row">
                <HeadCell>Before this is not met</HeadCell>
                {SINGLE.map((factor) => (
                  <HeadCell key={factor} numeric>
                    {FACTOR_NAMES[factor]}
                  </HeadCell>
                ))}
              </tr>
            </TableHead>
            <TableBody>
              {sensitivity.tests.map((test) => (
                <Row key={test.covenantId}>
                  <NameCell
                    name={nameOf(test.covenantId)}
                    second={`${isOurs(test.covenantId) ? `${OURS}, ` : ''}test of ${dayText(test.testDate)}`}
                  />
                  {SINGLE.map((factor) => (
                    <BreakEvenCell key={factor} factor={factor} found={test.breakEvens[factor]} />
                  ))}
                </Row>
              ))}
              <Row>
                <NameCell name="First of those with room" />
                {SINGLE.map((factor) => (
                  <Cell key={factor} numeric>
                    {firstText(factor, sensitivity.first[factor], nameOf)}
                  </Cell>
                ))}
              </Row>
            </TableBody>
          </Table>
        </ScrollRegion>
        <section>
          <h3 className="type-heading">Reverse stress</h3>
          <p>{reverseText(sensitivity, nameOf)}</p>
        </section>
        <p className="type-second">{assumptions(sensitivity)}</p>
      </div>
    </Panel>
  );
}

const namesOf =
  (covenants: readonly CovenantView[]) =>
  (covenantId: number): string =>
    covenants.find(({ id }) => id === covenantId)?.name ?? 'a covenant that is no more';

function BreakEvenCell({ factor, found }: { readonly factor: Factor; readonly found: BreakEvenView }) {
  const money = found.kind === 'at' ? moneyText(found.amount) : null;
  return (
    <Cell numeric>
      {found.kind === 'at' ? (
        <span className="type-name">{breakEvenText(factor, found)}</span>
      ) : (
        <span className="type-second">{breakEvenText(factor, found)}</span>
      )}
      {money && (
        <span className="type-second type-small block">
          {money}
          {factor === 'rates' && ' a year'}
        </span>
      )}
    </Cell>
  );
}

function reverseText(
  { tests, first, every }: SensitivityView,
  nameOf: (covenantId: number) => string,
): string {
  const failed = tests
    .filter(({ breakEvens }) => breakEvens.together.kind === 'not met already')
    .map(({ covenantId }) => nameOf(covenantId));
  return [
    'Sales, EBITDA, and receivables and stocks fall together by one and the same share.',
    failed.length > 0 ? `Nothing is left already of ${failed.join(', ')}.` : '',
    first.together
      ? `At ${formatShare(decimal(first.together.share))} the first of those with room is used up: ${nameOf(first.together.covenantId)}.`
      : 'Nothing that has room is reached by it.',
    tests.length === 1
      ? ''
      : every
        ? `At ${formatShare(decimal(every))} nothing is left of any of the ${tests.length}.`
        : 'At no such share is nothing left of all of them: some do not rest on these figures, or cannot be told.',
  ]
    .filter((sentence) => sentence !== '')
    .join(' ');
}

const assumptions = ({ variableCostShare, floatingDebtShare }: SensitivityView): string =>
  `Assumed, and set in the policy: ${shareText(variableCostShare)} of sales is variable cost and is saved when sales fall; ${shareText(floatingDebtShare)} of the debt on the balance sheet is at floating rates. When earnings fall, debt, cash, interest and tax stay as they are. Receivables and stocks that bring no cash are missing in cash first and are drawn after that. Shares are of EBITDA as the test has it, of twelve months’ sales, and of receivables and stocks on the test date.`;

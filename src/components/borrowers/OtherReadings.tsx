import type { CovenantView } from '../../contracts/borrowers.ts';
import type { Outcome } from '../../core/covenants/covenantTest.ts';
import { spokenTest } from '../../core/covenants/spokenTest.ts';
import { COUNTERFACTUAL_WORDS, wouldHaveBeen } from '../../core/covenants/wording.ts';
import { decimal } from '../../core/money/decimal.ts';
import { formatMoney, formatShare } from '../../core/money/print.ts';
import { MethodLink } from '../marks/MethodLink.tsx';
import { OutcomeText } from '../marks/OutcomeText.tsx';
import { Facts, type Fact } from '../ui/Facts.tsx';
import { testedText } from './figures.ts';

/** What the latest test would have come to on other readings of earnings and of accounting. */
export function OtherReadings({ covenant }: { readonly covenant: CovenantView }) {
  const tested = spokenTest(covenant.tests);
  if (!tested) return null;
  const level = { level: tested.level };
  return (
    <section>
      <h3 className="type-heading">
        Would the test have been met… <MethodLink topic="counterfactual-tests" />
      </h3>
      <Facts
        facts={[
          {
            label: 'As reported',
            value: <Line text={testedText(covenant, tested)} outcome={tested.outcome} />,
          },
          ...covenant.counterfactuals.map((other): Fact => ({
            key: other.label,
            label: `${COUNTERFACTUAL_WORDS[other.label]}, ${formatMoney(decimal(other.takenOut))} taken out`,
            value: (
              <>
                {testedText(covenant, { tested: other.ratio, ...level })}{' '}
                <span className="type-second">{wouldHaveBeen(other.outcome)}</span>
              </>
            ),
          })),
          ...neededFacts(covenant),
          ...(covenant.otherAccounting
            ? [
                {
                  label: 'By today’s accounting rules, leases counted as debt',
                  value: (
                    <Line
                      text={testedText(covenant, { tested: covenant.otherAccounting.ratio, ...level })}
                      outcome={covenant.otherAccounting.outcome}
                    />
                  ),
                },
              ]
            : []),
        ]}
      />
    </section>
  );
}

const neededFacts = ({ counterfactuals }: CovenantView): readonly Fact[] =>
  counterfactuals.flatMap(({ label, breakEvenShare }) =>
    breakEvenShare === null
      ? []
      : [
          {
            key: `${label} needed`,
            label: 'The test needs, of the add-backs',
            value: `at least ${formatShare(decimal(breakEvenShare))}`,
          },
        ],
  );

function Line({ text, outcome }: { readonly text: string; readonly outcome: Outcome }) {
  return (
    <>
      {text} <OutcomeText outcome={outcome} />
    </>
  );
}

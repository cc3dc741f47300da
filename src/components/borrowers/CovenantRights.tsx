import type { CovenantView, CureView } from '../../contracts/borrowers.ts';
import { dayText } from '../../core/calendar/printDay.ts';
import { spokenTest } from '../../core/covenants/spokenTest.ts';
import { decimal } from '../../core/money/decimal.ts';
import { formatMoney, formatShare } from '../../core/money/print.ts';
import { MethodLink } from '../marks/MethodLink.tsx';
import { OutcomeText } from '../marks/OutcomeText.tsx';
import { Facts, type Fact } from '../ui/Facts.tsx';
import { testedText } from './figures.ts';

/** What stands over the borrower's own figures: trigger of a springing covenant, waiver, cure. */
export function CovenantRights({ covenant }: { readonly covenant: CovenantView }) {
  const { cure } = covenant;
  const facts = [...springingFacts(covenant), ...waiverFacts(covenant), ...cureFacts(covenant)];
  if (facts.length === 0) return null;
  return (
    <section>
      <h3 className="type-heading">
        Rights of the agreement <MethodLink topic="cures-and-waivers" />
      </h3>
      <div className="two-panels">
        <Facts facts={facts} />
        {cure && <Facts facts={[...moneyFacts(cure, covenant.currency), ...limitFacts(cure)]} />}
      </div>
    </section>
  );
}

function springingFacts({ springing, currency }: CovenantView): readonly Fact[] {
  if (!springing) return [];
  const { drawn, commitment, utilisation, trigger } = springing;
  const share =
    utilisation === null ? '' : `, ${formatShare(decimal(utilisation), { beside: decimal(trigger) })}`;
  return [
    { label: 'Tested only where drawn above', value: formatShare(decimal(trigger), { places: 0 }) },
    {
      label: 'Drawn of commitments on the test date',
      value: `${currency} ${formatMoney(decimal(drawn))} of ${formatMoney(decimal(commitment))}${share}`,
    },
  ];
}

function waiverFacts({ waiver }: CovenantView): readonly Fact[] {
  if (!waiver) return [];
  const until = waiver.until === null ? 'without end' : `until ${dayText(waiver.until)}`;
  return [
    { label: 'Waived', value: `on ${dayText(waiver.grantedOn)}, ${until}` },
    ...(waiver.conditions === '' ? [] : [{ label: 'Conditions of the waiver', value: waiver.conditions }]),
  ];
}

const WAYS = [
  ['ebitda', 'As EBITDA'],
  ['debt', 'As debt repaid'],
  ['both', 'As both'],
] as const;

function cureFacts(covenant: CovenantView): readonly Fact[] {
  const { cure, currency } = covenant;
  const test = spokenTest(covenant.tests);
  if (!cure || !test) return [];
  const money = (amount: string) => `${currency} ${formatMoney(decimal(amount))}`;
  return [
    {
      label: 'On the borrower’s own figures',
      value: (
        <>
          {testedText(covenant, test)} <OutcomeText outcome={test.underlyingOutcome} />
        </>
      ),
    },
    ...(cure.ratioWith === null
      ? []
      : [
          {
            label: 'With the money, for the covenant only',
            value: testedText(covenant, { tested: cure.ratioWith, level: test.level }),
          },
        ]),
    ...WAYS.flatMap(([method, label]) => {
      const amount = cure.needed[method];
      if (amount === null || decimal(amount).lte(0)) return [];
      const isAgreed = cure.method === method ? ', as the agreement counts it' : '';
      return [{ label: `${label}${isAgreed}, it takes`, value: money(amount) }];
    }),
  ];
}

function moneyFacts(cure: CureView, currency: string): readonly Fact[] {
  const money = (amount: string) => `${currency} ${formatMoney(decimal(amount))}`;
  const { received, receivedOn, counted, carried, countsUntil } = cure;
  return [
    ...(received === null || receivedOn === null
      ? []
      : [{ label: 'Put in', value: `${money(received)} on ${dayText(receivedOn)}` }]),
    ...(counted === null ? [] : [{ label: 'Counted, not above what is needed', value: money(counted) }]),
    ...(decimal(carried).isZero()
      ? []
      : [{ label: 'EBITDA of earlier cures that still counts', value: money(carried) }]),
    ...(countsUntil === null
      ? []
      : [{ label: 'Counts as EBITDA up to the test of', value: dayText(countsUntil) }]),
  ];
}

function limitFacts({ periodEnds, method, ...used }: CureView): readonly Fact[] {
  if (method === null) return [{ label: 'Right of cure', value: 'none in the agreement' }];
  return [
    {
      label: 'Cure period ends',
      value: periodEnds === null ? 'no due day of the certificate recorded' : dayText(periodEnds),
    },
    {
      label: 'Cures used in four quarters',
      value: `${used.usedInFour} of ${used.mostInFour ?? 0}`,
    },
    { label: 'Cures used over the life', value: `${used.usedInLife} of ${used.mostInLife ?? 0}` },
  ];
}

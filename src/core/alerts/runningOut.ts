import { daysBetween, type PlainDate } from '../calendar/plainDate.ts';
import { formatDay } from '../calendar/printDay.ts';
import type { Covenant } from '../covenants/covenant.ts';
import type { CovenantTest } from '../covenants/covenantTest.ts';
import { METHOD_WORDS } from '../covenants/cures.ts';
import { testInWords } from '../covenants/wording.ts';
import { formatMoney } from '../money/print.ts';
import type { AlertContext, AlertRule } from './rule.ts';
import { testEvidence } from './testEvidence.ts';

/**
 * A waiver or a cure period that runs out within 30 days: soon; within 10: urgent. The last day is in; the failure
 * underneath stands alone after it. The nearest end of a covenant speaks.
 *
 * @example runningOut(nightOf({ ebitda: 12, debt: 51, cash: 6 }, { waivers: [{ testDate: '2026-09-30', grantedOn: '2026-11-01', until: '2026-12-10', conditions: '' }] })).map(({ severity }) => severity) // => ['urgent']
 */
export const runningOut: AlertRule = (context) =>
  context.inputs.covenants.flatMap((covenant) => {
    const nearest = endsOf(covenant, context).toSorted((one, other) => one.days - other.days)[0];
    if (!nearest) return [];
    const { test, what, until, days } = nearest;
    return [
      {
        kind: 'waiver, cure running out',
        covenantId: covenant.id,
        severity: days <= context.policy.runningOut.urgentDays ? 'urgent' : 'soon',
        factDate: test.testDate,
        sentence: `${testInWords(test)} on ${formatDay(test.testDate)}: not met on our figures. The ${what} ends on ${formatDay(until)}, ${inDays(days)}.`,
        wouldChange: wouldChange(test),
        evidence: [
          ...testEvidence(covenant, test),
          { label: what === 'waiver' ? 'Waived until' : 'Cure period until', value: formatDay(until) },
        ],
      },
    ];
  });

interface End {
  readonly test: CovenantTest;
  readonly what: 'waiver' | 'cure period';
  readonly until: PlainDate;
  readonly days: number;
}

function endsOf({ id }: Covenant, { tests, policy, asOf }: AlertContext): readonly End[] {
  return tests
    .filter(({ covenantId }) => covenantId === id)
    .flatMap((test) => {
      const what = test.outcome === 'not met, waived' ? ('waiver' as const) : ('cure period' as const);
      const until = endOf(test);
      if (!until) return [];
      const days = daysBetween(asOf, until);
      return days >= 0 && days <= policy.runningOut.soonDays ? [{ test, what, until, days }] : [];
    });
}

function endOf({ outcome, waiver, cure }: CovenantTest): PlainDate | null {
  if (outcome === 'not met, waived') return waiver?.until ?? null;
  return outcome === 'not met, in cure period' ? (cure?.periodEnds ?? null) : null;
}

const inDays = (days: number): string => {
  if (days === 0) return 'today';
  return days === 1 ? 'in 1 day' : `in ${days} days`;
};

function wouldChange({ cure }: CovenantTest): string {
  const amount = cure?.method ? cure.needed[cure.method] : null;
  return amount && cure?.method
    ? `${formatMoney(amount)} put in as ${METHOD_WORDS[cure.method]}, or a waiver that reaches further.`
    : 'A waiver that reaches further, a reset, or figures that meet the level.';
}

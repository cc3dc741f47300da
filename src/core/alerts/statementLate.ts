import type { Undertaking } from '../borrowerInputs.ts';
import { deadlineOn, dueDate, type Deadline } from '../calendar/deadline.ts';
import { isSamePeriodEnd } from '../calendar/fiscalYear.ts';
import { addMonthsToMonthEnd, type PlainDate } from '../calendar/plainDate.ts';
import { formatDay } from '../calendar/printDay.ts';
import type { Statement } from '../statements/statement.ts';
import type { AlertContext, AlertRule } from './rule.ts';

/**
 * Accounts that an undertaking promises and that have not come: a note from the first day after the due date, soon
 * past grace. Certificates are not kept yet, so nothing is said of them. Source: methods.md A7.
 *
 * @example statementLate({ ...nightOf({ ebitda: 12, debt: 45, cash: 6 }), inputs: buildInputs({ undertakings: [{ id: 1, kind: 'quarterly accounts', everyMonths: 3, dueDays: 45, dayCount: 'calendar', graceDays: 10, firstPeriodEnd: '2026-09-30' }] }) }).map(({ severity }) => severity) // => ['soon']
 */
export const statementLate: AlertRule = (context) =>
  context.inputs.undertakings.flatMap((undertaking) => {
    const late = latePeriods(undertaking, context);
    const newest = late.at(-1);
    const [oldest] = late;
    if (!newest || !oldest) return [];
    return [
      {
        kind: 'statement late',
        covenantId: null,
        severity: late.some(({ deadline }) => deadline.state === 'overdue past grace') ? 'soon' : 'note',
        factDate: newest.periodEnd,
        sentence: sentenceOf(undertaking, oldest, late.length),
        wouldChange: `0 days late instead of ${oldest.deadline.daysLate}: the ${undertaking.kind} to ${formatDay(oldest.periodEnd)}.`,
        evidence: late.map(({ periodEnd, due, deadline }) => ({
          label: `${capitalised(undertaking.kind)} to ${formatDay(periodEnd)}`,
          value: `due ${formatDay(due)}, ${deadline.daysLate} days late, grace to ${formatDay(deadline.lastGraceDay)}`,
        })),
      },
    ];
  });

interface LatePeriod {
  readonly periodEnd: PlainDate;
  readonly due: PlainDate;
  readonly deadline: Deadline;
}

/** Oldest first. A period before the last delivered one is no longer chased: its figures stand in later accounts. */
function latePeriods(undertaking: Undertaking, { inputs, asOf }: AlertContext): readonly LatePeriod[] {
  if (undertaking.kind === 'compliance certificate') return [];
  const known = inputs.statements.filter(({ receivedOn }) => receivedOn <= asOf);
  const periodEnds = periodEndsBefore(undertaking, asOf);
  const delivered = periodEnds.findLastIndex((periodEnd) => isDelivered(undertaking, known, periodEnd));
  const { dueDays: days, dayCount, graceDays } = undertaking;
  return periodEnds
    .slice(delivered + 1)
    .map((periodEnd) => {
      const due = dueDate({ periodEnd, days, dayCount });
      return { periodEnd, due, deadline: deadlineOn({ due, graceDays, dayCount, day: asOf }) };
    })
    .filter(({ deadline }) => deadline.daysLate > 0);
}

function periodEndsBefore(
  { firstPeriodEnd, everyMonths }: Undertaking,
  asOf: PlainDate,
): readonly PlainDate[] {
  if (everyMonths < 1) throw new RangeError(`not a rhythm of reporting: every ${everyMonths} months`);
  const periodEnds: PlainDate[] = [];
  for (let end = firstPeriodEnd; end < asOf; end = addMonthsToMonthEnd(end, everyMonths))
    periodEnds.push(end);
  return periodEnds;
}

/** Annual accounts are a year's or a balance, audited or reviewed; the management figures of that day are not they. */
const isDelivered = ({ kind }: Undertaking, known: readonly Statement[], periodEnd: PlainDate): boolean =>
  known.some(
    (statement) =>
      isSamePeriodEnd(statement.periodEnd, periodEnd) &&
      (kind === 'annual accounts'
        ? (statement.basis === 'audited' || statement.basis === 'reviewed') &&
          (statement.months === 12 || statement.months === 0)
        : statement.basis !== 'forecast' && statement.months > 0),
  );

function sentenceOf(
  { kind }: Undertaking,
  { periodEnd, due, deadline }: LatePeriod,
  periods: number,
): string {
  const days = deadline.daysLate === 1 ? '1 day' : `${deadline.daysLate} days`;
  const grace = deadline.state === 'overdue past grace' ? ', past grace' : '';
  const more = periods > 1 ? ` ${periods} periods are late.` : '';
  return `${capitalised(kind)} to ${formatDay(periodEnd)} due ${formatDay(due)}, ${days} late${grace}.${more}`;
}

const capitalised = (text: string): string => `${text.charAt(0).toUpperCase()}${text.slice(1)}`;

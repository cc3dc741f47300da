/** What a borrower's findings mean for its alerts: raise, update, say nothing, close. */
import type { AlertFinding, AlertKind, AlertState, Severity } from './alert.ts';
import { SEVERITIES } from './alert.ts';

/** An alert that is there already, open or closed. */
export interface KnownAlert extends AlertFinding {
  readonly id: number;
  readonly state: AlertState;
  readonly isOpen: boolean;
  readonly conditionGone: boolean;
  /** The version of the borrower's inputs that its facts were read from. */
  readonly inputVersion: number;
  readonly closedAt: Date | null;
}

export type AlertUpdate = 'worsened' | 'improved' | 'back' | 'new facts';

export type AlertChange =
  | { readonly change: 'raise'; readonly finding: AlertFinding }
  | {
      readonly change: 'update';
      readonly alert: KnownAlert;
      readonly finding: AlertFinding;
      readonly how: AlertUpdate;
    }
  /** The condition still holds on the same facts: the same alert, at most worded for another day or other peers. */
  | { readonly change: 'seen'; readonly alert: KnownAlert; readonly finding: AlertFinding }
  | { readonly change: 'close'; readonly alert: KnownAlert }
  | { readonly change: 'condition gone'; readonly alert: KnownAlert };

export interface AlertView {
  readonly inputVersion: number;
  /** When the borrower's figures last changed; a later statement version may re-open what was closed. */
  readonly figuresChangedAt: Date | null;
  /** True where the figures do not say whether the condition holds: then nothing is closed. */
  readonly isUnknown: (kind: AlertKind, covenantId: number | null) => boolean;
}

const rank = (severity: Severity): number => SEVERITIES.indexOf(severity);
const isHigher = (one: Severity, other: Severity): boolean => rank(one) < rank(other);

/**
 * One open alert per borrower, covenant (if any) and kind.
 *
 * @example alertSlot(7, { kind: 'thin headroom', covenantId: 3 }) // => '7:3:thin headroom'
 */
export const alertSlot = (borrowerId: number, alert: Pick<AlertFinding, 'kind' | 'covenantId'>): string =>
  `${borrowerId}:${alert.covenantId ?? '-'}:${alert.kind}`;

const slotOf = (alert: Pick<AlertFinding, 'kind' | 'covenantId'>): string => alertSlot(0, alert);

/**
 * Holds findings against the alerts that are there. One finding a slot: of several, the most severe leads and the
 * others' sentences and evidence join it.
 *
 * An open alert is updated where its facts moved: another day, another severity, or other figures out of changed
 * inputs. Days that pass and peers that move are no new facts of the borrower. A closed one stays closed, unless the finding speaks of a later
 * day, is more severe, or the figures changed after the closing. Without a finding, "soon" and "note" close by
 * themselves; "urgent", and whatever waits for a second person's word, only says that its condition is gone.
 *
 * Source: desk practice, no text.
 *
 * @example alertChanges([], [], { inputVersion: 1, figuresChangedAt: null, isUnknown: () => false }) // => []
 */
export function alertChanges(
  known: readonly KnownAlert[],
  findings: readonly AlertFinding[],
  view: AlertView,
): readonly AlertChange[] {
  const merged = mergeFindings(findings);
  const found = merged.flatMap((finding) => {
    const slot = known.filter((alert) => slotOf(alert) === slotOf(finding));
    return changeFor(finding, slot, view);
  });
  const slots = new Set(merged.map(slotOf));
  const gone = known
    .filter(
      (alert) => alert.isOpen && !slots.has(slotOf(alert)) && !view.isUnknown(alert.kind, alert.covenantId),
    )
    .flatMap(changeWithout);
  return [...found, ...gone];
}

function changeFor(
  finding: AlertFinding,
  slot: readonly KnownAlert[],
  view: AlertView,
): readonly AlertChange[] {
  const open = slot.find((alert) => alert.isOpen);
  if (open) {
    const how = updateOf(open, finding, view);
    return how
      ? [{ change: 'update', alert: open, finding, how }]
      : [{ change: 'seen', alert: open, finding }];
  }
  const closed = slot.filter((alert) => !alert.isOpen);
  return closed.every((alert) => isNews(finding, alert, view)) ? [{ change: 'raise', finding }] : [];
}

function updateOf(open: KnownAlert, finding: AlertFinding, view: AlertView): AlertUpdate | null {
  if (isHigher(finding.severity, open.severity)) return 'worsened';
  if (open.conditionGone) return 'back';
  if (isHigher(open.severity, finding.severity)) return 'improved';
  if (finding.factDate !== open.factDate) return 'new facts';
  const isSame = view.inputVersion === open.inputVersion || wordsOf(open) === wordsOf(finding);
  return isSame ? null : 'new facts';
}

const wordsOf = ({ sentence, wouldChange, evidence }: AlertFinding): string =>
  JSON.stringify([sentence, wouldChange, evidence.map(({ label, value }) => [label, value])]);

const isNews = (finding: AlertFinding, closed: KnownAlert, view: AlertView): boolean =>
  finding.factDate > closed.factDate ||
  isHigher(finding.severity, closed.severity) ||
  (view.figuresChangedAt !== null &&
    closed.closedAt !== null &&
    view.figuresChangedAt.getTime() > closed.closedAt.getTime());

const WAITS_FOR_A_WORD: readonly AlertState[] = ['carried into a proposal', 'closing to be confirmed'];

function changeWithout(alert: KnownAlert): readonly AlertChange[] {
  if (alert.severity !== 'urgent' && !WAITS_FOR_A_WORD.includes(alert.state))
    return [{ change: 'close', alert }];
  return alert.conditionGone ? [] : [{ change: 'condition gone', alert }];
}

function mergeFindings(findings: readonly AlertFinding[]): readonly AlertFinding[] {
  const bySlot = new Map<string, AlertFinding>();
  for (const finding of findings) {
    const other = bySlot.get(slotOf(finding));
    bySlot.set(slotOf(finding), other ? joined(other, finding) : finding);
  }
  return [...bySlot.values()];
}

function joined(one: AlertFinding, other: AlertFinding): AlertFinding {
  const [lead, rest] = isHigher(other.severity, one.severity) ? [other, one] : [one, other];
  return {
    ...lead,
    factDate: lead.factDate > rest.factDate ? lead.factDate : rest.factDate,
    sentence: `${lead.sentence} ${rest.sentence}`,
    evidence: [...lead.evidence, ...rest.evidence],
  };
}

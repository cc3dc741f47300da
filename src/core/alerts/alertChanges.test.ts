import { describe, expect, test } from 'vitest';
import { alertChanges, alertSlot, type AlertView, type KnownAlert } from './alertChanges.ts';
import type { AlertFinding } from './alert.ts';

const finding = (facts: Partial<AlertFinding> = {}): AlertFinding => ({
  kind: 'thin headroom',
  covenantId: 7,
  severity: 'soon',
  factDate: '2026-09-30',
  sentence: 'Net leverage 3.38x, at most 3.50x. Earnings may fall 3.4\u00a0%.',
  wouldChange: 'EBITDA 0.4m higher',
  evidence: [{ label: 'Net leverage', value: '3.38x' }],
  ...facts,
});

const known = (facts: Partial<KnownAlert> = {}): KnownAlert => ({
  ...finding(),
  id: 1,
  state: 'raised',
  isOpen: true,
  conditionGone: false,
  inputVersion: 4,
  closedAt: null,
  ...facts,
});

const closed = (facts: Partial<KnownAlert> = {}): KnownAlert =>
  known({ state: 'closed', isOpen: false, closedAt: new Date('2026-11-10T09:00:00Z'), ...facts });

const view: AlertView = {
  inputVersion: 5,
  figuresChangedAt: new Date('2026-11-01T00:00:00Z'),
  isUnknown: () => false,
};
const changesOf = (alerts: KnownAlert[], findings: AlertFinding[], over: Partial<AlertView> = {}) =>
  alertChanges(alerts, findings, { ...view, ...over }).map((change) =>
    change.change === 'update' ? change.how : change.change,
  );

describe('while an alert is open', () => {
  test('the same facts are the same alert, and nothing is new', () => {
    expect(changesOf([known()], [finding()])).toEqual(['seen']);
  });

  test.each([
    ['a later day', { factDate: '2026-12-31' as const }],
    ['another sentence', { sentence: 'Net leverage 3.40x, at most 3.50x.' }],
    ['another figure', { evidence: [{ label: 'Net leverage', value: '3.40x' }] }],
    ['another way out', { wouldChange: 'EBITDA 0.5m higher' }],
  ])('%s updates it', (_what, facts) => {
    expect(changesOf([known()], [finding(facts)])).toEqual(['new facts']);
  });

  test('other words out of unchanged inputs, as days pass or peers move, are no new facts', () => {
    const other = finding({ sentence: 'Accounts 12 days late.' });
    expect(changesOf([known()], [other], { inputVersion: 4 })).toEqual(['seen']);
    expect(changesOf([known()], [other], { inputVersion: 5 })).toEqual(['new facts']);
    expect(changesOf([known()], [finding({ factDate: '2026-12-31' })], { inputVersion: 4 })).toEqual([
      'new facts',
    ]);
  });

  test('a higher severity marks it worsened, a lower one improved', () => {
    expect(changesOf([known()], [finding({ severity: 'urgent' })])).toEqual(['worsened']);
    expect(changesOf([known()], [finding({ severity: 'note' })])).toEqual(['improved']);
  });

  test('a condition that returns takes back the word that it was gone', () => {
    expect(
      changesOf([known({ severity: 'urgent', conditionGone: true })], [finding({ severity: 'urgent' })]),
    ).toEqual(['back']);
  });

  test('another covenant or another kind is another alert', () => {
    expect(changesOf([known()], [finding(), finding({ covenantId: 8 })])).toEqual(['seen', 'raise']);
    expect(changesOf([known()], [finding(), finding({ kind: 'step-down ahead' })])).toEqual([
      'seen',
      'raise',
    ]);
    expect(alertSlot(3, finding({ covenantId: null }))).not.toBe(alertSlot(3, finding()));
  });
});

describe('where the condition is gone', () => {
  test('soon and note close by themselves', () => {
    expect(changesOf([known({ severity: 'soon' })], [])).toEqual(['close']);
    expect(changesOf([known({ severity: 'note' })], [])).toEqual(['close']);
  });

  test('urgent says so once and stays open', () => {
    expect(changesOf([known({ severity: 'urgent' })], [])).toEqual(['condition gone']);
    expect(changesOf([known({ severity: 'urgent', conditionGone: true })], [])).toEqual([]);
  });

  test('what waits for a second person’s word stays open', () => {
    expect(changesOf([known({ state: 'closing to be confirmed' })], [])).toEqual(['condition gone']);
    expect(changesOf([known({ state: 'carried into a proposal' })], [])).toEqual(['condition gone']);
  });

  test('figures that cannot say leave the alert as it is', () => {
    expect(changesOf([known()], [], { isUnknown: () => true })).toEqual([]);
    expect(
      changesOf([known(), known({ id: 2, covenantId: 8 })], [], { isUnknown: (_kind, id) => id === 7 }),
    ).toEqual(['close']);
  });
});

describe('after closing', () => {
  test('the same facts open nothing', () => {
    expect(changesOf([closed()], [finding()])).toEqual([]);
  });

  test('only a later day opens another: not the day before, not the same day', () => {
    expect(changesOf([closed()], [finding({ factDate: '2026-09-29' })])).toEqual([]);
    expect(changesOf([closed()], [finding({ factDate: '2026-09-30' })])).toEqual([]);
    expect(changesOf([closed()], [finding({ factDate: '2026-10-01' })])).toEqual(['raise']);
  });

  test('a higher severity opens another, a lower one does not', () => {
    expect(changesOf([closed()], [finding({ severity: 'note' })])).toEqual([]);
    expect(changesOf([closed()], [finding({ severity: 'urgent' })])).toEqual(['raise']);
  });

  test('a statement version that came after the closing opens another, one at its instant does not', () => {
    const at = (time: string) => ({ figuresChangedAt: new Date(time) });
    expect(changesOf([closed()], [finding()], at('2026-11-10T08:59:59.999Z'))).toEqual([]);
    expect(changesOf([closed()], [finding()], at('2026-11-10T09:00:00.000Z'))).toEqual([]);
    expect(changesOf([closed()], [finding()], at('2026-11-10T09:00:00.001Z'))).toEqual(['raise']);
  });

  test('every earlier closing counts, not only the last', () => {
    const september = closed();
    const june = closed({ id: 2, factDate: '2026-06-30', closedAt: new Date('2026-11-20T09:00:00Z') });
    expect(changesOf([september, june], [finding()])).toEqual([]);
  });

  test('a closed alert is not closed again', () => {
    expect(changesOf([closed()], [])).toEqual([]);
  });
});

test('two findings in one slot are one alert: the most severe leads, the other’s evidence joins it', () => {
  const late = finding({
    kind: 'statement late',
    covenantId: null,
    severity: 'note',
    sentence: 'Accounts late.',
  });
  const later = finding({
    kind: 'statement late',
    covenantId: null,
    severity: 'soon',
    sentence: 'Certificate late.',
    evidence: [{ label: 'Certificate', value: 'due 14 Nov 2026' }],
  });
  expect(alertChanges([], [late, later], view)).toEqual([
    {
      change: 'raise',
      finding: {
        ...later,
        sentence: 'Certificate late. Accounts late.',
        evidence: [...later.evidence, ...late.evidence],
      },
    },
  ]);
});

import { describe, expect, test } from 'vitest';
import { assess } from './assess.ts';
import { NO_BOOK } from './bookCrossSection.ts';
import type { BorrowerInputs } from './borrowerInputs.ts';
import { buildInputs } from './alerts/rule.fixture.ts';
import { buildCovenant, buildLevel, buildYear } from './covenants/covenant.fixture.ts';
import { decimal } from './money/decimal.ts';
import { POLICY_VERSION_1 } from './policy.ts';
import { whyItMoved, type Basis, type Movement } from './whyItMoved.ts';

const covenant = (level: string) =>
  buildCovenant({ firstTestOn: '2026-09-30', levels: [buildLevel('2025-01-01', null, level)] });
const inputsWith = (debt: number, level: string): BorrowerInputs =>
  buildInputs({
    statements: buildYear('2026-09-30', { ebitda: 12, debt, cash: 6 }),
    covenants: [covenant(level)],
  });
const basis = (given: Partial<Basis> = {}): Basis => ({
  inputs: inputsWith(42, '3.5'),
  crossSection: NO_BOOK,
  policy: POLICY_VERSION_1,
  asOf: '2026-11-30',
  ...given,
});
const resultOn = (on: Basis) => ({
  basis: on,
  result: assess(on.inputs, on.crossSection, on.policy, on.asOf),
});
const ofTest = (movements: readonly Movement[]) => movements.find(({ subject }) => subject.kind === 'test');

describe('why it moved', () => {
  test('nothing moved where nothing changed', () => {
    expect(whyItMoved(resultOn(basis()), resultOn(basis()))).toEqual([]);
  });

  test('new figures and a new level each have their part of one change', () => {
    const movement = ofTest(
      whyItMoved(resultOn(basis()), resultOn(basis({ inputs: inputsWith(45, '3.1') }))),
    );
    expect(movement).toMatchObject({
      before: { word: 'met', figure: decimal('3') },
      after: { word: 'not met', figure: decimal('3.25'), level: decimal('3.1') },
      steps: [
        { cause: 'new figures', from: { word: 'met' }, to: { word: 'met, thin', figure: decimal('3.25') } },
        { cause: 'level', from: { word: 'met, thin' }, to: { word: 'not met' } },
      ],
    });
  });

  test('a policy with another thin level changes the word and leaves the figure', () => {
    const policy = { ...POLICY_VERSION_1, version: 2, thinBelow: decimal('0.2') };
    const movement = ofTest(whyItMoved(resultOn(basis()), resultOn(basis({ policy }))));
    expect(movement?.steps).toMatchObject([
      { cause: 'policy', from: { figure: decimal('3') }, to: { word: 'met, thin', figure: decimal('3') } },
    ]);
  });

  test('what the earlier method said otherwise on the same basis is put down to the method', () => {
    const earlier = resultOn(basis());
    const [first] = earlier.result.tests;
    const stored = {
      ...earlier,
      result: { ...earlier.result, methodVersion: '0.9', tests: [{ ...first!, tested: decimal('2.9') }] },
    };
    expect(ofTest(whyItMoved(stored, resultOn(basis())))?.steps).toMatchObject([
      { cause: 'method', from: { figure: decimal('2.9') }, to: { figure: decimal('3') } },
    ]);
  });

  test('another result on the same basis under the same version is put down to the method too', () => {
    const today = resultOn(basis());
    const [first] = today.result.tests;
    const stored = {
      ...today,
      result: { ...today.result, tests: [{ ...first!, tested: decimal('2.9') }] },
    };
    expect(ofTest(whyItMoved(stored, today))).toMatchObject({
      after: { figure: decimal('3') },
      steps: [{ cause: 'method', from: { figure: decimal('2.9') }, to: { figure: decimal('3') } }],
    });
  });

  test('a waiver is a change of terms', () => {
    const inputs = inputsWith(51, '3.5');
    const waiver = {
      testDate: '2026-09-30',
      grantedOn: '2026-11-15',
      until: null,
      conditions: 'none',
    } as const;
    const waived = { ...inputs, covenants: [{ ...inputs.covenants[0]!, waivers: [waiver] }] };
    const movements = whyItMoved(resultOn(basis({ inputs })), resultOn(basis({ inputs: waived })));
    expect(ofTest(movements)?.steps).toMatchObject([
      { cause: 'terms', from: { word: 'not met' }, to: { word: 'not met, waived' } },
    ]);
  });

  test('an alert that was not there has its cause', () => {
    const movements = whyItMoved(resultOn(basis()), resultOn(basis({ inputs: inputsWith(51, '3.5') })));
    expect(movements.find(({ subject }) => subject.kind === 'alert')).toMatchObject({
      subject: { alert: 'test not met' },
      before: { word: 'no alert' },
      after: { word: 'urgent' },
      steps: [{ cause: 'new figures' }],
    });
  });

  test('the steps lead from before to after without a gap, whatever changed', () => {
    const policy = { ...POLICY_VERSION_1, version: 2, thinBelow: decimal('0.2') };
    const now = basis({ inputs: inputsWith(39, '2.9'), policy, asOf: '2027-01-15' });
    for (const { before, after, steps } of whyItMoved(resultOn(basis()), resultOn(now))) {
      const points = [before, ...steps.map(({ to }) => to)];
      steps.forEach(({ from }, place) => expect(from).toEqual(points[place]));
      expect(points.at(-1)).toEqual(after);
    }
  });
});

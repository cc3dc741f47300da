import { describe, expect, test } from 'vitest';
import { buildAddBack, buildCovenant, buildLevel, buildYear } from '../covenants/covenant.fixture.ts';
import type { Covenant } from '../covenants/covenant.ts';
import { testCovenant } from '../covenants/testCovenant.ts';
import { decimal } from '../money/decimal.ts';
import { POLICY_VERSION_1 } from '../policy.ts';
import { buildStatement } from '../statements/statement.fixture.ts';
import { bookOf } from '../statements/statementBook.ts';
import { openRows, workedTest } from './workedTest.ts';

const book = bookOf(buildYear('2026-09-30', { ebitda: 12, debt: 45, cash: 6 }), 12);
const worked = (given: Partial<Covenant> = {}, cells: Parameters<typeof workedTest>[3] = []) => {
  const covenant = buildCovenant({ levels: [buildLevel('2025-01-01', null, '3.5')], ...given });
  const tested = testCovenant(covenant, book, '2026-09-30', POLICY_VERSION_1, '2026-11-30');
  return { tested, worked: workedTest(tested, covenant, POLICY_VERSION_1, cells) };
};
const rowOf = (rows: readonly { readonly key: string; readonly formula: string | null }[], key: string) =>
  rows.find((row) => row.key === key);

describe('a test worked out again', () => {
  test('has a formula for every row that is computed', () => {
    const { worked: rows } = worked();
    expect(openRows(rows)).toEqual([]);
    expect(rows.result.at(-1)).toMatchObject({ label: 'Outcome', value: 'met, thin' });
  });

  test('leads from the bridge to the ratio and to the headroom', () => {
    const { worked: rows } = worked();
    expect(rowOf(rows.result, 'tested')?.formula).toBe('{numerator}/{denominator}');
    expect(rowOf(rows.result, 'may_fall')?.formula).toBe('{share_of_level}');
    expect(rowOf(rows.result, 'money_left')?.formula).toBe('{denominator}-{numerator}/{level}');
  });

  test('takes what is over the cap from the cap, before and after', () => {
    for (const addBackCapBasis of ['before', 'after'] as const) {
      const { worked: rows } = worked({
        definition: { ...buildCovenant().definition, addBackCap: decimal('0.1'), addBackCapBasis },
        addBacks: [buildAddBack('2026-09-30', 3, { capped: true })],
      });
      const over = rows.bridge.find(({ label }) => label === 'Add-backs over the cap');
      expect(over?.formula).toContain(addBackCapBasis === 'before' ? '0.1*(' : '0.1/(1-0.1)*(');
      expect(openRows(rows)).toEqual([]);
    }
  });

  test('compares at the decimals that the agreement rounds to', () => {
    const { worked: rows } = worked({ roundingPlaces: 2 });
    expect(rowOf(rows.result, 'compared')?.formula).toBe('ROUND({tested},2)');
  });

  test('says what a unit of the sheet is worth where the cells come to the amount', () => {
    const { tested } = worked();
    const debt = tested.inputs.find(({ line }) => line === 'senior_debt')!;
    const cell = {
      statementId: debt.statementId,
      line: debt.line,
      fileName: 'Figures.xlsx',
      sha256: null,
      sheet: 'Balance',
      cell: 'C9',
      rawText: '0.045',
      number: decimal('0.045'),
    };
    const line = worked({}, [cell]).worked.lines.find(({ cells }) => cells.length > 0);
    expect(line?.factor?.toNumber()).toBe(1_000);
    const other = worked({}, [{ ...cell, number: decimal('0.044') }]).worked.lines;
    expect(other.find(({ cells }) => cells.length > 0)?.factor).toBeNull();
  });

  test('a test without figures has its outcome as recorded', () => {
    const covenant = buildCovenant();
    const awaiting = testCovenant(covenant, bookOf([], 12), '2026-09-30', POLICY_VERSION_1, '2026-11-30');
    const rows = workedTest(awaiting, covenant, POLICY_VERSION_1, []);
    expect(rows.result.at(-1)).toMatchObject({ value: 'awaiting figures', formula: null, isOpen: false });
  });

  test('a cover with nothing to cover has the words of its outcome', () => {
    const covenant = buildCovenant({
      measure: 'current-ratio',
      operator: '>=',
      levels: [buildLevel('2025-01-01', null, '1.2')],
    });
    const nothingDue = bookOf(
      [buildStatement('2026-09-30', 0, { current_assets: 30, current_liabilities: 0 })],
      12,
    );
    const tested = testCovenant(covenant, nothingDue, '2026-09-30', POLICY_VERSION_1, '2026-11-30');
    const outcome = workedTest(tested, covenant, POLICY_VERSION_1, []).result.at(-1);
    expect(outcome?.value).toBe('met, no charge to cover');
    expect(outcome?.formula).toContain(
      'IF({denominator}<=0,IF({numerator}>0,"met, no charge to cover","met, no charge to cover"),',
    );
  });

  test('an outcome that its figures do not decide stands as recorded, with its reason', () => {
    const { tested, worked: rows } = worked({ springing: { trigger: decimal('0.35') } });
    expect(tested.outcome).toBe('cannot be tested');
    expect(rows.result.at(-1)).toMatchObject({
      value: 'cannot be tested',
      formula: null,
      isOpen: false,
      note: tested.reason,
    });
    const misfit = worked({ operator: '>=' }).worked.result.at(-1);
    expect(misfit).toMatchObject({ value: 'cannot be tested', formula: null });
  });

  test('an outcome that its figures leave to the agreement follows from them', () => {
    const covenant = buildCovenant({ levels: [buildLevel('2025-01-01', null, '3.5')] });
    const idle = bookOf(buildYear('2026-09-30', { ebitda: -1, debt: 2, cash: 6 }), 12);
    const tested = testCovenant(covenant, idle, '2026-09-30', POLICY_VERSION_1, '2026-11-30');
    const outcome = workedTest(tested, covenant, POLICY_VERSION_1, []).result.at(-1);
    expect(outcome?.value).toBe('cannot be tested');
    expect(outcome?.formula).toContain('IF({denominator}<=0,IF({numerator}>0,');
  });
});

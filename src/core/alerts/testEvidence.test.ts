import { expect, test } from 'vitest';
import { buildCovenant, buildLevel } from '../covenants/covenant.fixture.ts';
import { testCovenant } from '../covenants/testCovenant.ts';
import { POLICY_VERSION_1 } from '../policy.ts';
import { buildStatement } from '../statements/statement.fixture.ts';
import { bookOf } from '../statements/statementBook.ts';
import { testEvidence } from './testEvidence.ts';

test.each([
  ['capital-expenditure', '<=', 'Tested amount may rise'],
  ['minimum-liquidity', '>=', 'Tested amount may fall'],
] as const)('%s, %s its level: %s', (measure, operator, label) => {
  const levels = [buildLevel('2025-01-01', null, operator === '<=' ? '12' : '4')];
  const covenant = buildCovenant({ measure, operator, levels, firstTestOn: '2025-12-31' });
  const book = bookOf(
    [buildStatement('2025-12-31', 12, { capex: -10 }), buildStatement('2025-12-31', 0, { cash: 5 })],
    12,
  );
  const tested = testCovenant(covenant, book, '2025-12-31', POLICY_VERSION_1, '2026-03-01');
  expect(testEvidence(covenant, tested).map((fact) => fact.label)).toContain(label);
});

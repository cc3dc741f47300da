/**
 * The shape of the program, as a test: who may import whom.
 *
 * Read WALK top to bottom and you have read the data flow. A stage may import the stages
 * above it and nothing below. A failure names both files; the comment says where the code goes.
 */
import { cruise, type IForbiddenRuleType } from 'dependency-cruiser';
import { expect, test } from 'vitest';

/** The computation, in the order a number travels. Stages on one line do not see each other. */
const WALK: readonly (readonly string[])[] = [
  ['money', 'calendar', 'statistics'],
  ['statements'],
  ['measures'],
  ['covenants', 'accruals'],
  ['quality', 'patterns'],
  ['outlook', 'reperformance'],
  ['alerts'],
];

/** Pure packages that core may use: decimals, distributions, matrix decompositions. No I/O, no state. */
const NUMERIC_PACKAGES = ['decimal\\.js', '@stdlib/stats-base-dists[^/]*', 'ml-matrix'];

const walkRules: IForbiddenRuleType[] = WALK.flatMap((stages, depth) =>
  stages.map((stage) => ({
    name: `core/${stage}-looks-only-up`,
    comment: `core/${stage} may import ${WALK.slice(0, depth).flat().join(', ') || 'no other stage'}`,
    severity: 'error',
    from: { path: `^src/core/${stage}/` },
    to: {
      path: '^src/core/[^/]+/',
      pathNot: [stage, ...WALK.slice(0, depth).flat()].map((s) => `^src/core/${s}/`),
    },
  })),
);

const rules: IForbiddenRuleType[] = [
  {
    name: 'no-circular',
    comment: 'split out the part both need',
    severity: 'error',
    from: {},
    to: { circular: true },
  },
  {
    name: 'core-is-pure',
    comment: 'core may import only core and NUMERIC_PACKAGES: take the value as an argument',
    severity: 'error',
    from: { path: '^src/core/', pathNot: '\\.test\\.ts$' },
    to: { pathNot: ['^src/core/', ...NUMERIC_PACKAGES.map((name) => `node_modules/${name}/`)] },
  },
  {
    name: 'islands-reach-no-server-code',
    comment: 'take plain rows as props; types come from src/contracts',
    severity: 'error',
    from: { path: '^src/components/' },
    to: { path: '^src/server/', reachable: true },
  },
  {
    name: 'core-and-contracts-stand-alone',
    severity: 'error',
    from: { path: '^src/(core|contracts)/' },
    to: { path: '^src/(server|pages|components|layouts)/' },
  },
  {
    name: 'one-door-to-decimal',
    comment: 'import Decimal from #core/money/decimal.ts, where its precision is set',
    severity: 'error',
    from: { pathNot: '^src/core/money/' },
    to: { path: 'node_modules/decimal\\.js/' },
  },
  ...walkRules,
];

test('imports run one way', async () => {
  const { output, exitCode } = await cruise(['src', 'jobs', 'seeders'], {
    ruleSet: { forbidden: rules },
    validate: true,
    tsPreCompilationDeps: true,
    outputType: 'err-long',
    doNotFollow: { path: 'node_modules' },
    tsConfig: { fileName: 'tsconfig.json' },
  });
  expect(exitCode, typeof output === 'string' ? output : JSON.stringify(output)).toBe(0);
}, 30_000);

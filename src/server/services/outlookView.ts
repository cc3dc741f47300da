import type {
  BreakEvenView,
  OutlookView,
  ProjectionView,
  ScenarioView,
  SensitivityView,
} from '../../contracts/outlook.ts';
import type { Assessment } from '../../core/assess.ts';
import type { Projection } from '../../core/outlook/projection.ts';
import {
  everyNotMet,
  FACTORS,
  firstNotMet,
  SCENARIOS,
  type BreakEven,
  type Factor,
  type ScenarioName,
  type ScenarioResult,
  type Sensitivity,
} from '../../core/outlook/sensitivity.ts';
import type { ScenarioSizes } from '../../core/policy.ts';

/** Coming tests and sensitivity as the stored result has them; decimals become text here, once. */
export const toOutlookView = ({
  projections,
  sensitivity,
}: Pick<Assessment, 'projections' | 'sensitivity'>): OutlookView => ({
  projections: projections.map(toProjectionView),
  sensitivity: sensitivity && toSensitivityView(sensitivity),
});

const toProjectionView = ({ tests, ...projection }: Projection): ProjectionView => ({
  ...projection,
  tests: tests.map((test) =>
    test.kind === 'nothing to project' ? test : { ...test, level: test.level.toFixed() },
  ),
});

const toSensitivityView = ({ policy, tests }: Sensitivity): SensitivityView => ({
  variableCostShare: policy.variableCostShare.toFixed(),
  floatingDebtShare: policy.floatingDebtShare.toFixed(),
  sizes: {
    'slower sales': toSizes(policy.slowerSales),
    'dearer money': toSizes(policy.dearerMoney),
  },
  tests: tests.map(({ covenantId, testDate, breakEvens, scenarios }) => ({
    covenantId,
    testDate,
    breakEvens: byFactor((factor) => toBreakEven(breakEvens[factor])),
    scenarios: byScenario((name) => toScenario(scenarios[name])),
  })),
  first: byFactor((factor) => {
    const first = firstNotMet(tests, factor);
    return first && { ...first, share: first.share.toFixed(), amount: first.amount?.toFixed() ?? null };
  }),
  every: everyNotMet(tests)?.toFixed() ?? null,
});

const byFactor = <Value>(read: (factor: Factor) => Value): Record<Factor, Value> =>
  Object.fromEntries(FACTORS.map((factor) => [factor, read(factor)])) as Record<Factor, Value>;

const byScenario = <Value>(read: (name: ScenarioName) => Value): Record<ScenarioName, Value> =>
  Object.fromEntries(SCENARIOS.map((name) => [name, read(name)])) as Record<ScenarioName, Value>;

const toSizes = ({ salesFall, workingCapitalLoss, rateRise }: ScenarioSizes) => ({
  salesFall: salesFall.toFixed(),
  workingCapitalLoss: workingCapitalLoss.toFixed(),
  rateRise: rateRise.toFixed(),
});

const toBreakEven = (found: BreakEven): BreakEvenView =>
  found.kind === 'at'
    ? { kind: 'at', share: found.share.toFixed(), amount: found.amount?.toFixed() ?? null }
    : found;

const toScenario = (result: ScenarioResult): ScenarioView =>
  result.kind === 'computed' ? { ...result, tested: result.tested?.toFixed() ?? null } : result;

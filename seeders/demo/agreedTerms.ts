/** A demo covenant in the product's own words. */
import type { CovenantLevel } from '../../src/core/covenants/covenant.ts';
import { PLAIN_DEFINITION } from '../../src/core/measures/definition.ts';
import { measureUnit } from '../../src/core/measures/index.ts';
import { decimal } from '../../src/core/money/decimal.ts';
import type { CovenantTerms } from '../../src/server/db/repositories/covenants.ts';
import type { DemoCovenant } from './demoCovenant.ts';

const THOUSAND = 1_000;

/** Its terms, in the borrower's currency unless the agreement has its own. */
export const termsOf = (agreed: DemoCovenant, borrowerCurrency: string): CovenantTerms => ({
  name: agreed.name,
  clause: agreed.clause,
  measure: agreed.measure,
  operator: agreed.operator,
  roundingPlaces: agreed.roundingPlaces,
  scope: 'group',
  currency: agreed.currency ?? borrowerCurrency,
  firstTestOn: agreed.firstTestOn,
  everyMonths: agreed.everyMonths ?? 3,
  basis: null,
  isOurs: agreed.isOurs ?? false,
  springing: agreed.springingTrigger ? { trigger: decimal(agreed.springingTrigger) } : null,
  cureRights: agreed.cureRights ?? null,
  definition: {
    ...PLAIN_DEFINITION,
    addBackCap: agreed.addBackCap === null ? null : decimal(agreed.addBackCap),
    undrawnCountsAsLiquidity: agreed.measure === 'minimum-liquidity',
    ...agreed.definition,
  },
});

/** Its levels, in whole currency units where they are amounts. */
export const levelsOf = ({ levels, measure }: DemoCovenant): CovenantLevel[] =>
  levels.map(({ from, until, level, isReset = false }) => ({
    from,
    until,
    level: level === null ? null : decimal(level).times(measureUnit(measure) === 'money' ? THOUSAND : 1),
    isReset,
  }));

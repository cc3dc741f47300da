import type { Transaction } from 'sequelize';
import { z } from 'zod';
import type { PlainDate } from '../../../core/calendar/plainDate.ts';
import { decimal, type Decimal } from '../../../core/money/decimal.ts';
import { POLICY_VERSION_1, type Policy, type ScenarioSizes } from '../../../core/policy.ts';
import { execute, select, selectOne } from '../sql.ts';

const FIRST = POLICY_VERSION_1;
const amount = (first: Decimal) =>
  z
    .string()
    .transform((text) => decimal(text))
    .default(first);
const count = (first: number) => z.number().default(first);

const scenario = (first: ScenarioSizes) =>
  z
    .object({
      salesFall: amount(first.salesFall),
      workingCapitalLoss: amount(first.workingCapitalLoss),
      rateRise: amount(first.rateRise),
    })
    .prefault({});

/** A value that came to the policy after a version was stored stands in it as in version 1. */
const stored = z.object({
  version: z.number().int(),
  justPassingBand: amount(FIRST.justPassingBand),
  thinBelow: amount(FIRST.thinBelow),
  repeated: z
    .object({
      atLeast: count(FIRST.repeated.atLeast),
      ofLast: count(FIRST.repeated.ofLast),
      weakBelow: count(FIRST.repeated.weakBelow),
    })
    .prefault({}),
  stepDown: z
    .object({ soonDays: count(FIRST.stepDown.soonDays), noteDays: count(FIRST.stepDown.noteDays) })
    .prefault({}),
  runningOut: z
    .object({
      soonDays: count(FIRST.runningOut.soonDays),
      urgentDays: count(FIRST.runningOut.urgentDays),
    })
    .prefault({}),
  restatedBy: amount(FIRST.restatedBy),
  qualityFell: z.object({ points: count(FIRST.qualityFell.points) }).prefault({}),
  qualityWeakBelow: count(FIRST.qualityWeakBelow),
  outlook: z
    .object({
      variableCostShare: amount(FIRST.outlook.variableCostShare),
      floatingDebtShare: amount(FIRST.outlook.floatingDebtShare),
      slowerSales: scenario(FIRST.outlook.slowerSales),
      dearerMoney: scenario(FIRST.outlook.dearerMoney),
    })
    .prefault({}),
});

/** Decimals print themselves as text. */
export const storedPolicy = (policy: Policy): string => JSON.stringify(policy);

export const readPolicy = (content: string): Policy => stored.parse(JSON.parse(content));

/**
 * The policy in force on a day, as known by an instant. Version 1 is part of the product; the table holds the
 * versions that two persons have put in its place.
 */
export async function policyInForce(tx: Transaction, asOf: PlainDate, knownAt: Date): Promise<Policy> {
  const row = await selectOne<{ content: string }>(
    tx,
    `select content from policies
     where valid_from <= :asOf and (valid_to is null or valid_to >= :asOf)
       and known_from <= :knownAt and (known_to is null or known_to > :knownAt)
     order by version desc limit 1`,
    { asOf, knownAt },
  );
  return row ? readPolicy(row.content) : POLICY_VERSION_1;
}

/** The policy that a result names; version 1 is the product's. */
export async function policyOfVersion(tx: Transaction, version: number): Promise<Policy> {
  const row = await selectOne<{ content: string }>(
    tx,
    'select content from policies where version = :version',
    { version },
  );
  return row ? readPolicy(row.content) : POLICY_VERSION_1;
}

export interface PolicyVersionRecord {
  readonly policy: Policy;
  readonly validFrom: PlainDate;
  readonly confirmedAt: Date;
  readonly proposedBy: string;
  readonly confirmedBy: string;
  readonly reason: string;
}

interface VersionRow extends Omit<PolicyVersionRecord, 'policy'> {
  readonly content: string;
}

/** The versions that two persons have confirmed, the latest first; version 1 is the product's and not among them. */
export async function listPolicyVersions(tx: Transaction): Promise<PolicyVersionRecord[]> {
  const rows = await select<VersionRow>(
    tx,
    `select v.content, v.valid_from as validFrom, v.known_from as confirmedAt,
       coalesce(proposer.name, '') as proposedBy, coalesce(confirmer.name, '') as confirmedBy,
       coalesce(json_value(p.content, '$.reason'), '') as reason
     from policies v
       left join people proposer on proposer.id = v.proposed_by
       left join people confirmer on confirmer.id = v.confirmed_by
       left join proposals p on p.id = v.proposal_id
     order by v.version desc`,
  );
  return rows.map(({ content, ...row }) => ({ ...row, policy: readPolicy(content) }));
}

/** The version confirmed last, whether its day has come or not, and the day: what a further change starts from. */
export async function latestPolicy(
  tx: Transaction,
): Promise<{ readonly policy: Policy; readonly validFrom: PlainDate | null }> {
  const row = await selectOne<{ content: string; validFrom: PlainDate }>(
    tx,
    'select content, valid_from as validFrom from policies order by version desc limit 1',
  );
  return row
    ? { policy: readPolicy(row.content), validFrom: row.validFrom }
    : { policy: POLICY_VERSION_1, validFrom: null };
}

/** The version's number is the key: of two that would be the next, the second is refused. */
export async function insertPolicyVersion(
  tx: Transaction,
  version: {
    readonly policy: Policy;
    readonly validFrom: PlainDate;
    readonly proposalId: number;
    readonly proposedBy: number;
    readonly confirmedBy: number;
    readonly now: Date;
  },
): Promise<void> {
  const { policy, ...rest } = version;
  await execute(
    tx,
    `insert into policies (version, content, valid_from, known_from, proposed_by, confirmed_by, proposal_id)
     values (:version, :content, :validFrom, :now, :proposedBy, :confirmedBy, :proposalId)`,
    { ...rest, version: policy.version, content: storedPolicy(policy) },
  );
}

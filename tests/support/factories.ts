/** A small lender for tests, through the product's own repositories: what matters is named, the rest is ordinary. */
import type { Transaction } from 'sequelize';
import { addDays, addMonthsToMonthEnd, type PlainDate } from '../../src/core/calendar/plainDate.ts';
import type { CovenantLevel } from '../../src/core/covenants/covenant.ts';
import { PLAIN_DEFINITION } from '../../src/core/measures/definition.ts';
import { decimal } from '../../src/core/money/decimal.ts';
import type { LineItemCode } from '../../src/core/statements/lineItems.ts';
import type { Amounts } from '../../src/core/statements/statement.ts';
import type { Person, Role } from '../../src/server/auth/policy.ts';
import { insertBorrower, raiseInputVersion } from '../../src/server/db/repositories/borrowers.ts';
import {
  insertCovenant,
  insertCovenantLevels,
  type CovenantTerms,
} from '../../src/server/db/repositories/covenants.ts';
import { addDeskMember, insertDesk, setDeskHead } from '../../src/server/db/repositories/desks.ts';
import { insertFacility } from '../../src/server/db/repositories/facilities.ts';
import { findLender, insertLender } from '../../src/server/db/repositories/lender.ts';
import { insertPerson } from '../../src/server/db/repositories/people.ts';
import { insertSector } from '../../src/server/db/repositories/sectors.ts';
import { insertStatementVersions } from '../../src/server/db/repositories/statements.ts';

let counted = 0;
const next = (): number => (counted += 1);

export async function buildPerson(
  tx: Transaction,
  given: { roles: readonly Role[]; deskIds?: readonly number[]; name?: string; now: Date },
): Promise<Person> {
  const number = next();
  const name = given.name ?? `Person ${number}`;
  const email = `person${number}@desk.example`;
  const deskIds = given.deskIds ?? [];
  const id = await insertPerson(tx, { name, email, passwordHash: null, roles: given.roles, now: given.now });
  for (const deskId of deskIds) await addDeskMember(tx, deskId, id);
  return { id, name, email, roles: given.roles, deskIds };
}

export interface BuiltDesk {
  readonly id: number;
  readonly name: string;
  readonly head: Person;
  readonly manager: Person;
  readonly analyst: Person;
}

/** A desk with its head, a relationship manager and an analyst; the lender with the first. */
export async function buildDesk(tx: Transaction, now: Date): Promise<BuiltDesk> {
  if (!(await findLender(tx)))
    await insertLender(tx, {
      name: 'Harbour Lending',
      zone: 'Europe/Paris',
      nightAtUtc: '01:30',
      seededOn: null,
    });
  const name = `Desk ${next()}`;
  const id = await insertDesk(tx, { name, headId: null });
  const member = (roles: readonly Role[]) => buildPerson(tx, { roles, deskIds: [id], now });
  const head = await member(['relationship manager']);
  await setDeskHead(tx, id, head.id);
  return {
    id,
    name,
    head,
    manager: await member(['relationship manager']),
    analyst: await member(['analyst']),
  };
}

export interface BuiltBorrower {
  readonly id: number;
  readonly name: string;
  readonly facilityId: number;
}

export async function buildBorrower(
  tx: Transaction,
  desk: BuiltDesk,
  given: { now: Date; name?: string; sectorCode?: string },
): Promise<BuiltBorrower> {
  const number = next();
  const name = given.name ?? `Borrower ${number}`;
  const sectorCode = given.sectorCode ?? '25.6';
  await insertSector(tx, { code: sectorCode, scheme: 'NACE 2.1', label: `Sector ${sectorCode}` });
  const id = await insertBorrower(tx, {
    name,
    legalForm: 'company',
    lei: null,
    isListed: false,
    sectorCode,
    country: 'FR',
    currency: 'EUR',
    fiscalYearEndMonth: 12,
    reportsEveryMonths: 3,
    deskId: desk.id,
    relationshipManagerId: desk.manager.id,
    analystId: desk.analyst.id,
    now: given.now,
  });
  const facilityId = await insertFacility(tx, {
    borrowerId: id,
    name: 'Term loan',
    kind: 'term loan',
    currency: 'EUR',
    limit: decimal('12400000'),
    drawn: decimal('10000000'),
    marginBps: 250,
    startsOn: '2024-01-01',
    maturesOn: '2029-12-31',
    security: 'unsecured',
  });
  return { id, name, facilityId };
}

/** Total leverage of at most 3.50x, tested every quarter from March 2026. */
export async function buildCovenant(
  tx: Transaction,
  borrower: BuiltBorrower,
  given: { knownFrom: Date; terms?: Partial<CovenantTerms>; levels?: readonly CovenantLevel[] },
): Promise<number> {
  const id = await insertCovenant(tx, {
    borrowerId: borrower.id,
    facilityId: borrower.facilityId,
    terms: {
      name: 'Total leverage',
      clause: '21.2(a)',
      measure: 'total-leverage',
      operator: '<=',
      roundingPlaces: null,
      scope: 'group',
      basis: null,
      isOurs: false,
      currency: 'EUR',
      firstTestOn: '2026-03-31',
      everyMonths: 3,
      definition: PLAIN_DEFINITION,
      springing: null,
      cureRights: null,
      ...given.terms,
    },
    validFrom: '2025-01-01',
    knownFrom: given.knownFrom,
  });
  const levels = given.levels ?? [
    { from: '2025-01-01' as const, until: null, level: decimal('3.5'), isReset: false },
  ];
  await insertCovenantLevels(tx, id, levels, given.knownFrom);
  return id;
}

export interface QuarterFigures {
  /** EBITDA of one quarter, in whole euros. */
  readonly ebitda: number;
  readonly debt: number;
}

/** Income, balance sheet and cash flow of quarters up to `last`, which tie: cash takes what is left. */
export async function buildStatements(
  tx: Transaction,
  borrower: Pick<BuiltBorrower, 'id'>,
  given: { last: PlainDate; quarters: readonly QuarterFigures[]; knownFrom: Date; receivedOn?: PlainDate },
): Promise<void> {
  await raiseInputVersion(tx, borrower.id);
  const statements = given.quarters.flatMap((quarter, index) => {
    const periodEnd = addMonthsToMonthEnd(given.last, (index + 1 - given.quarters.length) * 3);
    const shared = {
      periodEnd,
      currency: 'EUR',
      roundingUnit: decimal(1),
      tie: 'ties' as const,
      cells: [],
      receivedOn: given.receivedOn ?? addDays(periodEnd, 40),
    };
    const flows = amounts(flowsOf(quarter));
    const balances = amounts(balancesOf(quarter));
    const periodStart = addDays(addMonthsToMonthEnd(periodEnd, -3), 1);
    return [
      { ...shared, periodStart, months: 3, amounts: flows },
      { ...shared, periodStart: periodEnd, months: 0, amounts: balances },
    ];
  });
  await insertStatementVersions(
    tx,
    {
      borrowerId: borrower.id,
      importId: null,
      basis: 'management',
      scope: 'group',
      framework: 'IFRS',
      knownFrom: given.knownFrom,
    },
    statements,
  );
}

type Figures = Partial<Record<LineItemCode, number>>;

function flowsOf({ ebitda }: QuarterFigures): Figures {
  const [revenue, depreciation, interest] = [10_000_000, 250_000, 150_000];
  const ebit = ebitda - depreciation;
  const beforeTax = ebit - interest;
  const tax = Math.max(0, Math.round(beforeTax * 0.25));
  return {
    revenue,
    cogs: revenue - ebitda,
    ebit,
    depreciation,
    interest_expense: interest,
    profit_before_tax: beforeTax,
    income_tax: tax,
    net_income: beforeTax - tax,
    cfo: beforeTax - tax + depreciation,
    capex: -200_000,
    interest_paid: -interest,
    tax_paid: -tax,
  };
}

function balancesOf({ debt }: QuarterFigures): Figures {
  const [cash, receivables, inventory, property] = [2_000_000, 5_000_000, 4_000_000, 20_000_000];
  const [payables, shortTerm] = [3_000_000, 1_000_000];
  const assets = cash + receivables + inventory + property;
  const liabilities = payables + debt;
  return {
    cash,
    receivables,
    inventory,
    current_assets: cash + receivables + inventory,
    ppe_gross: property + 5_000_000,
    ppe_net: property,
    total_assets: assets,
    payables,
    short_term_debt: shortTerm,
    current_liabilities: payables + shortTerm,
    senior_debt: debt - shortTerm,
    total_liabilities: liabilities,
    equity: assets - liabilities,
  };
}

const amounts = (figures: Figures): Amounts =>
  Object.fromEntries(Object.entries(figures).map(([line, value]) => [line, decimal(value)]));

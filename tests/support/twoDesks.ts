/**
 * Two desks with a borrower each and everything that a route can name, and a person of every role: what a test of
 * rights needs. All names are new with every call, so that a seeded product does not get in the way.
 */
import { randomBytes, randomUUID } from 'node:crypto';
import type { Transaction } from 'sequelize';
import type { Role } from '../../src/server/auth/policy.ts';
import { hashPassword } from '../../src/server/auth/passwords.ts';
import { inTransaction } from '../../src/server/db/inTransaction.ts';
import { addDeskMember, insertDesk, setDeskHead } from '../../src/server/db/repositories/desks.ts';
import { insertPerson } from '../../src/server/db/repositories/people.ts';
import { decimal } from '../../src/core/money/decimal.ts';
import { insertFacility } from '../../src/server/db/repositories/facilities.ts';
import { execute } from '../../src/server/db/sql.ts';
import { systemActor } from '../../src/server/services/actor.ts';
import { assessWithin } from '../../src/server/services/assessBorrower.ts';
import { buildCovenant } from './factories.ts';

export const PASSWORD = 'kettle marble fathom osier';

export interface TestPerson {
  readonly id: number;
  readonly name: string;
  readonly email: string;
}

/** What stands on one desk; each is named by its id. */
export interface DeskThings {
  readonly desk: number;
  readonly analyst: TestPerson;
  /** Relationship manager and head of the desk. */
  readonly manager: TestPerson;
  readonly borrower: number;
  readonly borrowerName: string;
  /** Taken by the manager, who owns it. */
  readonly alert: number;
  readonly alertWaitingForAnalyst: number;
  /** Its closing waits for a second person; the analyst asked for it. */
  readonly alertToConfirm: number;
  readonly proposal: number;
  readonly import: number;
  readonly statement: number;
  /** Assessed; its latest test is of 30 September 2026. */
  readonly covenant: number;
}

export interface TwoDesks {
  readonly north: DeskThings;
  readonly south: DeskThings;
  /** People without a desk. */
  readonly committee: TestPerson;
  readonly administrator: TestPerson;
  readonly auditor: TestPerson;
}

export async function makeTwoDesks(): Promise<TwoDesks> {
  const passwordHash = await hashPassword(PASSWORD);
  const now = new Date();
  return inTransaction(async (tx) => {
    const person = (role: Role) => makePerson(tx, role, passwordHash, now);
    return {
      north: await makeDesk(tx, passwordHash, now),
      south: await makeDesk(tx, passwordHash, now),
      committee: await person('committee member'),
      administrator: await person('administrator'),
      auditor: await person('auditor'),
    };
  });
}

/** A person with one role and no desk, who signs in with PASSWORD. */
export async function makePersonAlone(role: Role): Promise<TestPerson> {
  const passwordHash = await hashPassword(PASSWORD);
  return inTransaction((tx) => makePerson(tx, role, passwordHash, new Date()));
}

async function makePerson(tx: Transaction, role: Role, passwordHash: string, now: Date): Promise<TestPerson> {
  const tag = randomBytes(4).toString('hex');
  const name = `Test ${role} ${tag}`;
  const email = `${role.replaceAll(' ', '.')}.${tag}@lender.example`;
  const id = await insertPerson(tx, { name, email, passwordHash, roles: [role], now });
  return { id, name, email };
}

async function makeDesk(tx: Transaction, passwordHash: string, now: Date): Promise<DeskThings> {
  const tag = randomBytes(4).toString('hex');
  const desk = await insertDesk(tx, { name: `Test desk ${tag}`, headId: null });
  const analyst = await makePerson(tx, 'analyst', passwordHash, now);
  const manager = await makePerson(tx, 'relationship manager', passwordHash, now);
  for (const member of [analyst, manager]) await addDeskMember(tx, desk, member.id);
  await setDeskHead(tx, desk, manager.id);
  const borrowerName = `Fathom Works ${tag}`;
  const borrower = await makeBorrower(tx, { name: borrowerName, desk, analyst, manager, now });
  // Assessed before there are alerts, so that none of them closes by itself.
  const covenant = await makeAssessedCovenant(tx, borrower, now);
  const alert = (kind: string, state: string, closedBy: number | null) =>
    makeAlert(tx, { desk, borrower, owner: manager.id, kind, state, closedBy, now });
  return {
    desk,
    analyst,
    manager,
    borrower,
    borrowerName,
    alert: await alert('thin headroom', 'taken', null),
    alertWaitingForAnalyst: await alert('test not met', 'waiting for analyst', null),
    alertToConfirm: await alert('step-down ahead', 'closing to be confirmed', analyst.id),
    proposal: await makeProposal(tx, { desk, borrower, proposer: analyst.id, now }),
    import: await makeImport(tx, { borrower, uploader: analyst.id, now }),
    statement: await makeStatement(tx, borrower, now),
    covenant,
  };
}

async function makeAssessedCovenant(tx: Transaction, borrower: number, now: Date): Promise<number> {
  const facilityId = await insertFacility(tx, {
    borrowerId: borrower,
    name: 'Term loan',
    kind: 'term loan',
    currency: 'EUR',
    limit: decimal(12_000_000),
    drawn: decimal(10_000_000),
    marginBps: 250,
    startsOn: '2024-01-01',
    maturesOn: '2029-12-31',
    security: 'unsecured',
  });
  const id = await buildCovenant(tx, { id: borrower, name: '', facilityId }, { knownFrom: now });
  const assessed = await assessWithin(tx, systemActor('two-desks', now), borrower, {
    runId: null,
    knownAt: now,
    asOf: '2026-12-01',
  });
  if (!assessed.ok) throw new Error('the borrower of the tests could not be assessed');
  return id;
}

async function insert(
  tx: Transaction,
  table: string,
  row: Record<string, string | number | Date | null>,
): Promise<number> {
  const columns = Object.keys(row);
  const { insertId } = await execute(
    tx,
    `insert into ${table} (${columns.join(', ')}) values (${columns.map((column) => `:${column}`).join(', ')})`,
    row,
  );
  return insertId;
}

async function makeBorrower(
  tx: Transaction,
  facts: { name: string; desk: number; analyst: TestPerson; manager: TestPerson; now: Date },
): Promise<number> {
  await execute(
    tx,
    `insert ignore into sectors (code, scheme, label) values ('T1', 'test', 'Sector of the tests')`,
  );
  const id = await insert(tx, 'borrowers', {
    name: facts.name,
    legal_form: 'company',
    sector_code: 'T1',
    country: 'NL',
    currency: 'EUR',
    fiscal_year_end_month: 12,
    reports_every_months: 3,
    desk_id: facts.desk,
    relationship_manager_id: facts.manager.id,
    analyst_id: facts.analyst.id,
    created_at: facts.now,
  });
  await execute(tx, 'insert into borrower_input_versions (borrower_id) values (:id)', { id });
  return id;
}

const makeAlert = (
  tx: Transaction,
  facts: {
    desk: number;
    borrower: number;
    owner: number;
    kind: string;
    state: string;
    closedBy: number | null;
    now: Date;
  },
): Promise<number> =>
  insert(tx, 'alerts', {
    borrower_id: facts.borrower,
    desk_id: facts.desk,
    kind: facts.kind,
    severity: 'soon',
    state: facts.state,
    open_slot: `test:${randomUUID()}`,
    fact_date: '2026-09-30',
    sentence: 'A sentence of the tests.',
    would_change: 'A number of the tests.',
    evidence: '[]',
    owner_id: facts.owner,
    taken_by: facts.owner,
    taken_at: facts.now,
    due_on: '2027-01-15',
    raised_at: facts.now,
    changed_at: facts.now,
    changed_how: 'raised',
    closed_by: facts.closedBy,
    closing_reason: facts.closedBy === null ? null : 1,
    closing_text: facts.closedBy === null ? null : 'Asked for by the tests.',
    change_number: 1,
  });

const makeProposal = (
  tx: Transaction,
  facts: { desk: number; borrower: number; proposer: number; now: Date },
): Promise<number> =>
  insert(tx, 'proposals', {
    kind: 'watchlist',
    borrower_id: facts.borrower,
    desk_id: facts.desk,
    subject_kind: 'borrower',
    subject_id: facts.borrower,
    content: JSON.stringify({
      borrowerId: facts.borrower,
      alertId: null,
      change: 'entry',
      grade: 'W1',
      reason: 'A reason of the tests',
      ownerId: facts.proposer,
      plan: 'A plan of the tests',
      nextReviewOn: '2027-03-31',
    }),
    state: 'proposed',
    open_slot: `watchlist:${facts.borrower}`,
    proposed_by: facts.proposer,
    proposed_at: facts.now,
  });

async function makeImport(
  tx: Transaction,
  facts: { borrower: number; uploader: number; now: Date },
): Promise<number> {
  const sha256 = randomBytes(32).toString('hex');
  await insert(tx, 'files', {
    sha256,
    size_bytes: 1,
    media_type: 'application/vnd.openxmlformats-officedocument.spreadsheetml.sheet',
    stored_at: facts.now,
  });
  const reading = {
    outcome: 'questions',
    refusal: null,
    currency: null,
    unit: null,
    sheets: [],
    placements: [],
    facts: [],
    questions: [],
    notes: [],
    checks: [],
    layoutKey: sha256,
  };
  return insert(tx, 'imports', {
    borrower_id: facts.borrower,
    file_sha256: sha256,
    file_name: 'figures.xlsx',
    state: 'draft',
    open_slot: `test:${randomUUID()}`,
    layout_key: sha256,
    reading: JSON.stringify(reading),
    open_questions: 0,
    periods: 0,
    uploaded_by: facts.uploader,
    uploaded_at: facts.now,
  });
}

async function makeStatement(tx: Transaction, borrower: number, now: Date): Promise<number> {
  const id = await insert(tx, 'statements', {
    borrower_id: borrower,
    period_start: '2026-07-01',
    period_end: '2026-09-30',
    months: 3,
    days: 92,
    basis: 'management',
    scope: 'group',
    framework: 'IFRS',
    currency: 'EUR',
    rounding_unit: '1000',
    tie: 'ties',
    statement_version: 1,
    received_on: '2026-11-01',
    known_from: now,
    revenue: '1000000.0000',
  });
  await insert(tx, 'statement_cells', {
    statement_id: id,
    line: 'revenue',
    part_no: 1,
    sheet: 'Income statement',
    cell: 'B4',
    raw_text: '1,000',
    label: 'Revenue',
  });
  return id;
}

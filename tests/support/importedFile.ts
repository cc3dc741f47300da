/** A borrower's pack of four quarters, a desk that imports it, and a folder for what is kept. */
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import type { StatementView } from '../../src/contracts/borrowers.ts';
import type { ImportAcceptance, ImportView } from '../../src/contracts/imports.ts';
import type { Person } from '../../src/server/auth/policy.ts';
import { inTransaction } from '../../src/server/db/inTransaction.ts';
import { acceptImport } from '../../src/server/services/acceptImport.ts';
import { showImport } from '../../src/server/services/listImports.ts';
import { listStatements } from '../../src/server/services/listStatements.ts';
import { stageImport } from '../../src/server/services/stageImport.ts';
import { acting, done } from './acting.ts';
import {
  buildBorrower,
  buildCovenant,
  buildDesk,
  buildPerson,
  type BuiltBorrower,
  type BuiltDesk,
} from './factories.ts';
import { rows } from './nightBook.ts';
import { tyingPeriod } from './tyingFigures.ts';
import { buildWorkbook, type BorrowerWorkbook, type WorkbookPeriod } from './workbooks.ts';

/** Before the first file is kept: the folder is opened once. Answers how it is cleared away. */
export function useOwnFolder(): () => void {
  const folder = mkdtempSync(join(tmpdir(), 'underkeel-files-'));
  process.env['DATA_DIR'] = folder;
  return () => rmSync(folder, { recursive: true });
}

/** Twelve months to September 2026; every quarter ties by itself. */
export const QUARTERS: readonly WorkbookPeriod[] = [
  tyingPeriod('2025-12-31', 12_100_000, 2_000_000),
  tyingPeriod('2026-03-31', 12_200_000, 2_100_000),
  tyingPeriod('2026-06-30', 12_400_000, 2_150_000),
  tyingPeriod('2026-09-30', 12_910_000, 2_300_000),
];

export const pack = (over: Partial<BorrowerWorkbook> = {}): Promise<Buffer> =>
  buildWorkbook({ borrower: 'Fathom Works', periods: QUARTERS, ...over });

export const MANAGEMENT_GROUP: ImportAcceptance = { basis: 'management', scope: 'group' };

export const RECEIVED = new Date('2026-11-20T10:00:00Z');

/** Two analysts of one desk, and one of another. */
export interface ImportDesk {
  readonly desk: BuiltDesk;
  readonly analyst: Person;
  readonly colleague: Person;
  readonly stranger: Person;
}

export const buildImportDesk = (): Promise<ImportDesk> =>
  inTransaction(async (tx) => {
    const desk = await buildDesk(tx, RECEIVED);
    const colleague = { roles: ['analyst'], deskIds: [desk.id], name: 'Colleague', now: RECEIVED } as const;
    return {
      desk,
      analyst: desk.analyst,
      colleague: await buildPerson(tx, colleague),
      stranger: (await buildDesk(tx, RECEIVED)).analyst,
    };
  });

export const newBorrower = (desk: BuiltDesk): Promise<BuiltBorrower> =>
  inTransaction((tx) => buildBorrower(tx, desk, { now: RECEIVED }));

/** The import as its page shows it to the person who sent the file. */
export async function staged(
  person: Person,
  borrower: { readonly id: number },
  bytes: Buffer,
  now = RECEIVED,
): Promise<ImportView> {
  const file = { borrowerId: borrower.id, fileName: 'Figures.xlsx', bytes };
  return shown(person, done(await stageImport(acting(person, now), file)).id);
}

export const shown = async (person: Person, id: number): Promise<ImportView> =>
  done(await showImport(acting(person, RECEIVED), id));

export const accepted = (
  person: Person,
  view: { readonly id: number; readonly version: number },
  now = RECEIVED,
): ReturnType<typeof acceptImport> =>
  acceptImport(acting(person, now), { id: view.id, version: view.version }, MANAGEMENT_GROUP);

export const statementsOf = async (
  person: Person,
  borrower: BuiltBorrower,
): Promise<readonly StatementView[]> =>
  done(await listStatements(acting(person, RECEIVED), borrower.id)).statements;

export const inputVersionOf = async (borrower: BuiltBorrower): Promise<number> =>
  (
    await rows<{ version: number }>(
      'select input_version as version from borrower_input_versions where borrower_id = :id',
      { id: borrower.id },
    )
  )[0]?.version ?? 0;

export const assessmentCountOf = async (borrower: BuiltBorrower): Promise<number> =>
  (await rows('select id from assessments where borrower_id = :id', { id: borrower.id })).length;

/** Total leverage of at most 3.50x; EBITDA of the four quarters is 18 % of 49.61 million, debt 70 % of 12.91 million. */
export async function borrowerWithCovenant(desk: BuiltDesk): Promise<BuiltBorrower> {
  const borrower = await newBorrower(desk);
  await inTransaction((tx) => buildCovenant(tx, borrower, { knownFrom: RECEIVED }));
  return borrower;
}

/** By hand: 0.7 × 12,910,000 = 9,037,000 of debt over 0.18 × 49,610,000 = 8,929,800 of EBITDA. */
export const LEVERAGE = 9_037_000 / 8_929_800;

/** June restated from 12.4 million of revenue: its EBITDA moves that of the twelve months by more than 2 %. */
export const restatedPack = (): Promise<Buffer> =>
  pack({
    periods: QUARTERS.map((period) =>
      period.end === '2026-06-30' ? tyingPeriod('2026-06-30', 10_400_000, 2_150_000) : period,
    ),
  });

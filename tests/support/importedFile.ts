/** A borrower's pack of four quarters, a desk that imports it, and a folder for what is kept. */
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import type { ImportAcceptance, ImportView } from '../../src/contracts/imports.ts';
import type { Person } from '../../src/server/auth/policy.ts';
import { inTransaction } from '../../src/server/db/inTransaction.ts';
import { showImport } from '../../src/server/services/listImports.ts';
import { stageImport } from '../../src/server/services/stageImport.ts';
import { acting, done } from './acting.ts';
import { buildBorrower, buildDesk, buildPerson, type BuiltBorrower, type BuiltDesk } from './factories.ts';
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

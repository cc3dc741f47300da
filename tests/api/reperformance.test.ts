/** The re-performance workbook, computed again by LibreOffice: its formulas come to the product's own figures. */
import { execFile } from 'node:child_process';
import { mkdtemp, readdir, readFile, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { promisify } from 'node:util';
import ExcelJS from 'exceljs';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import type { BorrowerRow, BorrowerView, CovenantView } from '../../src/contracts/borrowers.ts';
import { spokenTest } from '../../src/core/covenants/spokenTest.ts';
import type { Client } from '../support/client.ts';
import { signInAs } from '../support/demo.ts';

/** Fewer than the exports a person may take in a minute. */
const MOST_WORKBOOKS = 24;
const RECALCULATES = 180_000;

interface Asked {
  readonly name: string;
  readonly path: string;
  readonly outcome: string;
}

let folder: string;
let asked: readonly Asked[];
let books: ReadonlyMap<string, ExcelJS.Workbook>;

beforeAll(async () => {
  folder = await mkdtemp(join(tmpdir(), 'reperformance-'));
  const committee = await signInAs('committee');
  asked = await testsToWork(committee);
  await Promise.all(
    asked.map((one, place) => takeWorkbook(committee, one, join(folder, `test-${place}.xlsx`))),
  );
  books = await recalculated(folder);
}, RECALCULATES);
afterAll(() => rm(folder, { recursive: true }));

/** A test of every measure and every outcome that the demo desk has. */
async function testsToWork(client: Client): Promise<readonly Asked[]> {
  const list = (await (await client.send('/api/v1/borrowers?perPage=100')).json()) as { rows: BorrowerRow[] };
  const kinds = new Map<string, Asked>();
  for (const { id } of list.rows) {
    const view = (await (await client.send(`/api/v1/borrowers/${id}`)).json()) as BorrowerView;
    for (const covenant of view.covenants) {
      const shown = spokenTest(covenant.tests);
      if (!shown) continue;
      for (const kind of kindsOf(covenant, shown.outcome))
        if (!kinds.has(kind))
          kinds.set(kind, {
            name: `${kind}: ${view.name}, ${covenant.name}`,
            path: `/api/v1/borrowers/${id}/covenants/${covenant.id}/tests/${shown.testDate}`,
            outcome: shown.outcome,
          });
    }
  }
  return [...kinds.values()].slice(0, MOST_WORKBOOKS);
}

const kindsOf = ({ measure, bridge }: CovenantView, outcome: string): readonly string[] => [
  measure,
  outcome,
  ...(bridge.some(({ kind }) => kind === 'disallowed') ? ['add-backs over the cap'] : []),
];

async function takeWorkbook(client: Client, { path }: Asked, file: string): Promise<void> {
  const answer = await client.send(path);
  expect(answer.status).toBe(200);
  await writeFile(file, new Uint8Array(await answer.arrayBuffer()));
}

/** All at once, with settings of its own: a LibreOffice that somebody has open is left alone. */
async function recalculated(from: string): Promise<ReadonlyMap<string, ExcelJS.Workbook>> {
  const to = join(from, 'recalculated');
  const files = (await readdir(from)).map((name) => join(from, name));
  await promisify(execFile)(
    'soffice',
    [
      `-env:UserInstallation=file://${join(from, 'settings')}`,
      '--headless',
      '--convert-to',
      'xlsx',
      '--outdir',
      to,
      ...files,
    ],
    { timeout: RECALCULATES },
  );
  const read = await Promise.all(
    files.map(async (_file, place): Promise<[string, ExcelJS.Workbook]> => {
      const workbook = new ExcelJS.Workbook();
      await workbook.xlsx.load((await readFile(join(to, `test-${place}.xlsx`))).buffer);
      return [`test-${place}`, workbook];
    }),
  );
  return new Map(read);
}

/** Value of a cell; of a formula what LibreOffice made of it. */
function valueOf(cell: ExcelJS.Cell): ExcelJS.CellValue {
  const { value } = cell;
  return value !== null && typeof value === 'object' && 'formula' in value ? (value.result ?? null) : value;
}

const textOf = (value: ExcelJS.CellValue | undefined): string =>
  typeof value === 'string' ? value : JSON.stringify(value ?? null);

const columnsOf = (sheet: ExcelJS.Worksheet, columns: readonly number[]) => {
  const rows: ExcelJS.CellValue[][] = [];
  sheet.eachRow((row, at) => {
    if (at > 4) rows.push(columns.map((column) => valueOf(row.getCell(column))));
  });
  return rows;
};

describe('a re-performance workbook', () => {
  test('exists for every measure of the demo desk', () => {
    expect(asked.length).toBeGreaterThanOrEqual(5);
  });

  test('has no difference between what it works out and what the product computed', () => {
    for (const [place, workbook] of [...books.values()].entries()) {
      const rows = columnsOf(workbook.getWorksheet('Test')!, [1, 4]);
      const differences = // The foot is one cell over all columns.
        rows.filter(([label, difference]) => difference !== null && difference !== label);
      expect(differences.length).toBeGreaterThan(0);
      for (const [label, difference] of differences)
        expect(difference, `${asked[place]!.name}: ${textOf(label)}`).toBe('same');
    }
  });

  test('works out every row that the product computed', () => {
    for (const [place, workbook] of [...books.values()].entries()) {
      const open = columnsOf(workbook.getWorksheet('Test')!, [1, 5]).filter(([, note]) =>
        textOf(note).includes('not worked out here'),
      );
      expect(open, asked[place]!.name).toEqual([]);
    }
  });

  test('starts from the cells of the borrower’s file', () => {
    const fromCells = [...books.values()].flatMap((workbook) =>
      columnsOf(workbook.getWorksheet('Lines')!, [4, 7]).filter(([unit]) => typeof unit === 'number'),
    );
    expect(fromCells.length).toBeGreaterThan(0);
    for (const [, difference] of fromCells) expect(difference).toBe('same');
  });

  test(
    'another figure in a cell gives another outcome',
    async () => {
      const place = asked.findIndex(({ outcome }) => outcome === 'met');
      const workbook = new ExcelJS.Workbook();
      const original = await readFile(join(folder, `test-${place}.xlsx`));
      await workbook.xlsx.load(original.buffer);
      const sheet = workbook.getWorksheet('Test')!;
      const level = columnsOf(sheet, [1]).findIndex(([label]) => label === 'Level in force') + 5;
      const operatorIsMost = textOf(sheet.getCell(1, 1).value).includes('most');
      sheet.getCell(level, 2).value = operatorIsMost ? 0.001 : 1e15;
      const changed = await mkdtemp(join(tmpdir(), 'reperformance-'));
      await writeFile(join(changed, 'test-0.xlsx'), new Uint8Array(await workbook.xlsx.writeBuffer()));
      const [again] = [...(await recalculated(changed)).values()];
      await rm(changed, { recursive: true });
      const outcome = columnsOf(again!.getWorksheet('Test')!, [1, 2]).find(([label]) => label === 'Outcome');
      expect(outcome?.[1]).toBe('not met');
    },
    RECALCULATES,
  );
});

/** The demo desk as the product itself sees it: laid out once, and every story told by the night that assesses it. */
import '../support/useDatabase.ts';
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import ExcelJS from 'exceljs';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { BORROWER_ROWS, type Scenario } from '../../seeders/demo/borrowerTable.ts';
import { layOutDemoDesk } from '../../seeders/layOutDemoDesk.ts';
import { runFirstNight } from '../../seeders/runFirstNight.ts';
import { workTheFirstMorning } from '../../seeders/workTheFirstMorning.ts';
import { storedFiles } from '../../src/server/files/storedFiles.ts';
import { closeDatabase } from '../../src/server/db/connection.ts';
import { rows } from '../support/nightBook.ts';
import { useOwnDatabase } from '../support/ownDatabase.ts';

const LAID_OUT = { seedDay: '2026-12-01', now: new Date('2026-12-01T06:00:00Z') } as const;
const FIRST_NIGHT = { businessDate: '2026-11-30', now: LAID_OUT.now } as const;

const folder = mkdtempSync(join(tmpdir(), 'demo-desk-'));
process.env['DATA_DIR'] = folder;

beforeAll(async () => {
  await useOwnDatabase();
  expect((await layOutDemoDesk(LAID_OUT)).ok).toBe(true);
  expect(await runFirstNight(FIRST_NIGHT)).toBe(true);
});
afterAll(async () => {
  await closeDatabase();
  rmSync(folder, { recursive: true });
});

interface Raised {
  readonly name: string;
  readonly kind: string;
  readonly severity: string;
}

const raisedBy = async (scenario: Scenario): Promise<Map<string, string[]>> => {
  const found = await rows<Raised>(
    'select b.name, a.kind, a.severity from alerts a join borrowers b on b.id = a.borrower_id order by a.kind',
  );
  return new Map(
    BORROWER_ROWS.filter((row) => row.scenario === scenario).map(({ name }) => [
      name,
      found.filter((alert) => alert.name === name).map(({ kind, severity }) => `${kind}: ${severity}`),
    ]),
  );
};
const isOfQuality = (alert: string): boolean => alert.startsWith('reporting quality');

/** Alerts about quality stand apart: a healthy borrower may be an outlier among peers. */
test.each([
  ['healthy', []],
  ['growing fast', []],
  ['seasonal', []],
  ['net cash', []],
  ['covenant holiday', []],
  ['quality fell', []],
  ['thin headroom', ['thin headroom: soon']],
  ['thin current ratio', ['thin headroom: soon']],
  ['thin liquidity', ['thin headroom: soon']],
  [
    'just passing on add-backs',
    [
      'headroom shrinking: soon',
      'just passing, repeated: soon',
      'met only with add-backs: soon',
      'step-down ahead: soon',
      'thin headroom: soon',
    ],
  ],
  ['met only with add-backs', ['met only with add-backs: soon']],
  ['not met and waived', ['test not met: urgent']],
  ['interest cover not met', ['test not met: urgent']],
  ['ratio without meaning', ['test not met: urgent']],
  ['restated', ['prior figures restated: soon']],
  ['step-down ahead', ['step-down ahead: soon']],
  ['step-down later', ['step-down ahead: note']],
  ['late', ['statement late: soon']],
  ['in cure period', ['test not met: urgent', 'waiver, cure running out: urgent']],
  ['cured by its owners', []],
  ['cured by the next test', []],
  ['springing revolver', []],
  ['our own triggers', ['past our trigger: soon']],
  ['late within grace', ['statement late: note']],
] as const satisfies readonly (readonly [Scenario, readonly string[]])[])(
  'a borrower that is "%s" has the alerts of its story and no others',
  async (scenario, expected) => {
    const raised = await raisedBy(scenario);
    expect(raised.size).toBeGreaterThan(0);
    for (const [name, alerts] of raised)
      expect(
        alerts.filter((alert) => !isOfQuality(alert)),
        name,
      ).toEqual(expected);
  },
);

test('reporting quality fell where receivables ran away, and needs explanation where tests are just passed', async () => {
  for (const alerts of (await raisedBy('quality fell')).values())
    expect(alerts).toContain('reporting quality fell: soon');
  const justPassing = await rows<{ band: string | null }>(
    `select a.quality_band as band from assessments a join borrowers b on b.id = a.borrower_id
     where b.name = 'Ostervane Metallbau GmbH'`,
  );
  expect(justPassing).toEqual([{ band: 'needs explanation' }]);
  for (const scenario of ['growing fast', 'seasonal'] as const)
    for (const alerts of (await raisedBy(scenario)).values()) expect(alerts.filter(isOfQuality)).toEqual([]);
});

test('every outcome that a desk meets is there', async () => {
  const outcomes = (await rows<{ outcome: string }>('select distinct outcome from test_results')).map(
    ({ outcome }) => outcome,
  );
  expect(outcomes.toSorted()).toEqual([
    'above our trigger',
    'awaiting figures',
    'cannot be tested',
    'cured',
    'met',
    'met, net cash',
    'met, no charge to cover',
    'met, thin',
    'not met',
    'not met, in cure period',
    'not met, ratio has no meaning',
    'not met, waived',
    'not tested',
  ]);
});

test('a project vehicle has no score, everybody else has one', async () => {
  const unscored = await rows<{ legalForm: string }>(
    `select b.legal_form as legalForm from borrowers b join current_assessments c on c.borrower_id = b.id
     join assessments a on a.id = c.assessment_id where a.quality_headline is null`,
  );
  expect(unscored).toEqual([{ legalForm: 'property or project vehicle' }]);
});

test('every amount of a borrower stands in the cell of the kept workbook that it names', async () => {
  const [source] = await rows<{ importId: number; sha256: string }>(
    `select i.id as importId, i.file_sha256 as sha256 from imports i join borrowers b on b.id = i.borrower_id
     where b.name like 'Ostervane%'`,
  );
  const bytes = source && (await storedFiles().get(source.sha256));
  if (!bytes) throw new Error('the workbook is not kept');
  const workbook = new ExcelJS.Workbook();
  await workbook.xlsx.load(new Uint8Array(bytes).buffer);

  const statements = await rows<Record<string, string | null> & { id: number }>(
    'select * from statements where import_id = :importId',
    { importId: source.importId },
  );
  const cells = await rows<{ statementId: number; line: string; sheet: string; cell: string; label: string }>(
    `select c.statement_id as statementId, c.line, c.sheet, c.cell, c.label
     from statement_cells c join statements s on s.id = c.statement_id where s.import_id = :importId`,
    { importId: source.importId },
  );
  // Eighteen quarters, a balance sheet and the flows of each.
  expect(statements).toHaveLength(36);
  expect(cells.length).toBeGreaterThan(700);
  for (const { statementId, line, sheet, cell, label } of cells) {
    const worksheet = workbook.getWorksheet(sheet);
    const inThousands = worksheet?.getCell(cell).value;
    const amount = statements.find(({ id }) => id === statementId)?.[line];
    expect(Number(amount), `${sheet} ${cell}`).toBe(Number(inThousands) * 1_000);
    expect(worksheet?.getCell(`A${cell.slice(1)}`).value).toBe(label);
  }
});

test('laid out again, nothing changes and the reason is given', async () => {
  const count = () =>
    rows<{ entries: number; borrowers: number; statements: number }>(
      `select (select count(*) from audit_entries) as entries, (select count(*) from borrowers) as borrowers,
         (select count(*) from statements) as statements`,
    );
  const before = await count();
  const again = await layOutDemoDesk({ ...LAID_OUT, seedDay: '2027-06-01' });
  expect(again).toMatchObject({ ok: false, error: { kind: 'conflict' } });
  expect(await runFirstNight(FIRST_NIGHT)).toBe(false);
  expect(await count()).toEqual(before);
  expect(before).toEqual([{ ...before[0], borrowers: 60 }]);
});

test('the first morning leaves an alert taken, one closed, and one borrower on the watchlist by two persons', async () => {
  await workTheFirstMorning(LAID_OUT.now);
  const states = await rows<{ state: string; count: number }>(
    `select state, count(*) as count from alerts where state <> 'raised' group by state order by state`,
  );
  expect(states).toEqual([
    { state: 'carried into a proposal', count: 1 },
    { state: 'closed', count: 1 },
    { state: 'taken', count: 1 },
  ]);
  const entries = await rows<{ grade: string; byTwo: number }>(
    `select w.grade, p.proposed_by <> p.decided_by as byTwo
     from watchlist_entries w join proposals p on p.id = w.proposal_id`,
  );
  expect(entries).toEqual([{ grade: 'W2', byTwo: 1 }]);
});

import type { Transaction } from 'sequelize';
import type { NamedTest } from '../../contracts/ids.ts';
import { formatDay } from '../../core/calendar/printDay.ts';
import { covenantInWords, levelInWords, OPERATOR_WORDS } from '../../core/covenants/wording.ts';
import type { Covenant } from '../../core/covenants/covenant.ts';
import type { CovenantTest } from '../../core/covenants/covenantTest.ts';
import type { Decimal } from '../../core/money/decimal.ts';
import { workedTest } from '../../core/reperformance/workedTest.ts';
import type { SourceCell } from '../../core/reperformance/worked.ts';
import { err, ok } from '../../core/result.ts';
import { isLineItemCode } from '../../core/statements/lineItems.ts';
import { countTry, REVIEW_EXPORTS } from '../auth/limits.ts';
import { deskScope } from '../auth/policy.ts';
import { findCurrentAssessment, type StoredAssessment } from '../db/repositories/assessments.ts';
import { findBorrower } from '../db/repositories/borrowers.ts';
import { loadCovenants } from '../db/repositories/covenantInputs.ts';
import { policyInForce } from '../db/repositories/policies.ts';
import { listFigureSources } from '../db/repositories/reviewSheets.ts';
import { readAmountText } from '../sheets/read/amountText.ts';
import { writeReperformance, type ReperformanceSheet } from '../sheets/write/reperformance.ts';
import type { PersonActor } from './actor.ts';
import type { ExportedSheet } from './exportReviewSheet.ts';
import { tooManyTries } from './tooManyTries.ts';
import { audit, write, type Outcome } from './write.ts';

/**
 * One test as a workbook of live formulas, as the stored result has it; who took it is in the audit log. A repeat is
 * a new export, so no Idempotency-Key holds here.
 */
export async function exportReperformance(
  actor: PersonActor,
  asked: NamedTest,
): Promise<Outcome<ExportedSheet>> {
  const once = { ...actor, idempotencyKey: null };
  const command = { ...asked };
  const logged = await write<ReperformanceSheet>(once, 'export-reperformance', command, async (tx) => {
    const wait = await countTry(tx, REVIEW_EXPORTS, String(actor.person.id), actor.now);
    if (wait !== null) return tooManyTries('export workbooks', wait);
    return reperformance(tx, actor, asked);
  });
  if (!logged.ok) return logged;
  const { borrowerName, madeAt } = logged.value;
  return ok({
    fileName: `Re-performance ${borrowerName} ${asked.testDate} ${madeAt.slice(0, 10)}.xlsx`,
    bytes: await writeReperformance(logged.value),
  });
}

async function reperformance(
  tx: Transaction,
  actor: PersonActor,
  { id, covenantId, testDate }: NamedTest,
): Promise<Outcome<ReperformanceSheet>> {
  const borrower = await findBorrower(tx, id, deskScope(actor.person, 'read borrower'));
  const stored = borrower && (await findCurrentAssessment(tx, id));
  const test = stored?.assessment.tests.find(
    (each) => each.covenantId === covenantId && each.testDate === testDate,
  );
  const covenant = stored && (await covenantOf(tx, id, covenantId, stored.knownAt));
  if (!borrower || !stored || !test || !covenant) return err({ kind: 'not-found', what: 'covenant test' });
  const policy = await policyInForce(tx, stored.assessment.asOf, stored.knownAt);
  const sheet: ReperformanceSheet = {
    borrowerName: borrower.name,
    title: titleOf(test, covenant),
    basisLine: basisOf(stored),
    privateSide: borrower.isListed ? 'Private side' : null,
    currency: covenant.currency,
    madeAt: actor.now.toISOString(),
    worked: workedTest(test, covenant, policy, await sourceCells(tx, id, test)),
  };
  await audit(tx, actor, {
    action: 'export-reperformance',
    subjectKind: 'covenant',
    subjectId: String(covenantId),
    borrowerId: id,
    deskId: borrower.deskId,
    summary: `Exported the re-performance workbook of ${sheet.title} of ${borrower.name}`.slice(0, 500),
    before: null,
    after: { testDate, madeAt: sheet.madeAt, basis: sheet.basisLine },
  });
  return ok(sheet);
}

async function covenantOf(
  tx: Transaction,
  borrowerId: number,
  covenantId: number,
  knownAt: Date,
): Promise<Covenant | null> {
  const covenants = (await loadCovenants(tx, [borrowerId], knownAt)).get(borrowerId) ?? [];
  return covenants.find(({ id }) => id === covenantId) ?? null;
}

function titleOf({ testDate, level, measure, operator }: CovenantTest, covenant: Covenant): string {
  const limit = level
    ? `, ${OPERATOR_WORDS[operator]} ${levelInWords(measure, level)}`
    : ', no level in force';
  return `${covenantInWords(covenant)}, tested on ${formatDay(testDate)}${limit}`;
}

const basisOf = ({ assessment, knownAt }: StoredAssessment): string =>
  `Figures known to ${knownAt.toISOString().slice(0, 16).replace('T', ' ')} UTC, method ${assessment.methodVersion}, policy ${assessment.policyVersion}`;

async function sourceCells(
  tx: Transaction,
  borrowerId: number,
  test: CovenantTest,
): Promise<readonly (SourceCell & { readonly number: Decimal | null })[]> {
  const used = [...test.inputs, ...test.bridge.flatMap(({ inputs }) => inputs)];
  const records = await listFigureSources(tx, borrowerId, used);
  return records.flatMap(({ statementId, line, fileName, sha256, sheet, cell, rawText }) =>
    isLineItemCode(line) && sheet !== null && cell !== null
      ? [
          {
            statementId,
            line,
            fileName,
            sha256,
            sheet,
            cell,
            rawText: rawText ?? '',
            number: numberIn(rawText),
          },
        ]
      : [],
  );
}

/** A text that two notations read otherwise is no number here: the line then stands as accepted. */
function numberIn(rawText: string | null): Decimal | null {
  if (rawText === null) return null;
  const read = readAmountText(rawText, null);
  return read.kind === 'amount' ? read.amount : null;
}

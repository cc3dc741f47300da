/**
 * The night: every borrower's peer figures, the cross-section out of them, every borrower's assessment, the mail.
 *
 * One run per business date. Its cut-off is fixed when the attempt begins; a borrower that fails is marked with its
 * reason and the rest goes on; a run that was cut goes on where it stopped, and ends as if it had not been.
 */
import { randomUUID } from 'node:crypto';
import type { RunKind, RunPhase } from '../../contracts/runs.ts';
import { businessDate } from '../../core/calendar/businessDate.ts';
import type { PlainDate } from '../../core/calendar/plainDate.ts';
import { METHOD_VERSION } from '../../core/policy.ts';
import { bookCrossSection, lookedBack, type BookCrossSection } from '../../core/bookCrossSection.ts';
import type { BookMember } from '../../core/bookMember.ts';
import { inTransaction, isOutage } from '../db/inTransaction.ts';
import { findCrossSection, storeCrossSection } from '../db/repositories/crossSections.ts';
import { releaseLock, takeLock, type HeldLock } from '../db/repositories/jobLocks.ts';
import { findLender } from '../db/repositories/lender.ts';
import { interruptRun, setCrossSection, setPhase, type RunRecord } from '../db/repositories/runs.ts';
import { dropOutputs, listOutputs } from '../db/repositories/runTasks.ts';
import { systemActor } from './actor.ts';
import { assessWithin } from './assessBorrower.ts';
import { beginRun } from './beginRun.ts';
import {
  eachBorrower,
  LOCK_SECONDS,
  NIGHT_LOCK,
  RunLockLost,
  RunStopped,
  type Night,
} from './eachBorrower.ts';
import { finishNight, type RunSummary } from './finishNight.ts';
import { lastReadCrossSection } from './keepWhyItMoved.ts';
import { memberOfBook } from './memberOfBook.ts';
import { storeBook } from './storeBook.ts';

export interface NightCommand {
  readonly businessDate: PlainDate;
  readonly kind: RunKind;
  /** Null: by schedule or from the command line. */
  readonly startedBy: number | null;
  readonly now: Date;
  /** By hand: a date that is done is computed once more, as another attempt. */
  readonly again?: boolean;
  /** Ends the process's part between two borrowers; the run goes on with the next start. */
  readonly signal?: AbortSignal;
}

/** What the night does; a test puts a fault in its place. */
export interface NightSteps {
  readonly assessWithin: typeof assessWithin;
  readonly memberOfBook: typeof memberOfBook;
  readonly finishNight: typeof finishNight;
}

const STEPS: NightSteps = { assessWithin, memberOfBook, finishNight };

/** Not done: another run is going on, the date is done and was not asked for again, or the process was told to stop. */
export interface SkippedRun {
  readonly outcome: 'skipped';
  readonly reason: string;
}

export async function runNight(
  command: NightCommand,
  steps: NightSteps = STEPS,
): Promise<RunSummary | SkippedRun> {
  if (await isToCome(command))
    return { outcome: 'skipped', reason: `${command.businessDate} is to come: it has no figures yet.` };
  const lock = await inTransaction((tx) =>
    takeLock(tx, { name: NIGHT_LOCK, owner: randomUUID(), seconds: LOCK_SECONDS }),
  );
  if (!lock) return { outcome: 'skipped', reason: 'Another run is going on. Nothing was started.' };
  let run: RunRecord | null = null;
  try {
    run = await inTransaction((tx) => beginRun(tx, command));
    const result = run
      ? await compute({ run, lock, signal: command.signal ?? null }, steps)
      : alreadyDone(command);
    await inTransaction((tx) => releaseLock(tx, lock));
    return result;
  } catch (error) {
    if (error instanceof RunStopped) {
      await inTransaction((tx) => releaseLock(tx, lock));
      return { outcome: 'skipped', reason: error.message };
    }
    await giveUp(run, lock, error);
    throw error;
  }
}

/** A night of a day to come would make a look back of every night until then. */
async function isToCome({ businessDate: date, now }: NightCommand): Promise<boolean> {
  const lender = await inTransaction((tx) => findLender(tx));
  if (!lender) throw new Error('there is no lender yet');
  return date > businessDate(now, lender.zone);
}

const alreadyDone = ({ businessDate: date }: NightCommand): SkippedRun => ({
  outcome: 'skipped',
  reason: `The run for ${date} is done already. Start it by hand to compute the date again.`,
});

/** A lost lock or a lost database leaves the run as it is: whoever comes next goes on with it. */
async function giveUp(run: RunRecord | null, lock: HeldLock, error: unknown): Promise<void> {
  if (error instanceof RunLockLost || isOutage(error)) return;
  await inTransaction(async (tx) => {
    if (run) await interruptRun(tx, run.id, error instanceof Error ? error.message : String(error));
    await releaseLock(tx, lock);
  });
}

async function compute(night: Night, steps: NightSteps): Promise<RunSummary> {
  const { run } = night;
  await enter(run, 'tests');
  await eachBorrower(night, 'tests', async (tx, borrowerId) =>
    JSON.stringify(await steps.memberOfBook(tx, borrowerId, run.knownAt, run.businessDate)),
  );

  await enter(run, 'cross-section');
  const crossSection = await bookOfNight(run);

  await enter(run, 'scores');
  const crossSectionOf = lastReadCrossSection();
  const actor = systemActor(`night-${run.id}-${run.attempt}`, run.knownAt);
  await eachBorrower(night, 'scores', async (tx, borrowerId) => {
    const { knownAt, businessDate: asOf } = run;
    const done = await steps.assessWithin(tx, actor, borrowerId, {
      runId: run.id,
      knownAt,
      asOf,
      crossSection,
      crossSectionOf,
    });
    if (!done.ok) throw new Error(`borrower ${borrowerId} is ${done.error.kind}`);
    return JSON.stringify(done.value.alerts);
  });

  await enter(run, 'mail');
  return inTransaction((tx) => steps.finishNight(tx, night));
}

const enter = (run: RunRecord, phase: RunPhase): Promise<void> =>
  inTransaction((tx) => setPhase(tx, run.id, phase));

/** The attempt's own cross-section, built once: a run that goes on finds it. */
async function bookOfNight(run: RunRecord): Promise<BookCrossSection> {
  return inTransaction(async (tx) => {
    const stored = run.crossSectionId === null ? null : await findCrossSection(tx, run.crossSectionId);
    if (stored) return stored;
    const members = (await listOutputs(tx, run.id, 'tests')).map((text) => JSON.parse(text) as BookMember);
    const crossSection = await storeCrossSection(
      tx,
      { runId: run.id, asOf: run.businessDate, knownAt: run.knownAt, methodVersion: METHOD_VERSION },
      (version) => lookedBack(bookCrossSection(members, version)),
    );
    await storeBook(tx, crossSection, members);
    await setCrossSection(tx, run.id, crossSection.version);
    await dropOutputs(tx, run.id, 'tests');
    return crossSection;
  });
}

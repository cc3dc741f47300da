/**
 * How every change is made: one transaction, an audit entry, safe to repeat.
 *
 * Where the request carries an Idempotency-Key, the key is inserted in the same transaction as the change, so a
 * repeat either waits and then finds the first answer, or finds nothing and does the work.
 */
import { createHash } from 'node:crypto';
import type { Transaction } from 'sequelize';
import type { ServiceProblem } from '../../contracts/problem.ts';
import { err, ok, type Result } from '../../core/result.ts';
import { inTransaction } from '../db/inTransaction.ts';
import { appendAudit, holdAuditHead, type AuditFacts } from '../db/repositories/audit.ts';
import { claimKey, storeAnswer } from '../db/repositories/idempotency.ts';
import type { Actor } from './actor.ts';

export type Outcome<T> = Result<T, ServiceProblem>;

/** Raised inside a transaction to undo it and answer with the problem. */
class Undo extends Error {
  readonly problem: ServiceProblem;
  constructor(problem: ServiceProblem) {
    super(problem.kind);
    this.problem = problem;
  }
}

/** Does the work in one transaction; a problem it returns undoes everything it wrote. */
export async function write<T>(
  actor: Actor,
  verb: string,
  command: unknown,
  work: (tx: Transaction) => Promise<Outcome<T>>,
): Promise<Outcome<T>> {
  const bodyHash = createHash('sha256')
    .update(JSON.stringify(command) ?? '')
    .digest('hex');
  try {
    const value = await inTransaction(async (tx) => {
      const claim =
        actor.idempotencyKey && actor.person
          ? await claimKey(tx, {
              personId: actor.person.id,
              key: actor.idempotencyKey,
              route: verb,
              bodyHash,
              now: actor.now,
            })
          : null;
      if (claim?.kind === 'answered') return JSON.parse(claim.response) as T;
      if (claim?.kind === 'other-request')
        throw new Undo({
          kind: 'conflict',
          detail: 'This Idempotency-Key was used for another request. Nothing was changed. Send a new key.',
        });
      await holdAuditHead(tx);
      const result = await work(tx);
      if (!result.ok) throw new Undo(result.error);
      if (claim && actor.person && actor.idempotencyKey)
        await storeAnswer(tx, {
          personId: actor.person.id,
          key: actor.idempotencyKey,
          response: JSON.stringify(result.value ?? null),
        });
      return result.value;
    });
    return ok(value);
  } catch (error) {
    if (error instanceof Undo) return err(error.problem);
    throw error;
  }
}

/** The audit entry of a change: who and by which request come from the actor. */
export const audit = (
  tx: Transaction,
  actor: Actor,
  facts: Pick<
    AuditFacts,
    'action' | 'subjectKind' | 'subjectId' | 'borrowerId' | 'deskId' | 'summary' | 'before' | 'after'
  >,
): Promise<number> =>
  appendAudit(tx, {
    ...facts,
    at: actor.now,
    personId: actor.person?.id ?? null,
    personName: actor.person?.name ?? 'Underkeel',
    requestId: actor.requestId,
    address: actor.address,
  });

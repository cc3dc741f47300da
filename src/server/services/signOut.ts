import { endSession, endSessionsOf } from '../auth/sessions.ts';
import { ok } from '../../core/result.ts';
import type { PersonActor } from './actor.ts';
import { audit, write, type Outcome } from './write.ts';

/** Ends the session on the server: its cookie is worth nothing from here on. */
export const signOut = (actor: PersonActor, sessionId: string): Promise<Outcome<null>> =>
  write(actor, 'sign-out', { sessionId }, async (tx) => {
    await endSession(tx, sessionId);
    await audit(tx, actor, {
      action: 'sign-out',
      subjectKind: 'person',
      subjectId: String(actor.person.id),
      borrowerId: null,
      deskId: null,
      summary: 'Signed out',
      before: null,
      after: null,
    });
    return ok(null);
  });

/** Ends the person's sessions in other browsers; answers how many there were. */
export const endOtherSessions = (actor: PersonActor, keepId: string): Promise<Outcome<{ ended: number }>> =>
  write(actor, 'end-sessions', { keepId }, async (tx) => {
    const ended = await endSessionsOf(tx, actor.person.id, keepId);
    await audit(tx, actor, {
      action: 'sessions-ended',
      subjectKind: 'person',
      subjectId: String(actor.person.id),
      borrowerId: null,
      deskId: null,
      summary: `Ended ${ended} other session${ended === 1 ? '' : 's'}`,
      before: null,
      after: { ended },
    });
    return ok({ ended });
  });

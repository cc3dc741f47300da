import { err } from '../../core/result.ts';
import type { Outcome } from './write.ts';

/** What every kind of proposal has in common. */
interface WaitingProposal {
  readonly state: string;
  readonly decidedBy: string | null;
  readonly proposedById: number;
  readonly version: number;
}

/** Why the UPDATE that decides or withdraws a proposal found nothing to change; without a decider it was withdrawn. */
export function whyNotDecided(
  proposal: WaitingProposal,
  version: number,
  deciderId: number | null,
): Outcome<never> {
  if (proposal.state !== 'proposed')
    return err({
      kind: 'conflict',
      detail: `This proposal was ${proposal.state}${proposal.decidedBy ? ` by ${proposal.decidedBy}` : ''}. Nothing was changed.`,
    });
  if (deciderId !== null && proposal.proposedById === deciderId)
    return err({
      kind: 'not-allowed',
      detail: 'You proposed this; another committee member decides it. Nothing was changed.',
    });
  return err({
    kind: 'stale',
    detail: `This proposal changed since you opened it (you saw version ${version}). Nothing was changed. Read it again and decide.`,
    currentVersion: proposal.version,
  });
}

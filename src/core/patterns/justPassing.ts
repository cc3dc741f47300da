import type { PlainDate } from '../calendar/plainDate.ts';

/** k of the last n tests ended in the just-passing band: an observation, nothing about chance. */
export interface JustPassing {
  readonly covenantId: number;
  readonly inBand: number;
  readonly ofLast: number;
  /** Tests in a row, up to the latest, that ended in the band. */
  readonly run: number;
  readonly testDates: readonly PlainDate[];
}

export const STRETCH_CHANNELS = ['receivables', 'inventory', 'capitalised'] as const;
export type StretchChannel = (typeof STRETCH_CHANNELS)[number];

export interface Stretch {
  readonly risk: number;
  readonly sharpest: StretchChannel;
  /** Channels that could be looked at, 1 to 3. */
  readonly channels: number;
}

/**
 * The largest of the channels' percentiles to the power of the number of channels, so that looking at three does not
 * raise the risk of a firm that is ordinary in all (the step of Šidák 1967). Null where no channel can be given.
 *
 * Source: methods.md B6.
 *
 * @example stretchOf({ receivables: 0.97, inventory: 0.55, capitalised: 0.4 })?.risk // => 0.912673
 */
export function stretchOf(percentiles: Readonly<Record<StretchChannel, number | null>>): Stretch | null {
  const available = STRETCH_CHANNELS.flatMap((channel) => {
    const percentile = percentiles[channel];
    return percentile === null ? [] : [{ channel, percentile }];
  });
  const [first, ...rest] = available;
  if (!first) return null;
  const sharpest = rest.reduce((most, each) => (each.percentile > most.percentile ? each : most), first);
  return {
    risk: sharpest.percentile ** available.length,
    sharpest: sharpest.channel,
    channels: available.length,
  };
}

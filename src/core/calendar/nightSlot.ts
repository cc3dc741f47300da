const DAY_MS = 86_400_000;

/**
 * The latest instant, at or before now, at which a nightly run was to start.
 *
 * `nightAtUtc` is 'HH:MM' in UTC, so that no change of clocks skips it or brings it twice. Throws RangeError for
 * text of another shape.
 *
 * @example lastNightSlot(new Date('2026-12-02T01:29:59Z'), '01:30').toISOString() // => '2026-12-01T01:30:00.000Z'
 */
export function lastNightSlot(now: Date, nightAtUtc: string): Date {
  const [, hours, minutes] = /^([01]\d|2[0-3]):([0-5]\d)$/.exec(nightAtUtc) ?? [];
  if (hours === undefined || minutes === undefined) throw new RangeError(`not a time of day: ${nightAtUtc}`);
  const today = Date.UTC(
    now.getUTCFullYear(),
    now.getUTCMonth(),
    now.getUTCDate(),
    Number(hours),
    Number(minutes),
  );
  return new Date(today <= now.getTime() ? today : today - DAY_MS);
}

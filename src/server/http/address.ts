/**
 * Whose address counts. X-Forwarded-For is anybody's to write, so it is believed only where the settings name a
 * proxy in front, and then only its last value: the one that this proxy has added.
 */
export function clientAddress(
  socketAddress: string,
  forwardedFor: string | null,
  behindProxy: boolean,
): string {
  if (!behindProxy || !forwardedFor) return socketAddress;
  const last = forwardedFor.split(',').at(-1)?.trim() ?? '';
  return /^[0-9a-fA-F.:]{2,45}$/.test(last) ? last : socketAddress;
}

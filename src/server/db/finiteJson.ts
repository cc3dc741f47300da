/**
 * Text to store. A decimal prints itself as text; a number that is no number would be stored as null and lost, so it
 * is refused here. `what` names the thing in the error.
 */
export const finiteJson = (what: string, value: unknown): string =>
  JSON.stringify(value, (key, member: unknown) => {
    if (typeof member === 'number' && !Number.isFinite(member))
      throw new RangeError(`${what}'s ${key} is no number: ${member}`);
    return member;
  });

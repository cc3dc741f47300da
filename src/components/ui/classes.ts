/** Class names that hold, in order. */
export const classes = (...names: readonly (string | false | null | undefined)[]): string =>
  names.filter(Boolean).join(' ');

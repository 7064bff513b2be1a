/** Joins class names, leaving out what is false, null or empty. */
export const classes = (...names: readonly (string | false | null | undefined)[]): string =>
  names.filter(Boolean).join(' ')

/** The name somebody gave a phone; null when there is none, as what a browser calls itself is no name. */
export const givenName = (name: string): string | null =>
  name === '' || name.startsWith('Mozilla/') ? null : name

/** Said on a phone that the shop took out, once everything on it was handed over and deleted (Q4). */
export const EMPTIED_WORDS =
  'The shop took this phone out. Everything on it was handed over to the owner, then deleted here. To use it again, sign in.'

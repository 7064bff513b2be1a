/**
 * Said on a phone that the shop took out, once the store of the person at work was handed over and deleted
 * (Q4). Stores of others who used it are not touched by that.
 */
export const EMPTIED_WORDS =
  'The shop took this phone out. Everything on it of the person who was signed in was handed over to the owner, then deleted here. To use it again, sign in.'

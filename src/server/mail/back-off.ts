/** Wait after the first failure, s; it doubles with each further one. */
const FIRST_S = 15;

/** Longest wait between two tries, s: a server that was dead for a week is found within the hour. */
const LONGEST_S = 3600;

/** How long a letter rests after so many tries (from 1) have failed, s. It is tried for as long as it takes. */
export const backOffSeconds = (tries: number): number =>
  Math.min(LONGEST_S, FIRST_S * 2 ** Math.min(tries - 1, 20));

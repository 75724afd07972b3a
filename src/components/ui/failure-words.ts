/** What browsers say when a part of the program, needed only now, cannot be had. */
const NOT_FETCHED =
  /dynamically imported module|Importing a module script failed|Failed to fetch|NetworkError|Load failed/i;

/** Why something did not work, for the person: the error's own words, but for what only a browser would say. */
export function failureWords(error: unknown): string {
  const message = error instanceof Error ? error.message : '';
  return NOT_FETCHED.test(message)
    ? 'The server could not be reached. Check the connection.'
    : message;
}

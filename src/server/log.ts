/** One line of JSON on standard error for each thing that whoever runs the server should know. */
export const logError = (message: string, error: unknown): void => {
  const reason = error instanceof Error ? (error.stack ?? error.message) : String(error);
  const cause = error instanceof Error && error.cause ? String(error.cause) : undefined;
  process.stderr.write(
    `${JSON.stringify({ at: new Date().toISOString(), level: 'error', message, reason, cause })}\n`,
  );
};

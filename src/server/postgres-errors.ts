/** SQLSTATE of a unique constraint that would be broken (PostgreSQL manual, appendix A). */
const UNIQUE_VIOLATION = '23505';

/** The drivers' own error, inside what Drizzle throws; PGlite and postgres.js name the constraint differently. */
interface DriverError {
  readonly code?: unknown;
  readonly constraint?: unknown;
  readonly constraint_name?: unknown;
}

/** Whether the error is that of one unique constraint, from PGlite or a server. */
export const isUniqueViolation = (error: unknown, constraint: string): boolean => {
  const cause = (error instanceof Error && error.cause ? error.cause : error) as DriverError;
  return (
    cause?.code === UNIQUE_VIOLATION &&
    (cause.constraint === constraint || cause.constraint_name === constraint)
  );
};

const DAY = new Intl.DateTimeFormat('en-GB', {
  day: 'numeric',
  month: 'long',
  year: 'numeric',
  timeZone: 'UTC',
});

/** A day such as `2026-03-01` as people read it: `1 March 2026`. A day is the same everywhere, so no zone has a say. */
export const dayText = (day: string): string => DAY.format(new Date(`${day}T00:00:00Z`));

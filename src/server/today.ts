/** Today as a day, `2026-03-01`, in UTC like every time that is kept. */
export const today = (): string => new Date().toISOString().slice(0, 10);

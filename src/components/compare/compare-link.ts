export type CompareView = 'side' | 'over';

export const isCompareView = (value: string | null): value is CompareView =>
  value === 'side' || value === 'over';

/** The address of a comparison, to go to or to send. */
export const compareLink = (a: string, b: string, view?: CompareView): string =>
  `/compare?${new URLSearchParams({ a, b, ...(view ? { view } : {}) })}`;

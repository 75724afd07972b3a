import { useState } from 'react';

/** Units laid tight and what they came to, as far as it is typed. */
export interface Measured {
  readonly count: number;
  readonly total: number | null;
}

type All = Readonly<Record<string, Measured>>;

const key = (versionId: string) => `evenlay:site-sizes:${versionId}`;

const read = (versionId: string): All => {
  try {
    return (JSON.parse(sessionStorage.getItem(key(versionId)) ?? '{}') as All) ?? {};
  } catch {
    return {};
  }
};

/** What was measured of the units of a version: kept while the tab lives, so that looking elsewhere loses none of it. */
export const useMeasures = (versionId: string): [All, (next: All) => void] => {
  const [all, setAll] = useState(() => read(versionId));
  const keep = (next: All) => {
    setAll(next);
    try {
      sessionStorage.setItem(key(versionId), JSON.stringify(next));
    } catch {
      // For this screen only, then.
    }
  };
  return [all, keep];
};

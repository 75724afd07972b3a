import { useQuery } from '@tanstack/react-query';
import type { PersonName } from '@/api-types/people';
import type { SiteStanding } from '@/api-types/site';
import { layFloor } from '@/paving/laying';
import type { LayoutDocument } from '@/paving/layout-document';
import { setOut, type Check, type Course } from '@/paving/set-out/set-out';
import { readingVerdict } from '@/paving/site/reading-verdict';
import { siteRecord, type RecordedEntry, type SiteRecord } from '@/paving/site/site-record';
import { api } from '../ui/api';

/** What the crew has written down for a version; asked again when the project's live state says that there is more. */
export const useSiteStanding = (versionId: string) =>
  useQuery({
    queryKey: ['on-site', versionId],
    queryFn: () => api<SiteStanding>('GET', `/api/versions/${versionId}/site-entries`),
  });

const plans = new WeakMap<
  LayoutDocument,
  { courses: readonly Course[]; checks: readonly Check[] }
>();

const planOf = (document: LayoutDocument) => {
  let plan = plans.get(document);
  if (!plan) {
    const { courses, checks } = setOut(layFloor(document));
    plan = { courses, checks };
    plans.set(document, plan);
  }
  return plan;
};

export type StandingEntry = RecordedEntry<PersonName>;

export interface Progress {
  readonly courses: readonly { readonly number: number; readonly laid: boolean }[];
  readonly laid: number;
  readonly checks: number;
  readonly measured: number;
  /** Readings that will not do, with their checks. */
  readonly wrong: readonly {
    readonly check: Check;
    readonly reading: ReadingEntry;
  }[];
  /** Notes, photos and proposals, the newest first. */
  readonly notes: readonly StandingEntry[];
  /** When anything was written down last; null when nothing is. */
  readonly lastAt: string | null;
}

type ReadingEntry =
  SiteRecord<PersonName>['readings'] extends ReadonlyMap<string, infer R> ? R : never;

/** How far a version is built, by what was written down and by its own set-out. */
export const progressOf = (
  document: LayoutDocument,
  entries: readonly StandingEntry[],
): Progress => {
  const { courses, checks } = planOf(document);
  const { laid, readings, notes } = siteRecord<PersonName>(entries);
  const read = checks.flatMap((check) => {
    const reading = readings.get(check.id);
    return reading ? [{ check, reading }] : [];
  });
  const lastAt = entries.reduce<string | null>(
    (last, { madeAt }) => (last === null || madeAt > last ? madeAt : last),
    null,
  );
  return {
    courses: courses.map(({ number }) => ({ number, laid: laid.has(number) })),
    laid: courses.filter(({ number }) => laid.has(number)).length,
    checks: checks.length,
    measured: read.length,
    wrong: read.filter(({ check, reading }) => !readingVerdict(check, reading.measured).within),
    notes: [...notes].reverse(),
    lastAt,
  };
};

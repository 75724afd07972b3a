import { useQuery } from '@tanstack/react-query';
import type { PersonName } from '@/api-types/people';
import type { SiteStanding } from '@/api-types/site';
import { layFloor, type Laying } from '@/paving/laying';
import type { LayoutDocument } from '@/paving/layout-document';
import { checksWithReadings } from '@/paving/set-out/checks';
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

interface Plan {
  readonly laying: Laying;
  readonly courses: readonly Course[];
  readonly checks: readonly Check[];
}

const plans = new WeakMap<LayoutDocument, Plan>();

const planOf = (document: LayoutDocument) => {
  let plan = plans.get(document);
  if (!plan) {
    const laying = layFloor(document);
    const { courses, checks } = setOut(laying);
    plan = { laying, courses, checks };
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
  const plan = planOf(document);
  const { courses } = plan;
  const { laid, readings, notes } = siteRecord<PersonName>(entries);
  const checks = checksWithReadings(plan.laying, plan, readings.keys());
  const read = checks.flatMap((check) => {
    const reading = readings.get(check.id);
    return reading ? [{ check, reading }] : [];
  });
  const lastAt = entries.reduce<string | null>(
    (last, { madeAt }) => (last === null || madeAt > last ? madeAt : last),
    null,
  );
  return {
    courses: courses.map(({ number, row }) => ({ number, laid: laid.has(row) })),
    laid: courses.filter(({ row }) => laid.has(row)).length,
    checks: checks.length,
    measured: read.length,
    wrong: read.filter(({ check, reading }) => !readingVerdict(check, reading.measured).within),
    notes: [...notes].reverse(),
    lastAt,
  };
};

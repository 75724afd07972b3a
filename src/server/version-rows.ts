import { eq, sql, type SQL } from 'drizzle-orm';
import type { VersionState, VersionSummary } from '@/api-types/versions';
import { people, versionEvents, versions } from '@/db/schema';
import { shortFingerprint } from './fingerprint';

/** A version's state: the kind of its last event. For use in a query over `versions`. */
export const versionState: SQL<VersionState> = sql<VersionState>`(select ${versionEvents.kind}
  from ${versionEvents} where ${versionEvents.firmId} = ${versions.firmId}
  and ${versionEvents.versionId} = ${versions.id} order by ${versionEvents.place} desc limit 1)`;

/** What a list needs of a version, without its document. Join `people` on `createdBy`. */
export const summaryColumns = {
  id: versions.id,
  layoutId: versions.layoutId,
  number: versions.number,
  label: versions.label,
  note: versions.note,
  state: versionState,
  createdAt: versions.createdAt,
  personId: people.id,
  personName: people.name,
  fingerprint: versions.fingerprint,
  figures: sql<VersionSummary['figures']>`${versions.report} - 'edges' #- '{cut,pieces}'`.mapWith(
    versions.report,
  ),
};

/** Who saved a version. */
export const byCreator = eq(people.id, versions.createdBy);

export interface SummaryRow {
  readonly id: string;
  readonly layoutId: string;
  readonly number: number;
  readonly label: string;
  readonly note: string;
  readonly state: VersionState;
  readonly createdAt: Date;
  readonly personId: string;
  readonly personName: string;
  readonly fingerprint: string;
  readonly figures: VersionSummary['figures'];
}

/** A version in short, as the browser gets it. */
export const summaryOf = (row: SummaryRow): VersionSummary => ({
  id: row.id,
  layoutId: row.layoutId,
  number: row.number,
  label: row.label,
  note: row.note,
  state: row.state,
  createdAt: row.createdAt.toISOString(),
  createdBy: { id: row.personId, name: row.personName },
  shortFingerprint: shortFingerprint(row.fingerprint),
  figures: row.figures,
});

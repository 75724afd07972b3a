import type { SiteEntryContent } from './site-entry';

/** An entry as it is read back: what, by which device in which order, when. */
export interface RecordedEntry<By = unknown> {
  readonly id: string;
  /** The phone it was made on; its entries are numbered in the order in which they were made. */
  readonly device: string;
  readonly place: number;
  /** When it was made by the phone's clock, ISO 8601 in UTC. */
  readonly madeAt: string;
  /** When the server took it; null while it is on the phone alone. */
  readonly receivedAt: string | null;
  readonly by: By;
  readonly content: SiteEntryContent;
}

/** How the ground stands by the entries: the last word on each course and each check. */
export interface SiteRecord<By = unknown> {
  /** Courses laid, by row. */
  readonly laid: ReadonlyMap<number, RecordedEntry<By>>;
  /** Readings that stand, by the check's id. */
  readonly readings: ReadonlyMap<string, RecordedEntry<By> & { readonly measured: number }>;
  /** Notes, photos and proposals, oldest first. */
  readonly notes: readonly RecordedEntry<By>[];
}

/** A phone whose clock runs ahead must not have the last word for ever: nothing was made after it was received. */
const moment = ({ madeAt, receivedAt }: RecordedEntry): number =>
  Math.min(Date.parse(madeAt), receivedAt === null ? Infinity : Date.parse(receivedAt));

const compareText = (a: string, b: string): number => (a < b ? -1 : a > b ? 1 : 0);

/**
 * Entries in the order in which they were made, however they came in: by moment, and those of one phone in its
 * own order whatever its clock did meanwhile.
 */
export const entriesInOrder = <E extends RecordedEntry>(entries: readonly E[]): readonly E[] => {
  const byPlace = [...entries].sort(
    (a, b) => compareText(a.device, b.device) || a.place - b.place || compareText(a.id, b.id),
  );
  let device = '';
  let latest = -Infinity;
  return byPlace
    .map((entry) => {
      latest = entry.device === device ? Math.max(latest, moment(entry)) : moment(entry);
      device = entry.device;
      return { entry, at: latest };
    })
    .sort(
      (a, b) =>
        a.at - b.at ||
        compareText(a.entry.device, b.entry.device) ||
        a.entry.place - b.entry.place ||
        compareText(a.entry.id, b.entry.id),
    )
    .map(({ entry }) => entry);
};

/** What stands after all entries. An entry that is there twice counts once. */
export const siteRecord = <By>(entries: readonly RecordedEntry<By>[]): SiteRecord<By> => {
  const laid = new Map<number, RecordedEntry<By>>();
  const readings = new Map<string, RecordedEntry<By> & { readonly measured: number }>();
  const notes: RecordedEntry<By>[] = [];
  const once = [...new Map(entries.map((entry) => [entry.id, entry])).values()];
  for (const entry of entriesInOrder(once)) {
    const { content } = entry;
    if (content.kind === 'course') {
      if (content.laid) laid.set(content.course, entry);
      else laid.delete(content.course);
    } else if (content.kind === 'check') {
      const { check, measured } = content;
      if (measured === null) readings.delete(check);
      else readings.set(check, { ...entry, measured });
    } else notes.push(entry);
  }
  return { laid, readings, notes };
};

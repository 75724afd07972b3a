import type { PersonName } from '@/api-types/people';
import { layFloor, type Laying } from '@/paving/laying';
import type { LayoutDocument } from '@/paving/layout-document';
import { setOut, type SetOut } from '@/paving/set-out/set-out';
import { siteRecord, type RecordedEntry, type SiteRecord } from '@/paving/site/site-record';
import type { KeptPack, PhonePerson, WaitingEntry } from './phone-store';

export interface PackFloor {
  readonly laying: Laying;
  readonly setOut: SetOut;
}

const worked = new WeakMap<LayoutDocument, PackFloor>();
const byVersion = new Map<string, LayoutDocument>();

/**
 * The floor of a kept version and its set-out, worked out on the phone. What is read from the phone's store is a new
 * object each time; a version's document is always the same, so the first one read stands for all.
 */
export const packFloor = (versionId: string, read: LayoutDocument): PackFloor => {
  const document = byVersion.get(versionId) ?? read;
  byVersion.set(versionId, document);
  let floor = worked.get(document);
  if (!floor) {
    const laying = layFloor(document);
    floor = { laying, setOut: setOut(laying) };
    worked.set(document, floor);
  }
  return floor;
};

/** The courses laid, by the numbers that the sheets give them, in their order. */
export const laidNumbers = ({ setOut: plan }: PackFloor, record: SiteRecord): readonly number[] =>
  plan.courses.filter(({ row }) => record.laid.has(row)).map(({ number }) => number);

export type PackEntry = RecordedEntry<PersonName> & {
  /** Null: the server has it. */
  readonly standing: 'waiting' | 'refused' | null;
  readonly reason: string | null;
};

/** All that is written down for a version, by the crew as the server knows it and on this phone. */
export const packEntries = (
  { versionId, pack }: KeptPack,
  waiting: readonly WaitingEntry[],
  { account }: PhonePerson,
): readonly PackEntry[] => {
  const by = { id: account.id, name: account.name };
  const own = waiting
    .filter((entry) => entry.versionId === versionId)
    .map(({ id, device, place, madeAt, content, refused }): PackEntry => ({
      id,
      device,
      place,
      madeAt,
      receivedAt: null,
      by,
      content,
      standing: refused === null ? 'waiting' : 'refused',
      reason: refused,
    }));
  const sent = pack.standing.entries.map((entry): PackEntry => ({
    ...entry,
    standing: null,
    reason: null,
  }));
  return [...sent, ...own];
};

/** How the ground stands, with what waits on this phone; what was refused does not count. */
export const packRecord = (entries: readonly PackEntry[]): SiteRecord<PersonName> =>
  siteRecord(entries.filter(({ standing }) => standing !== 'refused'));

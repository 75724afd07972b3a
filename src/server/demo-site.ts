import type { EntriesKept } from '@/api-types/site';
import { layFloor } from '@/paving/laying';
import type { LayoutDocument } from '@/paving/layout-document';
import { setOut } from '@/paving/set-out/set-out';
import type { SiteEntryContent } from '@/paving/site/site-entry';
import type { Db } from './database';
import type { Outcome } from './outcomes';
import type { Actor } from './permissions';
import { keepSiteEntries } from './site/site-entries';

/** Courses that the demo's crew has down. */
const LAID = 9;

/** What the demo's crew has written down so far: some courses, some readings that will do, and a note. */
export const writeDemoSiteRecord = (
  db: Db,
  installer: Actor,
  versionId: string,
  document: LayoutDocument,
): Promise<Outcome<EntriesKept>> => {
  const { courses, checks } = setOut(layFloor(document));
  const before = checks.filter(({ kind }) => kind === 'diagonal' || kind === 'edge').slice(0, 2);
  const contents: SiteEntryContent[] = [
    ...before.map(({ id, expected }): SiteEntryContent => ({
      kind: 'check',
      check: id,
      measured: Math.round(expected),
    })),
    ...courses.slice(0, LAID).map(({ row }): SiteEntryContent => ({
      kind: 'course',
      course: row,
      laid: true,
    })),
    { kind: 'note', text: 'Steel edge is true all round. Barrowed in the next two pallets.' },
  ];
  const last = Date.now();
  return keepSiteEntries(db, installer, versionId, {
    device: 'demo-phone-of-the-installer',
    by: installer.personId,
    entries: contents.map((content, n) => ({
      id: `demo-entry-${String(n + 1).padStart(3, '0')}-of-${versionId.slice(0, 12)}`,
      place: n + 1,
      madeAt: new Date(last - (contents.length - n) * 600_000).toISOString(),
      content,
    })),
  });
};

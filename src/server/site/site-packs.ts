import { randomBytes } from 'node:crypto';
import { and, desc, eq, inArray, isNull, sql } from 'drizzle-orm';
import type { Account } from '@/api-types/people';
import type { SitePack, SitePacks, SitePackSummary } from '@/api-types/site';
import { PACKS_LISTED } from '@/api-types/site-limits';
import { layouts, projects, siteKeys, versionEvents, versions } from '@/db/schema';
import type { Db } from '../database';
import { shortFingerprint } from '../fingerprint';
import { done, type Outcome } from '../outcomes';
import { isPutOnProjects, type Actor } from '../permissions';
import { versionState } from '../version-rows';
import { projectSeen, versionSeen } from '../visibility';
import { siteEntriesOf } from './site-entries';
import { refuseUnlessEntering, siteVersion, supersedingOf } from './site-version';

/** The person's own key for what waits on a phone of theirs, made when it is first asked for. */
const siteKeyOf = async (db: Db, { firmId, personId }: Actor): Promise<string> => {
  const own = and(eq(siteKeys.firmId, firmId), eq(siteKeys.personId, personId));
  const known = () => db.select({ key: siteKeys.key }).from(siteKeys).where(own);
  const [there] = await known();
  if (there) return there.key;
  await db
    .insert(siteKeys)
    .values({ firmId, personId, key: randomBytes(32).toString('base64') })
    .onConflictDoNothing();
  return (await known())[0].key;
};

/** Issued versions that the actor may build from, the last issued first. */
export const listSitePacks = async (
  db: Db,
  actor: Actor,
  account: Account,
): Promise<Outcome<SitePacks>> => {
  const refusal = refuseUnlessEntering(actor);
  if (refusal) return refusal;
  const rows = await db
    .select({
      versionId: versions.id,
      number: versions.number,
      label: versions.label,
      layoutId: layouts.id,
      layoutName: layouts.name,
      projectId: projects.id,
      projectName: projects.name,
      siteNote: projects.siteNote,
      state: versionState,
      issuedAt: versionEvents.at,
    })
    .from(versionEvents)
    .innerJoin(
      versions,
      and(eq(versions.firmId, versionEvents.firmId), eq(versions.id, versionEvents.versionId)),
    )
    .innerJoin(layouts, and(eq(layouts.firmId, versions.firmId), eq(layouts.id, versions.layoutId)))
    .innerJoin(
      projects,
      and(eq(projects.firmId, layouts.firmId), eq(projects.id, layouts.projectId)),
    )
    .where(
      and(
        eq(versionEvents.firmId, actor.firmId),
        eq(versionEvents.kind, 'issued'),
        versionSeen(actor),
        projectSeen(actor),
        isNull(projects.archivedAt),
        isNull(layouts.archivedAt),
      ),
    )
    .orderBy(desc(versionEvents.at), desc(versionEvents.id))
    .limit(PACKS_LISTED);
  const current = await currentOf(
    db,
    actor,
    rows.filter(({ state }) => state === 'superseded').map(({ layoutId }) => layoutId),
  );
  const packs = rows.map(({ issuedAt, ...row }): SitePackSummary => ({
    ...row,
    issuedAt: issuedAt.toISOString(),
    supersededBy: row.state === 'superseded' ? (current.get(row.layoutId) ?? null) : null,
  }));
  return done({
    account,
    keep: isPutOnProjects(actor.role) ? 'all' : 'opened',
    key: await siteKeyOf(db, actor),
    packs,
  });
};

/** The version of each of these layouts that is issued now. */
const currentOf = async (db: Db, actor: Actor, layoutIds: readonly string[]) => {
  if (layoutIds.length === 0) return new Map<string, SitePackSummary['supersededBy']>();
  const rows = await db
    .select({
      layoutId: versions.layoutId,
      id: versions.id,
      number: versions.number,
      at: sql<Date>`max(${versionEvents.at})`.mapWith(versionEvents.at),
    })
    .from(versions)
    .innerJoin(
      versionEvents,
      and(
        eq(versionEvents.firmId, versions.firmId),
        eq(versionEvents.versionId, versions.id),
        eq(versionEvents.kind, 'issued'),
      ),
    )
    .where(
      and(
        eq(versions.firmId, actor.firmId),
        inArray(versions.layoutId, [...layoutIds]),
        eq(versionState, 'issued'),
      ),
    )
    .groupBy(versions.firmId, versions.layoutId, versions.id, versions.number);
  return new Map(
    rows.map(({ layoutId, id, number, at }) => [layoutId, { id, number, at: at.toISOString() }]),
  );
};

/** All that a phone needs to build from an issued version. */
export const openSitePack = async (
  db: Db,
  actor: Actor,
  id: string,
): Promise<Outcome<SitePack>> => {
  const site = await siteVersion(db, actor, id);
  if (!site.ok) return site;
  const { version, issue } = site.value;
  const [more] = await db
    .select({
      document: versions.document,
      note: versions.note,
      siteNote: projects.siteNote,
    })
    .from(versions)
    .innerJoin(layouts, and(eq(layouts.firmId, versions.firmId), eq(layouts.id, versions.layoutId)))
    .innerJoin(
      projects,
      and(eq(projects.firmId, layouts.firmId), eq(projects.id, layouts.projectId)),
    )
    .where(and(eq(versions.firmId, actor.firmId), eq(versions.id, id)));
  const supersededBy = await supersedingOf(db, actor, version);
  return done({
    versionId: id,
    number: version.number,
    label: version.label,
    layoutId: version.layoutId,
    layoutName: version.layoutName,
    projectId: version.projectId,
    projectName: version.projectName,
    siteNote: more.siteNote,
    state: version.state,
    issuedAt: issue.at.toISOString(),
    supersededBy,
    firmName: version.firmName,
    shortFingerprint: shortFingerprint(version.fingerprint),
    issuedBy: issue.by,
    issueNote: issue.note,
    note: more.note,
    document: more.document,
    standing: {
      versionId: id,
      state: version.state,
      supersededBy,
      entries: await siteEntriesOf(db, actor, id),
    },
  });
};

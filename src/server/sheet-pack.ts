import { and, asc, eq, gt, ne } from 'drizzle-orm';
import { alias } from 'drizzle-orm/pg-core';
import type { PlanStatus, SheetPack } from '@/api-types/sheet-pack';
import { versionEvents, versions } from '@/db/schema';
import { takeOffWithoutCosts } from '@/takeoff/without-costs';
import type { Db } from './database';
import { done, type Outcome } from './outcomes';
import { permissions, type Actor } from './permissions';
import { pricingOfVersion } from './pricing/version-pricing';
import { siteOrigin } from './site-origin';
import { openVersion } from './versions';

/**
 * Where a sheet's QR code leads. A version's id is random (120 bits), so that nobody finds a sheet's page but from the
 * sheet; and it is kept through export and import, so that sheets on paper stay good.
 */
const currentUrl = (versionId: string): string => `${siteOrigin()}/current/${versionId}`;

/** The sheets of a version that the actor may have. What they may not see is not found. */
export const openSheetPack = async (
  db: Db,
  actor: Actor,
  id: string,
): Promise<Outcome<SheetPack>> => {
  const found = await openVersion(db, actor, id);
  if (!found.ok) return found;
  const version = found.value;
  const status = await planStatus(db, id);
  const sheets = permissions['set-out pack'][actor.role] === 'plan sheet' ? 'plan' : 'all';
  const pricing = sheets === 'all' ? await pricingOfVersion(db, actor.firmId, id) : null;
  return done({
    version,
    stamp: {
      issuedAt: version.events.find(({ kind }) => kind === 'issued')?.at ?? null,
      supersededBy: status.status === 'superseded' ? { number: status.by, at: status.at } : null,
      currentUrl: currentUrl(id),
    },
    sheets,
    materials: pricing && takeOffWithoutCosts(pricing.takeOff),
  });
};

/** Whether a sheet is of the plan to build from. Asked without a session, hence without a firm: it reveals nothing of it. */
export const planStatus = async (db: Db, versionId: string): Promise<PlanStatus> => {
  const others = alias(versions, 'others');
  const [superseded] = await db
    .select({ at: versionEvents.at })
    .from(versionEvents)
    .innerJoin(versions, eq(versions.id, versionEvents.versionId))
    .where(and(eq(versions.id, versionId), eq(versionEvents.kind, 'superseded')));
  const [issued] = await db
    .select({ at: versionEvents.at, layoutId: versions.layoutId, firmId: versions.firmId })
    .from(versionEvents)
    .innerJoin(versions, eq(versions.id, versionEvents.versionId))
    .where(and(eq(versions.id, versionId), eq(versionEvents.kind, 'issued')));
  if (!issued) return { status: 'not-issued' };
  if (!superseded) return { status: 'current' };
  // Issued ones follow one another: the next to be issued took its place.
  const [next] = await db
    .select({ number: others.number })
    .from(versionEvents)
    .innerJoin(others, eq(others.id, versionEvents.versionId))
    .where(
      and(
        eq(others.firmId, issued.firmId),
        eq(others.layoutId, issued.layoutId),
        ne(others.id, versionId),
        eq(versionEvents.kind, 'issued'),
        gt(versionEvents.at, issued.at),
      ),
    )
    .orderBy(asc(versionEvents.at))
    .limit(1);
  return { status: 'superseded', by: next?.number ?? null, at: superseded.at.toISOString() };
};

import { and, desc, eq, isNotNull, ne } from 'drizzle-orm';
import type { OrderElsewhere } from '@/api-types/purchase-orders';
import { layouts, projects, purchaseOrders, versions } from '@/db/schema';
import type { Db } from '../database';
import type { SeenVersion } from '../seen-version';

/** What was sent for other versions of a version's project, of any of its layouts, newest first. */
export const ordersElsewhere = async (
  db: Db,
  { id, firmId, projectId }: Pick<SeenVersion, 'id' | 'firmId' | 'projectId'>,
): Promise<OrderElsewhere[]> => {
  const rows = await db
    .select({
      id: purchaseOrders.id,
      sent: purchaseOrders.sent,
      sentAt: purchaseOrders.sentAt,
      versionId: versions.id,
      versionNumber: versions.number,
      layoutName: layouts.name,
    })
    .from(purchaseOrders)
    .innerJoin(
      versions,
      and(eq(versions.firmId, purchaseOrders.firmId), eq(versions.id, purchaseOrders.versionId)),
    )
    .innerJoin(layouts, and(eq(layouts.firmId, versions.firmId), eq(layouts.id, versions.layoutId)))
    .where(
      and(
        eq(purchaseOrders.firmId, firmId),
        eq(layouts.projectId, projectId),
        ne(purchaseOrders.versionId, id),
        isNotNull(purchaseOrders.sent),
      ),
    )
    .orderBy(desc(purchaseOrders.sentAt), desc(purchaseOrders.id));
  return rows.map(({ sent, sentAt, ...row }) => ({
    ...row,
    number: sent!.number,
    supplier: sent!.supplier.name,
    email: sent!.supplier.email,
    sentAt: sentAt!.toISOString(),
    sentBy: sent!.sentBy,
  }));
};

/** Orders of one project are sent one after another, so that each is held against all that went before it. */
export const lockProjectOrders = async (
  tx: Db,
  { firmId, projectId }: Pick<SeenVersion, 'firmId' | 'projectId'>,
): Promise<void> => {
  await tx
    .select({ id: projects.id })
    .from(projects)
    .where(and(eq(projects.firmId, firmId), eq(projects.id, projectId)))
    .for('no key update');
};

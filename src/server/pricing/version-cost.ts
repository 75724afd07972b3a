import { and, desc, eq, isNotNull } from 'drizzle-orm';
import type { VersionCost } from '@/api-types/version-cost';
import { quotes } from '@/db/schema';
import { currencyOf } from '../catalogue/pricing-settings';
import type { Db } from '../database';
import { done, notFound, type Outcome } from '../outcomes';
import { permissions, seesCosts, type Actor } from '../permissions';
import { seenVersion } from '../seen-version';
import { pricingOfVersion } from './version-pricing';

/** What a version comes to: materials for those who see costs, what was quoted for the client too, nothing for a crew. */
export const openVersionCost = async (
  db: Db,
  actor: Actor,
  versionId: string,
): Promise<Outcome<VersionCost>> => {
  if (!(await seenVersion(db, actor, versionId))) return notFound('version');
  const pricing = seesCosts(actor.role)
    ? await pricingOfVersion(db, actor.firmId, versionId)
    : null;
  const [quote] = permissions['quote totals'][actor.role]
    ? await db
        .select({ sent: quotes.sent })
        .from(quotes)
        .where(
          and(
            eq(quotes.firmId, actor.firmId),
            eq(quotes.versionId, versionId),
            isNotNull(quotes.sentAt),
          ),
        )
        .orderBy(desc(quotes.sentAt))
        .limit(1)
    : [];
  const sent = quote?.sent ?? null;
  return done({
    versionId,
    currency:
      sent?.quote.currency ?? pricing?.priceList.currency ?? (await currencyOf(db, actor.firmId)),
    materialsMinor: pricing?.takeOff.costMinor ?? null,
    complete: pricing !== null && pricing.takeOff.unpriced.length === 0,
    quotedMinor: sent?.quote.totalMinor ?? null,
  });
};

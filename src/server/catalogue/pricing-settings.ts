import { and, eq } from 'drizzle-orm';
import type { z } from 'zod';
import type { FirmPricing, firmPricingChangeSchema } from '@/api-types/pricing';
import { cataloguePrices, firmPricing, quotes } from '@/db/schema';
import { recordAudit } from '../audit';
import type { Db } from '../database';
import { changedMeanwhile, done, invalid, type Outcome } from '../outcomes';
import { refuseUnlessManaging, refuseUnlessPricing, type Actor } from '../permissions';
import { lockCatalogue } from './catalogue-lock';

/** What a firm begins with until its owner says otherwise; the tax is nought, for rates are the place's own. */
const BEGINNING: Omit<typeof firmPricing.$inferSelect, 'firmId'> = {
  currency: 'EUR',
  taxName: 'Tax',
  taxBasisPoints: 0,
  taxOn: 'sum',
  marginOf: 'cost',
  marginBasisPoints: 0,
  labourHourMinor: 0,
  labourAreaMinor: 0,
  validDays: 30,
  quoteTerms: '',
  orderTerms: '',
  quotePrefix: 'Q-',
  orderPrefix: 'PO-',
  address: '',
  phone: '',
  email: '',
  registration: '',
  paper: 'A4',
  revision: 0,
};

/** The firm's settings for prices, as they stand. */
export const pricingOf = async (db: Db, firmId: string): Promise<typeof BEGINNING> => {
  const [row] = await db.select().from(firmPricing).where(eq(firmPricing.firmId, firmId));
  if (!row) return BEGINNING;
  const { firmId: _, ...settings } = row;
  return settings;
};

/** Currency of a firm’s prices, ISO 4217. */
export const currencyOf = async (db: Db, firmId: string): Promise<string> =>
  (await pricingOf(db, firmId)).currency;

const hasPrices = async (db: Db, firmId: string): Promise<boolean> =>
  (
    await db
      .select({ id: cataloguePrices.id })
      .from(cataloguePrices)
      .where(eq(cataloguePrices.firmId, firmId))
      .limit(1)
  ).length > 0;

/** Whether a quote is being written, whose costs are in the currency of today. */
const hasDraftQuotes = async (db: Db, firmId: string): Promise<boolean> =>
  (
    await db
      .select({ id: quotes.id })
      .from(quotes)
      .where(and(eq(quotes.firmId, firmId), eq(quotes.state, 'draft')))
      .limit(1)
  ).length > 0;

const settingsOf = async (db: Db, firmId: string): Promise<FirmPricing> => ({
  ...(await pricingOf(db, firmId)),
  currencyOpen: !(await hasPrices(db, firmId)),
});

/** What quotes and orders begin with. Not allowed: who does not see costs. */
export const openPricing = async (db: Db, actor: Actor): Promise<Outcome<FirmPricing>> =>
  refuseUnlessPricing(actor) ?? done(await settingsOf(db, actor.firmId));

/** Changes the settings. What was quoted and ordered keeps those of its day; prices keep their currency. */
export const changePricing = async (
  db: Db,
  actor: Actor,
  { revision, ...change }: z.output<typeof firmPricingChangeSchema>,
): Promise<Outcome<FirmPricing>> => {
  const refusal = refuseUnlessManaging(actor);
  if (refusal) return refusal;
  return db.transaction(async (tx): Promise<Outcome<FirmPricing>> => {
    // Prices are entered under the same lock, so none slips in while the currency changes.
    await lockCatalogue(tx, actor.firmId);
    const before = await pricingOf(tx, actor.firmId);
    if (before.revision !== revision) {
      return changedMeanwhile(
        'These settings were changed since you opened them, so yours were not stored over them.',
        { current: await settingsOf(tx, actor.firmId) },
      );
    }
    const after = { ...before, ...change, revision: revision + 1 };
    if (after.currency !== before.currency && (await hasPrices(tx, actor.firmId))) {
      return invalid(
        `The catalogue’s prices are in ${before.currency} and would mean another sum.`,
        [
          {
            path: ['currency'],
            message: `The catalogue holds prices in ${before.currency}, so the currency stays`,
          },
        ],
      );
    }
    if (after.currency !== before.currency && (await hasDraftQuotes(tx, actor.firmId))) {
      return invalid(`A quote in ${before.currency} is being written and would mean another sum.`, [
        {
          path: ['currency'],
          message: `A quote is being written in ${before.currency}. Send it or throw it away first`,
        },
      ]);
    }
    await tx
      .insert(firmPricing)
      .values({ firmId: actor.firmId, ...after })
      .onConflictDoUpdate({ target: firmPricing.firmId, set: after });
    await recordAudit(
      tx,
      actor,
      'firm.prices-set',
      { type: 'firm', id: actor.firmId },
      { what: Object.keys(change).join(', ') },
    );
    return done(await settingsOf(tx, actor.firmId));
  });
};

import { and, desc, eq } from 'drizzle-orm';
import { alias } from 'drizzle-orm/pg-core';
import type { z } from 'zod';
import type {
  quoteChangeSchema,
  QuoteDetail,
  QuoteTotals,
  SentQuote,
  VersionQuotes,
} from '@/api-types/quotes';
import { people, quotes, versions } from '@/db/schema';
import { recordAudit } from '../audit';
import { currencyOf, pricingOf } from '../catalogue/pricing-settings';
import type { Db } from '../database';
import { newId } from '../ids';
import { changedMeanwhile, done, notAllowed, notFound, type Outcome } from '../outcomes';
import { permissions, refuseUnlessPricing, seesCosts, type Actor } from '../permissions';
import { isUniqueViolation } from '../postgres-errors';
import { pricingOfVersion } from '../pricing/version-pricing';
import { seenVersion, type SeenVersion } from '../seen-version';
import { today } from '../today';
import { draftFigures, firstDraft } from './quote-figures';
import { quoteReaders } from './quote-readers';

const senders = alias(people, 'senders');

const quoteRows = (db: Db) =>
  db
    .select({
      quote: quotes,
      maker: { id: people.id, name: people.name },
      sender: { id: senders.id, name: senders.name },
    })
    .from(quotes)
    .innerJoin(people, eq(people.id, quotes.createdBy))
    .leftJoin(senders, eq(senders.id, quotes.sentBy))
    .$dynamic();

type Row = Awaited<ReturnType<typeof quoteRows>>[number];

const detailOf = ({ quote: row, maker, sender }: Row, currency: string): QuoteDetail => {
  const figures = row.sent
    ? { quote: row.sent.quote, unpriced: [] }
    : draftFigures(row.draft, currency, today());
  return {
    id: row.id,
    versionId: row.versionId,
    state: row.state,
    number: row.number,
    revision: row.revision,
    draft: row.draft,
    ...figures,
    createdAt: row.createdAt.toISOString(),
    createdBy: maker,
    sentAt: row.sentAt?.toISOString() ?? null,
    sentBy: sender,
  };
};

/** What a client sees: totals of what was sent, neither cost nor margin. */
const totalsOf = (row: Row['quote'], sent: SentQuote, replaced: boolean): QuoteTotals => ({
  id: row.id,
  number: sent.number,
  sentAt: row.sentAt!.toISOString(),
  validUntil: sent.quote.validUntil,
  replaced,
  currency: sent.quote.currency,
  taxName: sent.tax.name,
  netMinor: sent.quote.netMinor,
  taxMinor: sent.quote.taxMinor,
  totalMinor: sent.quote.totalMinor,
  note: sent.note,
});

/** The quotes of a version, newest first: in full for those who see costs, totals of what is sent for clients. */
export const listQuotes = async (
  db: Db,
  actor: Actor,
  versionId: string,
): Promise<Outcome<VersionQuotes>> => {
  const version = await seenVersion(db, actor, versionId);
  if (!version) return notFound('version');
  if (!permissions['quote totals'][actor.role]) {
    return notAllowed('Quotes are between the firm and its client.');
  }
  const rows = await quoteRows(db)
    .where(and(eq(quotes.firmId, actor.firmId), eq(quotes.versionId, versionId)))
    .orderBy(desc(quotes.createdAt), desc(quotes.id));
  const sent = rows.filter(({ quote }) => quote.sent);
  const newest = [...sent].sort((a, b) => b.quote.sentAt!.getTime() - a.quote.sentAt!.getTime())[0]
    ?.quote.id;
  const currency = await currencyOf(db, actor.firmId);
  return done({
    quotes: seesCosts(actor.role) ? rows.map((row) => detailOf(row, currency)) : [],
    totals: sent.map(({ quote }) => totalsOf(quote, quote.sent!, quote.id !== newest)),
    clients: seesCosts(actor.role) ? await quoteReaders(db, actor.firmId, version.projectId) : [],
  });
};

/** A quote with the version it is of, if the actor sees the version and costs. */
export const pricedQuote = async (
  db: Db,
  actor: Actor,
  id: string,
): Promise<Outcome<{ row: Row; version: SeenVersion }>> => {
  const [found] = await db
    .select({ versionId: quotes.versionId })
    .from(quotes)
    .innerJoin(versions, and(eq(versions.firmId, quotes.firmId), eq(versions.id, quotes.versionId)))
    .where(and(eq(quotes.firmId, actor.firmId), eq(quotes.id, id)));
  const version = found && (await seenVersion(db, actor, found.versionId));
  if (!version) return notFound('quote');
  const refusal = refuseUnlessPricing(actor);
  if (refusal) return refusal;
  const [row] = await quoteRows(db).where(and(eq(quotes.firmId, actor.firmId), eq(quotes.id, id)));
  return done({ row, version });
};

/** Not found: no such one. Not allowed: who does not see costs. */
export const openQuote = async (
  db: Db,
  actor: Actor,
  id: string,
): Promise<Outcome<QuoteDetail>> => {
  const found = await pricedQuote(db, actor, id);
  return found.ok ? done(detailOf(found.value.row, await currencyOf(db, actor.firmId))) : found;
};

const draftOf = async (db: Db, actor: Actor, versionId: string): Promise<string | undefined> =>
  (
    await db
      .select({ id: quotes.id })
      .from(quotes)
      .where(
        and(
          eq(quotes.firmId, actor.firmId),
          eq(quotes.versionId, versionId),
          eq(quotes.state, 'draft'),
        ),
      )
  )[0]?.id;

/** Begins a quote from the version's take-off; a version has one draft at a time. */
export const beginQuote = async (
  db: Db,
  actor: Actor,
  versionId: string,
): Promise<Outcome<QuoteDetail>> => {
  const version = await seenVersion(db, actor, versionId);
  if (!version) return notFound('version');
  const refusal = refuseUnlessPricing(actor);
  if (refusal) return refusal;
  const already = await draftOf(db, actor, versionId);
  if (already) return openQuote(db, actor, already);
  const pricing = await pricingOfVersion(db, actor.firmId, versionId);
  if (!pricing) {
    return changedMeanwhile(
      'This version was saved before take-offs were kept with versions. Save its floor as a new version and quote that.',
    );
  }
  const [{ report }] = await db
    .select({ report: versions.report })
    .from(versions)
    .where(and(eq(versions.firmId, actor.firmId), eq(versions.id, versionId)));
  const draft = firstDraft(pricing.takeOff, report, await pricingOf(db, actor.firmId));
  const id = newId();
  try {
    await db.transaction(async (tx) => {
      await tx
        .insert(quotes)
        .values({ id, firmId: actor.firmId, versionId, draft, createdBy: actor.personId });
      await recordAudit(tx, actor, 'quote.begun', { type: 'quote', id }, { versionId });
    });
  } catch (error) {
    const other = isUniqueViolation(error, 'quotes_one_draft')
      ? await draftOf(db, actor, versionId)
      : undefined;
    if (!other) throw error;
    return openQuote(db, actor, other);
  }
  return openQuote(db, actor, id);
};

/** Locks a draft that is still at the revision that the person saw; else says what became of it. */
export const lockedDraft = async (
  tx: Db,
  actor: Actor,
  id: string,
  revision: number,
): Promise<Outcome<typeof quotes.$inferSelect>> => {
  const [row] = await tx
    .select()
    .from(quotes)
    .where(and(eq(quotes.firmId, actor.firmId), eq(quotes.id, id)))
    .for('update');
  if (!row) return notFound('quote');
  if (row.state === 'sent') {
    return changedMeanwhile(`This quote was sent as ${row.number} and stays as it is.`);
  }
  if (row.revision !== revision) {
    const current = await openQuote(tx, actor, id);
    return changedMeanwhile(
      'This quote was changed since you opened it, so yours was not stored over it.',
      current.ok ? { current: current.value } : undefined,
    );
  }
  return done(row);
};

/** Changes a draft. Changed meanwhile: another revision, or sent already. */
export const changeQuote = async (
  db: Db,
  actor: Actor,
  id: string,
  { revision, ...change }: z.output<typeof quoteChangeSchema>,
): Promise<Outcome<QuoteDetail>> => {
  const found = await pricedQuote(db, actor, id);
  if (!found.ok) return found;
  const changed = await db.transaction(async (tx): Promise<Outcome<null>> => {
    const locked = await lockedDraft(tx, actor, id, revision);
    if (!locked.ok) return locked;
    await tx
      .update(quotes)
      .set({
        draft: { ...locked.value.draft, ...change },
        revision: revision + 1,
        updatedAt: new Date(),
      })
      .where(and(eq(quotes.firmId, actor.firmId), eq(quotes.id, id)));
    return done(null);
  });
  return changed.ok ? openQuote(db, actor, id) : changed;
};

/** Throws a draft away; what was sent stays. */
export const dropQuote = async (
  db: Db,
  actor: Actor,
  id: string,
): Promise<Outcome<Record<string, never>>> => {
  const found = await pricedQuote(db, actor, id);
  if (!found.ok) return found;
  return db.transaction(async (tx): Promise<Outcome<Record<string, never>>> => {
    const own = and(eq(quotes.firmId, actor.firmId), eq(quotes.id, id));
    const [row] = await tx.select().from(quotes).where(own).for('update');
    if (!row) return notFound('quote');
    if (row.state === 'sent') {
      return changedMeanwhile(`This quote was sent as ${row.number} and stays as it is.`);
    }
    await tx.delete(quotes).where(own);
    await recordAudit(
      tx,
      actor,
      'quote.thrown-away',
      { type: 'quote', id },
      { versionId: row.versionId },
    );
    return done({});
  });
};

import { quoteGroups, type QuoteDetail, type QuoteGroup, type SentQuote } from '@/api-types/quotes';
import type { QuotePaper } from '@/sheets/quote-sheet';
import { quoteSheets } from '@/sheets/quote-sheet';
import { pricingOf } from '../catalogue/pricing-settings';
import type { Db } from '../database';
import { done, notFound, type Outcome } from '../outcomes';
import { threadPdf } from '../pdf/pdf-thread';
import { permissions, seesCosts, type Actor } from '../permissions';
import { firmOnPaper, personName, versionOnPaper } from '../pricing/on-paper';
import { seenVersion, type SeenVersion } from '../seen-version';
import { clientNameOf, quoteRow } from './quote-rows';
import { openQuote } from './quotes';

const GROUP_NAMES: Readonly<Record<QuoteGroup, string>> = {
  materials: 'Materials',
  labour: 'Work',
  other: 'Other',
};

/** What the client reads of a quote: each group's lines and sum. Lines of nothing are left out. */
const quotePaper = (sent: Omit<SentQuote, 'number'> & { number: string | null }): QuotePaper => {
  const { firm, version, quote, tax } = sent;
  const lines = quote.lines.filter(({ amount }) => amount > 0);
  const reach = [firm.phone, firm.email].filter(Boolean);
  return {
    size: sent.paper,
    firm: {
      name: firm.name,
      lines: [...firm.address.split('\n').filter(Boolean), ...reach],
      registration: firm.registration,
    },
    clientName: sent.clientName,
    number: sent.number,
    on: quote.on,
    validUntil: quote.validUntil,
    preparedBy: sent.sentBy,
    project: version.projectName,
    floor: `${version.layoutName}, version ${version.number} (${version.label})`,
    fingerprint: version.shortFingerprint,
    groups: quoteGroups
      .map((group) => ({
        name: GROUP_NAMES[group],
        lines: lines.filter(({ id }) => sent.groups[id] === group),
      }))
      .filter((group) => group.lines.length > 0)
      .map((group) => ({
        ...group,
        netMinor: group.lines.reduce((sum, { netMinor }) => sum + netMinor, 0),
      })),
    currency: quote.currency,
    netMinor: quote.netMinor,
    tax: {
      name: tax.name,
      words: `${tax.share / 100}\u202f%${tax.on === 'lines' ? ', of each line' : ''}`,
      minor: quote.taxMinor,
    },
    roundingMinor: quote.roundingMinor,
    totalMinor: quote.totalMinor,
    note: sent.note,
    terms: sent.terms,
  };
};

/** What a draft would say if it were sent today by the actor. */
export const asSent = async (
  db: Db,
  actor: Actor,
  version: SeenVersion,
  { draft, quote }: Pick<QuoteDetail, 'draft' | 'quote'>,
): Promise<Omit<SentQuote, 'number'>> => ({
  firm: await firmOnPaper(db, actor.firmId),
  clientName: await clientNameOf(db, version),
  version: versionOnPaper(version),
  sentBy: await personName(db, actor.personId),
  groups: Object.fromEntries(draft.lines.map(({ id, group }) => [id, group])),
  quote,
  note: draft.note,
  terms: draft.terms,
  tax: draft.tax,
  paper: (await pricingOf(db, actor.firmId)).paper,
});

/** The quote’s paper; one without a number is a draft. */
export const quotePdf = (sent: Omit<SentQuote, 'number'> & { number: string | null }) =>
  threadPdf(quoteSheets(quotePaper(sent)), {
    title: sent.number === null ? 'Quote (draft)' : `Quote ${sent.number}`,
    author: sent.firm.name,
  });

/** A quote as its client reads it: of what is sent for those who see its totals, of a draft for those who see costs. */
export const openQuotePdf = async (
  db: Db,
  actor: Actor,
  id: string,
): Promise<Outcome<Uint8Array>> => {
  const row = await quoteRow(db, actor.firmId, id);
  const version = row && (await seenVersion(db, actor, row.versionId));
  if (!row || !version || !permissions['quote totals'][actor.role]) return notFound('quote');
  if (row.sent) return done(await quotePdf(row.sent));
  if (!seesCosts(actor.role)) return notFound('quote');
  const detail = await openQuote(db, actor, id);
  if (!detail.ok) return detail;
  return done(
    await quotePdf({ ...(await asSent(db, actor, version, detail.value)), number: null }),
  );
};

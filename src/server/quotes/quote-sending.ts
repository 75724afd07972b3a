import { and, eq } from 'drizzle-orm';
import type { QuoteSent, SentQuote } from '@/api-types/quotes';
import { quotes } from '@/db/schema';
import { formatMoney } from '@/takeoff/money';
import { dayText } from '@/takeoff/day-text';
import { recordAudit } from '../audit';
import { pricingOf } from '../catalogue/pricing-settings';
import type { Db } from '../database';
import type { Letter } from '../mail/letter';
import { attachment, postLetter } from '../mail/outbox';
import { changedMeanwhile, done, invalid, type Outcome } from '../outcomes';
import { onlookersOf } from '../onlookers';
import { pdfThreadBegun } from '../pdf/pdf-thread';
import type { Actor } from '../permissions';
import { nextNumber, numberedFile } from '../pricing/paper-numbers';
import { versionName, type SeenVersion } from '../seen-version';
import { today } from '../today';
import { draftFigures } from './quote-figures';
import { asSent, quotePdf } from './quote-paper';
import { lockedDraft, openQuote, pricedQuote } from './quotes';

const letterOf = (sent: SentQuote, version: SeenVersion, name: string): Letter => ({
  kind: 'quote-sent',
  subject: `Quote ${sent.number} from ${sent.firm.name}: ${version.projectName}`,
  name,
  blocks: [
    {
      kind: 'paragraph',
      text:
        `${sent.sentBy} of ${sent.firm.name} has sent you quote ${sent.number} for ${versionName(version)} of ` +
        `${version.projectName}: ${formatMoney(sent.quote.totalMinor, sent.quote.currency)} in all. It holds until ${dayText(sent.quote.validUntil)} and goes with this letter.`,
    },
    ...(sent.note ? [{ kind: 'quote', by: sent.sentBy, text: sent.note } as const] : []),
    { kind: 'action', label: 'Look at the floor and the quote', path: `/versions/${version.id}` },
  ],
  why: `You are on this project of ${sent.firm.name}. Which letters you get is for you to say on your account page.`,
});

/**
 * Sends a quote: numbered, frozen, shown to the project's clients and written to them, all or nothing. Only of a version that
 * was shared, for nobody would see it, and only when every line has its cost.
 */
export const sendQuote = async (
  db: Db,
  actor: Actor,
  id: string,
  { revision }: { readonly revision: number },
): Promise<Outcome<QuoteSent>> => {
  const found = await pricedQuote(db, actor, id);
  if (!found.ok) return found;
  const { version } = found.value;
  // Read in beforehand: the transaction is not to wait for it.
  await pdfThreadBegun();
  const outcome = await db.transaction(async (tx): Promise<Outcome<number>> => {
    const locked = await lockedDraft(tx, actor, id, revision);
    if (!locked.ok) return locked;
    if (version.state === 'saved') {
      return changedMeanwhile(
        'The client does not see this version yet. Share it with them first, then send its quote.',
      );
    }
    const { draft } = locked.value;
    const settings = await pricingOf(tx, actor.firmId);
    const figures = draftFigures(draft, settings.currency, today());
    if (!draft.lines.some(({ amount }) => amount > 0)) {
      return invalid('There is nothing in this quote yet.', [
        { path: ['lines'], message: 'Add a line with an amount first' },
      ]);
    }
    if (figures.unpriced.length > 0) {
      return invalid(`Say first what it costs: ${figures.unpriced.join(', ')}.`, [
        { path: ['lines'], message: `has no cost for ${figures.unpriced.join(', ')}` },
      ]);
    }
    const number = await nextNumber(tx, actor.firmId, 'quote', settings.quotePrefix);
    const { quote } = figures;
    const sent: SentQuote = {
      ...(await asSent(tx, actor, version, { draft, quote })),
      number,
    };
    await tx
      .update(quotes)
      .set({
        state: 'sent',
        number,
        sent,
        validUntil: quote.validUntil,
        revision: revision + 1,
        sentBy: actor.personId,
        sentAt: new Date(),
        updatedAt: new Date(),
      })
      .where(and(eq(quotes.firmId, actor.firmId), eq(quotes.id, id)));
    await recordAudit(
      tx,
      actor,
      'quote.sent',
      { type: 'quote', id },
      { number, versionId: version.id, project: version.projectName },
    );
    const pdf = attachment(
      numberedFile('quote', number, 'pdf'),
      'application/pdf',
      await quotePdf(sent),
    );
    const readers = (await onlookersOf(tx, version, actor.personId)).filter(
      ({ role, mailSteps }) => role === 'client' && mailSteps,
    );
    for (const reader of readers) {
      await postLetter(
        tx,
        {
          to: reader.email,
          firmId: actor.firmId,
          attachments: [pdf],
          ...(sent.firm.email ? { replyTo: sent.firm.email } : {}),
        },
        letterOf(sent, version, reader.name),
      );
    }
    return done(readers.length);
  });
  if (!outcome.ok) return outcome;
  const quote = await openQuote(db, actor, id);
  return quote.ok ? done({ ...quote.value, written: outcome.value }) : quote;
};

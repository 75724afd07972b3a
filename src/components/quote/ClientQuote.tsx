import { useQuery } from '@tanstack/react-query';
import type { VersionQuotes } from '@/api-types/quotes';
import { dayText } from '@/takeoff/day-text';
import { formatMoney } from '@/takeoff/money';
import { api } from '../ui/api';
import { Wrong } from '../ui/Wrong';
import { todayHere } from '../catalogue/catalogue-words';

/** The newest quote of a version as its client sees it: what it comes to, and the paper. */
export function ClientQuote({ versionId }: { versionId: string }) {
  const quotes = useQuery({
    queryKey: ['quotes', versionId],
    queryFn: () => api<VersionQuotes>('GET', `/api/versions/${versionId}/quotes`),
  });
  const quote = quotes.data?.totals.find(({ replaced }) => !replaced);
  if (quotes.error) return <Wrong error={quotes.error} again={() => void quotes.refetch()} />;
  if (!quote) return null;
  const money = (minor: number) => formatMoney(minor, quote.currency);
  const over = quote.validUntil < todayHere();
  return (
    <section aria-label="Quote">
      <h2 className="border-b border-graphite pb-1 text-base">What it comes to</h2>
      {quote.note && <p className="mt-2 whitespace-pre-line">{quote.note}</p>}
      <dl className="hairlines border-b border-stone-300" data-testid="quote-total">
        <div className="flex justify-between gap-4 py-1.5">
          <dt>Without tax</dt>
          <dd>{money(quote.netMinor)}</dd>
        </div>
        <div className="flex justify-between gap-4 py-1.5">
          <dt>{quote.taxName}</dt>
          <dd>{money(quote.taxMinor)}</dd>
        </div>
        <div className="flex justify-between gap-4 py-2 text-lg font-bold">
          <dt>Total</dt>
          <dd>{money(quote.totalMinor)}</dd>
        </div>
      </dl>
      <p className={`mt-2 text-sm ${over ? 'text-amber' : 'text-slate'}`}>
        Quote {quote.number},{' '}
        {over
          ? `held until ${dayText(quote.validUntil)}. Ask for a new one.`
          : `holds until ${dayText(quote.validUntil)}.`}
      </p>
      <a className="button mt-2" href={`/api/quotes/${quote.id}/pdf`} target="_blank">
        Read the quote (PDF)
      </a>
    </section>
  );
}

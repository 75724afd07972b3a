import type { QuoteDraft, QuoteDraftLine } from '@/api-types/quotes';
import type { FirmPricing } from '@/api-types/pricing';
import type { Report } from '@/paving/report';
import { PLAIN_ROUNDING } from '@/takeoff/money';
import { packPlural } from '@/takeoff/order-packs';
import { labourLine, quoteOf, type Quote } from '@/takeoff/quote';
import type { TakeOff } from '@/takeoff/take-off';

type Settings = Omit<FirmPricing, 'currencyOpen'>;

/** Areas are quoted to the hundredth of a square metre. */
const AREA_PARTS = 100;

const labour = (
  by: 'hour' | 'area',
  amount: number,
  rateMinor: number,
): readonly QuoteDraftLine[] => {
  if (rateMinor === 0) return [];
  return [{ ...labourLine(by, amount, rateMinor), group: 'labour' }];
};

/** A quote to begin with: what the take-off says to buy, and labour at the firm's rates. */
export const firstDraft = (taken: TakeOff, report: Report, settings: Settings): QuoteDraft => ({
  lines: [
    ...taken.orders.map(({ id, name, amount, pack, packCostMinor }) => ({
      id,
      group: 'materials' as const,
      name,
      amount,
      measure: packPlural(pack.name, amount),
      costMinor: packCostMinor,
    })),
    ...labour(
      'area',
      Math.round(report.groundArea * AREA_PARTS) / AREA_PARTS,
      settings.labourAreaMinor,
    ),
    ...labour('hour', 0, settings.labourHourMinor),
  ],
  margin: { of: settings.marginOf, share: settings.marginBasisPoints },
  tax: { name: settings.taxName, share: settings.taxBasisPoints, on: settings.taxOn },
  validDays: settings.validDays,
  roundTo: PLAIN_ROUNDING.step,
  note: '',
  terms: settings.quoteTerms,
});

/** The sums of a draft on a day. What has no cost yet counts nothing, and is named. */
export const draftFigures = (
  draft: QuoteDraft,
  currency: string,
  on: string,
): { readonly quote: Quote; readonly unpriced: readonly string[] } => {
  const { lines, margin, tax, validDays, roundTo } = draft;
  const quote = quoteOf(
    lines.map(({ id, name, amount, measure, costMinor }) => ({
      id,
      name,
      amount,
      measure,
      costMinor: costMinor ?? 0,
    })),
    { currency, margin, tax, rounding: { ...PLAIN_ROUNDING, step: roundTo }, on, validDays },
  );
  return {
    quote,
    unpriced: lines
      .filter(({ costMinor, amount }) => costMinor === null && amount > 0)
      .map(({ name }) => name),
  };
};

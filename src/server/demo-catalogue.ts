import type { NewItem } from '@/api-types/catalogue';
import { newItemSchema } from '@/api-types/catalogue';
import { firmPricingChangeSchema } from '@/api-types/pricing';
import { newSupplierSchema } from '@/api-types/suppliers';
import type { LayoutDocument } from '@/paving/layout-document';
import { dayAfter } from '@/takeoff/quote';
import { addItem, changeItem } from './catalogue/items';
import { changePricing } from './catalogue/pricing-settings';
import { addSupplier } from './catalogue/suppliers';
import type { Db } from './database';
import { sendOrder } from './orders/order-sending';
import { beginOrders, changeOrder } from './orders/orders';
import type { Outcome } from './outcomes';
import type { Actor } from './permissions';
import { sendQuote } from './quotes/quote-sending';
import { beginQuote, changeQuote } from './quotes/quotes';
import { today } from './today';

/** Invented suppliers, at addresses that can never exist (the domain `example`, RFC 2606). */
const SUPPLIERS = [
  {
    name: 'Quennock Stone Works',
    email: 'orders@quennock.example',
    phone: '',
    address: 'Upper Bed Lane\nQuennock',
    note: 'Tail lift on request. Pallets go back.',
  },
  {
    name: 'Brambleford Pits',
    email: 'loads@brambleford.example',
    phone: '',
    address: 'Pit Road\nBrambleford',
    note: 'Closed on Saturdays.',
  },
  {
    name: 'Tallowmere Yard Supplies',
    email: 'desk@tallowmere.example',
    phone: '',
    address: '3 Wharf End\nTallowmere',
    note: '',
  },
] as const;

interface DemoItem extends Omit<NewItem, 'supplierId' | 'price'> {
  /** Which of the suppliers. */
  readonly from: 0 | 1 | 2;
  /** Last year's price and this year's, minor units. */
  readonly prices: readonly [number, number];
}

const pallet = (packHolds: number) => ({ packName: 'pallet', packHolds }) as const;
const bulkBag = { packName: 'bulk bag', packHolds: 0.8, packMeasure: 't' } as const;

/** Invented prices; sizes are those of the demo's floors. */
// prettier-ignore
const ITEMS: readonly DemoItem[] = [
  { kind: 'unit', name: 'Slab 450 × 450', code: 'QS-450', ...pallet(36), length: 450, width: 450, thickness: 50, tolerance: 2, massKg: 23.3, colour: '#cdc5b4', from: 0, prices: [37_800, 39_600] },
  { kind: 'unit', name: 'Block 200 × 98', code: 'QB-200', ...pallet(480), length: 200, width: 98, thickness: 60, tolerance: 2, massKg: 2.7, colour: '#a9694f', from: 0, prices: [25_900, 27_400] },
  { kind: 'unit', name: 'Plank 600 × 200', code: 'QP-600', ...pallet(60), length: 600, width: 200, thickness: 50, tolerance: 2, massKg: 13.8, colour: '#b9bcb6', from: 0, prices: [41_000, 43_200] },
  { kind: 'unit', name: 'Slab 600 × 600', code: 'QS-600', ...pallet(24), length: 600, width: 600, thickness: 50, tolerance: 3, massKg: 41.4, colour: '#e2ddd2', from: 0, prices: [45_000, 46_800] },
  { kind: 'aggregate', name: 'River gravel 10 mm', code: 'RG10', ...bulkBag, looseDensity: 1680, stoneLeast: 5, stoneGreatest: 10, colour: '#a89f8d', from: 1, prices: [6400, 6850] },
  { kind: 'aggregate', name: 'Slate chippings 6 mm', code: 'SC6', ...bulkBag, looseDensity: 1550, stoneLeast: 2, stoneGreatest: 6, colour: '#6d7273', from: 1, prices: [8900, 9400] },
  { kind: 'aggregate', name: 'Limestone grit 4 mm', code: 'LG4', ...bulkBag, looseDensity: 1500, stoneLeast: 1, stoneGreatest: 4, colour: '#d9d3c3', from: 1, prices: [7100, 7350] },
  { kind: 'aggregate', name: 'Sharp sand', code: 'SS', ...bulkBag, looseDensity: 1500, stoneLeast: 0, stoneGreatest: 4, colour: '#e0d2ae', from: 1, prices: [5200, 5500] },
  { kind: 'aggregate', name: 'Crushed stone 0–32', code: 'CS32', packName: 'tonne', packMeasure: 't', packWhole: false, looseDensity: 1600, stoneLeast: 0, stoneGreatest: 32, colour: '#8e8f8c', from: 1, prices: [2900, 3100] },
  { kind: 'aggregate', name: 'Fine jointing sand', code: 'JS', packName: 'bag', packHolds: 20, packMeasure: 'kg', looseDensity: 1440, stoneLeast: 0, stoneGreatest: 1.2, colour: '#d8ceb2', from: 2, prices: [640, 680] },
  { kind: 'sundry', name: 'Geotextile, 4.5 m wide', code: 'GT45', packName: 'roll', packHolds: 225, packMeasure: 'm2', from: 2, prices: [19_500, 19_900] },
  { kind: 'sundry', name: 'Steel edging strip', code: 'SE3', packName: 'length', packHolds: 3, packMeasure: 'm', from: 2, prices: [3350, 3480] },
];

const sure = <T>(outcome: Outcome<T>): T => {
  if (outcome.ok) return outcome.value;
  throw new Error(`The demo’s catalogue could not be made: ${JSON.stringify(outcome)}`);
};

/** What a quote's line costs that the catalogue does not list, minor units. */
const UNLISTED_MINOR = 500;

/** Days before today from which the two prices of each item hold. */
const LAST_YEAR = -400;
const THIS_YEAR = -60;

/** Gives the demo firm its settings, suppliers and items; ids of the items by name. */
export const seedCatalogue = async (db: Db, owner: Actor): Promise<ReadonlyMap<string, string>> => {
  sure(
    await changePricing(
      db,
      owner,
      firmPricingChangeSchema.parse({
        revision: 0,
        currency: 'EUR',
        taxName: 'VAT',
        taxBasisPoints: 2000,
        marginOf: 'cost',
        marginBasisPoints: 2200,
        labourAreaMinor: 4800,
        labourHourMinor: 3600,
        validDays: 30,
        quoteTerms:
          'A third when you accept, a third when the base is in, the rest when the floor is done.\nWhat is found in the ground and was not to be seen before is agreed apart.',
        orderTerms:
          'Deliver between 7 and 16 h. Units on pallets, wrapped. Tell us if anything is short.',
        address: '4 Withy Lane\nLarkmoss',
        email: 'desk@larkmoss.example',
        registration: 'Tax number LM 000 001',
      }),
    ),
  );
  const suppliers: string[] = [];
  for (const supplier of SUPPLIERS) {
    suppliers.push(sure(await addSupplier(db, owner, newSupplierSchema.parse(supplier))).id);
  }
  const ids = new Map<string, string>();
  for (const { from, prices, ...fields } of ITEMS) {
    const [before, now] = prices;
    const item = sure(
      await addItem(
        db,
        owner,
        newItemSchema.parse({
          ...fields,
          supplierId: suppliers[from],
          price: { costMinor: before, from: dayAfter(today(), LAST_YEAR) },
        }),
      ),
    );
    const price = { costMinor: now, from: dayAfter(today(), THIS_YEAR) };
    sure(await changeItem(db, owner, item.id, { revision: item.revision, price }));
    ids.set(fields.name, item.id);
  }
  return ids;
};

/** A demo floor drawn with what the demo's catalogue sells. */
export const fromCatalogue = (
  document: LayoutDocument,
  ids: ReadonlyMap<string, string>,
): LayoutDocument => {
  const chosen = (name: string) => {
    const catalogueId = ids.get(name);
    return catalogueId === undefined ? {} : { catalogueId };
  };
  return {
    ...document,
    units: document.units.map((unit) => ({ ...unit, ...chosen(unit.name) })),
    ...(document.aggregate
      ? { aggregate: { ...document.aggregate, ...chosen(document.aggregate.name) } }
      : {}),
    materials: {
      joints: chosen('Fine jointing sand'),
      bedding: chosen('Sharp sand'),
      base: chosen('Crushed stone 0–32'),
      geotextile: chosen('Geotextile, 4.5 m wide'),
      ...document.materials,
    },
  };
};

/** Quotes a version the way a designer does: what has no price is priced, a word is added, and it is sent. */
export const sendDemoQuote = async (db: Db, designer: Actor, versionId: string): Promise<void> => {
  const quote = sure(await beginQuote(db, designer, versionId));
  const lines = quote.draft.lines.map((line) => ({
    ...line,
    amount: line.id === 'labour:hour' ? 6 : line.amount,
    name: line.id === 'labour:hour' ? 'Taking up the old edge' : line.name,
    costMinor: line.costMinor ?? UNLISTED_MINOR,
  }));
  const note = 'Delivery to the lane is in it. We could begin three weeks after you accept.';
  const { revision } = sure(
    await changeQuote(db, designer, quote.id, { revision: quote.revision, lines, note }),
  );
  sure(await sendQuote(db, designer, quote.id, { revision }));
};

/** Orders what a version takes: the first supplier's order is sent, the others are left as drafts. */
export const sendDemoOrder = async (db: Db, designer: Actor, versionId: string): Promise<void> => {
  const { orders } = sure(await beginOrders(db, designer, versionId, {}));
  const first = orders.find(({ supplier }) => supplier.name === SUPPLIERS[0].name);
  if (!first) throw new Error('The demo’s floor takes nothing of its first supplier');
  const { revision } = sure(
    await changeOrder(db, designer, first.id, {
      revision: first.revision,
      deliveryDay: dayAfter(today(), 14),
      deliveryPlace: 'Ashwick round terrace\nFrom the lane; the gate is 2.4 m wide',
    }),
  );
  sure(await sendOrder(db, designer, first.id, { revision, besides: [] }));
};

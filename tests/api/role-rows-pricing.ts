import { and, eq } from 'drizzle-orm';
import { memberships, purchaseOrders } from '@/db/schema';
import { newId } from '@/server/ids';
import { statuses, type Row, type World } from './role-rows';
import { db } from './site';

const COSTS = 'catalogue and cost prices';
const TOTALS = 'quote totals / cost and margin';
const MANAGING = 'people, roles, firm settings';

/** Of the firm as a whole; the stranger is the owner of a firm of their own. */
const costs = (success: number, ofAnother = 404) =>
  statuses([success, success, 403, 403, 403, 403, ofAnother, 401]);
/** Of a version that everybody on the project sees. */
const onVersion = (success: number) => statuses([success, success, 403, 403, 404, 404, 404, 401]);

let counted = 0;
const newName = () => `Thing ${(counted += 1)}`;

const made = async ({ people }: World, path: string, body: unknown): Promise<string> => {
  const answer = await people.owner.visitor.post(path, body);
  if (answer.status !== 201) throw new Error(JSON.stringify(answer.body));
  return answer.body.id;
};

const newItem = (world: World) =>
  made(world, '/api/catalogue', {
    kind: 'sundry',
    name: newName(),
    price: { costMinor: 100, from: '2026-01-01' },
  });

const newSupplier = (world: World) => made(world, '/api/suppliers', { name: newName() });

/** The draft of a quote of the version that all see, with one line of work in it. */
const quoteDraft = async (world: World): Promise<string> => {
  const { visitor } = world.people.owner;
  const id = await made(world, `/api/versions/${world.seenByAll}/quotes`, {});
  const { revision } = (await visitor.get(`/api/quotes/${id}`)).body;
  const line = { id: 'work', group: 'labour', name: 'Work', amount: 1, measure: 'day', costMinor: 100 }; // prettier-ignore
  await visitor.patch(`/api/quotes/${id}`, { revision, lines: [line] });
  return id;
};

const sentQuote = async (world: World): Promise<string> => {
  const id = await quoteDraft(world);
  const { visitor } = world.people.owner;
  const { revision } = (await visitor.get(`/api/quotes/${id}`)).body;
  const sent = await visitor.post(`/api/quotes/${id}/send`, { revision });
  if (sent.status !== 200) throw new Error(JSON.stringify(sent.body));
  return id;
};

const revisionOf = async ({ people }: World, path: string): Promise<number> =>
  (await people.owner.visitor.get(path)).body.revision ?? 1;

/** A draft order of the version that all see, of a supplier of its own. */
const orderDraft = async (world: World): Promise<string> => {
  const name = newName();
  const supplierId = await made(world, '/api/suppliers', { name, email: 'yard@supplier.example' });
  const [{ personId }] = await (
    await db()
  )
    .select({ personId: memberships.personId })
    .from(memberships)
    .where(and(eq(memberships.firmId, world.firmId), eq(memberships.role, 'owner')));
  const id = newId();
  const pack = { name: 'pallet', holds: 36, measure: 'each', whole: true } as const;
  await (await db()).insert(purchaseOrders).values({
    id,
    firmId: world.firmId,
    versionId: world.seenByAll,
    supplierId,
    lines: [{ id: 'slab', itemId: null, name: 'Slab', code: '', pack, amount: 2, costMinor: 1 }],
    createdBy: personId,
  });
  return id;
};

/** Catalogue, prices, quotes and orders. */
export const pricingRows: readonly Row[] = [
  { row: COSTS, endpoint: 'GET /api/catalogue', expected: costs(200, 200) },
  {
    row: COSTS,
    endpoint: 'POST /api/catalogue',
    body: () => ({ kind: 'sundry', name: newName() }),
    expected: costs(201, 201),
  },
  { row: COSTS, endpoint: 'GET /api/catalogue/[id]', id: newItem, expected: costs(200, 404) },
  {
    row: COSTS,
    endpoint: 'PATCH /api/catalogue/[id]',
    id: newItem,
    body: () => ({ revision: 1, note: 'Heavy' }),
    expected: costs(200),
  },
  { row: COSTS, endpoint: 'DELETE /api/catalogue/[id]', id: newItem, expected: costs(200) },
  { row: COSTS, endpoint: 'GET /api/catalogue/[id]/prices', id: newItem, expected: costs(200) },
  { row: COSTS, endpoint: 'GET /api/catalogue/price-list', expected: costs(200, 200) },
  {
    row: COSTS,
    endpoint: 'GET /api/layouts/[id]/price-list',
    id: ({ layout }) => layout,
    expected: onVersion(200),
  },
  {
    row: COSTS,
    endpoint: 'PUT /api/layouts/[id]/price-list',
    id: ({ layout }) => layout,
    body: () => ({
      orderId: 'geotextile',
      price: { costMinor: 120, pack: { holds: 1, measure: 'm2' } },
    }),
    expected: onVersion(200),
  },
  { row: COSTS, endpoint: 'GET /api/catalogue/export', expected: costs(200, 200) },
  {
    row: COSTS,
    endpoint: 'POST /api/catalogue/import',
    query: () => '?how=look',
    body: () => 'Kind,Name\nsundry,Pegs\n',
    expected: costs(200, 200),
  },
  { row: COSTS, endpoint: 'GET /api/suppliers', expected: costs(200, 200) },
  {
    row: COSTS,
    endpoint: 'POST /api/suppliers',
    body: () => ({ name: newName() }),
    expected: costs(201, 201),
  },
  {
    row: COSTS,
    endpoint: 'PATCH /api/suppliers/[id]',
    id: newSupplier,
    body: () => ({ revision: 1, phone: '1' }),
    expected: costs(200),
  },
  { row: COSTS, endpoint: 'GET /api/firm/pricing', expected: costs(200, 200) },
  {
    row: `${MANAGING}: as they stand they may be set again`,
    endpoint: 'PATCH /api/firm/pricing',
    body: async ({ people }, asker) => ({
      revision: (await people[asker].visitor.get('/api/firm/pricing')).body.revision ?? 0,
      taxName: 'VAT',
    }),
    expected: statuses([200, 403, 403, 403, 403, 403, 200, 401]),
  },
  {
    row: TOTALS,
    endpoint: 'GET /api/versions/[id]/pricing',
    id: ({ seenByAll }) => seenByAll,
    expected: onVersion(200),
  },
  {
    row: `${TOTALS}: each sees of it what is theirs, a crew nothing`,
    endpoint: 'GET /api/versions/[id]/cost',
    id: ({ seenByAll }) => seenByAll,
    expected: statuses([200, 200, 200, 200, 404, 404, 404, 401]),
  },
  {
    row: `${TOTALS}: of a version that is not shown`,
    endpoint: 'GET /api/versions/[id]/pricing',
    id: ({ saved }) => saved,
    expected: statuses([200, 200, 404, 404, 404, 404, 404, 401]),
  },
  {
    row: `${TOTALS}: the client sees totals`,
    endpoint: 'GET /api/versions/[id]/quotes',
    id: ({ seenByAll }) => seenByAll,
    expected: statuses([200, 200, 403, 200, 404, 404, 404, 401]),
  },
  {
    row: TOTALS,
    endpoint: 'POST /api/versions/[id]/quotes',
    id: ({ seenByAll }) => seenByAll,
    expected: onVersion(201),
  },
  { row: TOTALS, endpoint: 'GET /api/quotes/[id]', id: quoteDraft, expected: onVersion(200) },
  {
    row: TOTALS,
    endpoint: 'PATCH /api/quotes/[id]',
    id: quoteDraft,
    body: async (world, _asker, id) => ({
      revision: await revisionOf(world, `/api/quotes/${id}`),
      note: 'Soon',
    }),
    expected: onVersion(200),
  },
  {
    row: TOTALS,
    endpoint: 'POST /api/quotes/[id]/send',
    id: quoteDraft,
    body: async (world, _asker, id) => ({
      revision: await revisionOf(world, `/api/quotes/${id}`),
    }),
    expected: onVersion(200),
  },
  {
    row: `${TOTALS}: a draft is the firm’s own`,
    endpoint: 'GET /api/quotes/[id]/pdf',
    id: quoteDraft,
    expected: statuses([200, 200, 404, 404, 404, 404, 404, 401]),
  },
  {
    row: `${TOTALS}: what was sent is the client’s too`,
    endpoint: 'GET /api/quotes/[id]/pdf',
    id: sentQuote,
    expected: statuses([200, 200, 404, 200, 404, 404, 404, 401]),
  },
  { row: TOTALS, endpoint: 'DELETE /api/quotes/[id]', id: quoteDraft, expected: onVersion(200) },
  {
    row: COSTS,
    endpoint: 'GET /api/versions/[id]/orders',
    id: ({ seenByAll }) => seenByAll,
    expected: onVersion(200),
  },
  {
    row: COSTS,
    endpoint: 'POST /api/versions/[id]/orders',
    id: ({ seenByAll }) => seenByAll,
    expected: onVersion(201),
  },
  { row: COSTS, endpoint: 'GET /api/orders/[id]', id: orderDraft, expected: onVersion(200) },
  {
    row: COSTS,
    endpoint: 'PATCH /api/orders/[id]',
    id: orderDraft,
    body: async (world, _asker, id) => ({
      revision: await revisionOf(world, `/api/orders/${id}`),
      note: 'Soon',
    }),
    expected: onVersion(200),
  },
  { row: COSTS, endpoint: 'GET /api/orders/[id]/pdf', id: orderDraft, expected: onVersion(200) },
  { row: COSTS, endpoint: 'GET /api/orders/[id]/csv', id: orderDraft, expected: onVersion(200) },
  {
    row: COSTS,
    endpoint: 'POST /api/orders/[id]/send',
    id: orderDraft,
    body: async (world, _asker, id) => ({
      revision: await revisionOf(world, `/api/orders/${id}`),
    }),
    expected: onVersion(200),
  },
  { row: COSTS, endpoint: 'DELETE /api/orders/[id]', id: orderDraft, expected: onVersion(200) },
];

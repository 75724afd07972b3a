import { and, eq, inArray } from 'drizzle-orm';
import type { PurchaseLine } from '@/api-types/purchase-orders';
import { catalogueItems } from '@/db/schema';
import type { OrderLine, TakeOff } from '@/takeoff/take-off';
import type { Db } from '../database';

/** What one supplier is to deliver. */
export interface SupplierLines {
  readonly supplierId: string;
  readonly lines: readonly PurchaseLine[];
}

/** What a take-off orders, parted by supplier. */
export interface SplitOrders {
  readonly bySupplier: readonly SupplierLines[];
  /** What no supplier of the catalogue sells, by name. */
  readonly unsupplied: readonly string[];
}

/** Longest name of a line, characters. */
const NAME_LIMIT = 160;

/** By the name that the supplier knows, with what the floor calls it, such as which tone, where that differs. */
const lineName = (floor: string, catalogue: string): string =>
  (floor === catalogue ? catalogue : `${catalogue} (${floor})`).slice(0, NAME_LIMIT);

const lineOf = (
  order: OrderLine,
  { name, code }: { readonly name: string; readonly code: string },
): PurchaseLine => ({
  id: order.id,
  itemId: order.item?.id ?? null,
  name: lineName(order.name, name),
  code,
  pack: order.pack,
  amount: order.amount,
  costMinor: order.packCostMinor,
});

/** What a take-off says to buy, parted by who sells it as the catalogue stands. */
export const ordersSplit = async (
  db: Db,
  firmId: string,
  { orders }: TakeOff,
): Promise<SplitOrders> => {
  const wanted = orders.filter(({ amount }) => amount > 0);
  const ids = wanted.flatMap(({ item }) => (item ? [item.id] : []));
  const items = ids.length
    ? await db
        .select({
          id: catalogueItems.id,
          supplierId: catalogueItems.supplierId,
          name: catalogueItems.name,
          code: catalogueItems.code,
        })
        .from(catalogueItems)
        .where(and(eq(catalogueItems.firmId, firmId), inArray(catalogueItems.id, ids)))
    : [];
  const byId = new Map(items.map((item) => [item.id, item]));
  const bySupplier = new Map<string, PurchaseLine[]>();
  const unsupplied: string[] = [];
  for (const order of wanted) {
    const item = order.item && byId.get(order.item.id);
    if (!item?.supplierId) {
      unsupplied.push(order.name);
      continue;
    }
    const own = bySupplier.get(item.supplierId) ?? [];
    bySupplier.set(item.supplierId, [...own, lineOf(order, item)]);
  }
  return {
    bySupplier: [...bySupplier].map(([supplierId, lines]) => ({ supplierId, lines })),
    unsupplied,
  };
};

import type { LayoutDocument } from '@/paving/layout-document';
import {
  materialsSchema,
  orderSchema,
  type MaterialPlace,
  type OrderWay,
} from '@/paving/materials';
import type { OrderLine } from './take-off-line';
import { usBoundWords, type PassedBound } from './typed-bounds';

/** Changes that a take-off makes to its document: what was typed is kept, what is put back is left out. */

type Json = { readonly [key: string]: unknown };

/** `value` at a path of keys; undefined takes the key away, and with it what it leaves empty. */
function set(
  object: Json | undefined,
  [key, ...rest]: readonly string[],
  value: unknown,
): Json | undefined {
  const { [key]: before, ...others } = object ?? {};
  const after = rest.length === 0 ? value : set(before as Json | undefined, rest, value);
  const changed = after === undefined ? others : { ...others, [key]: after };
  return Object.keys(changed).length === 0 ? undefined : changed;
}

const withPath = (
  document: LayoutDocument,
  field: readonly string[],
  value: unknown,
): LayoutDocument => {
  const { [field[0] as 'order']: _before, ...others } = document;
  const after = set(document[field[0] as 'order'] as Json | undefined, field.slice(1), value);
  return (after === undefined ? others : { ...others, [field[0]]: after }) as LayoutDocument;
};

/** The document with an assumption's value; undefined goes back to the default. */
export function assumptionSet(
  document: LayoutDocument,
  field: readonly string[],
  value: number | string | boolean | undefined,
): LayoutDocument {
  if (field.join() === 'order,spares,value') {
    const rule = document.order?.spares?.rule ?? 'percent';
    return withPath(
      document,
      ['order', 'spares'],
      value === undefined ? undefined : { rule, value },
    );
  }
  const next = withPath(document, field, value);
  // A new kind of stone brings its own figures; those of the old one would be wrong.
  if (field[0] === 'materials' && field[2] === 'kind') {
    return ['name', 'catalogueId', 'stone', 'density', 'bulk'].reduce(
      (now, key) => withPath(now, [field[0], field[1], key], undefined),
      next,
    );
  }
  if (field.join() === 'materials,spoil,ground') {
    return ['density', 'bulk'].reduce(
      (now, key) => withPath(now, ['materials', 'spoil', key], undefined),
      next,
    );
  }
  return next;
}

/** Spares by another rule; a rule begins with what is usual for it. */
export function sparesRuled(document: LayoutDocument, rule: 'percent' | 'count'): LayoutDocument {
  return withPath(document, ['order', 'spares'], { rule, value: rule === 'percent' ? 5 : 2 });
}

/** An order bought in another way. */
export const orderWaySet = (
  document: LayoutDocument,
  orderId: string,
  way: OrderWay | undefined,
): LayoutDocument => withPath(document, ['order', 'ways', orderId], way);

/** An order bought as an entry of the catalogue, or as none. */
export function orderItemSet(
  document: LayoutDocument,
  order: Pick<OrderLine, 'kind' | 'lines'>,
  catalogueId: string | undefined,
): LayoutDocument {
  if (order.kind === 'unit') {
    const id = /^units:(.*):[^:]*$/.exec(order.lines[0])![1];
    const units = document.units.map((unit) => {
      if (unit.id !== id) return unit;
      const { catalogueId: _before, ...others } = unit;
      return catalogueId === undefined ? others : { ...others, catalogueId };
    });
    return { ...document, units };
  }
  if (order.kind === 'sundry') {
    const next = withPath(document, ['materials', order.lines[0], 'catalogueId'], catalogueId);
    return order.lines[0] === 'edging'
      ? withPath(next, ['materials', 'edging', 'wanted'], true)
      : next;
  }
  const places = order.lines.map((line) => line.split(':')[1] as MaterialPlace);
  return places.reduce(
    (now, place) =>
      ['kind', 'name', 'stone', 'density'].reduce(
        (cleared, key) => withPath(cleared, ['materials', place, key], undefined),
        withPath(now, ['materials', place, 'catalogueId'], catalogueId),
      ),
    document,
  );
}

type Issue = { readonly code?: string; readonly minimum?: unknown; readonly maximum?: unknown };

function passedBound({ code, minimum, maximum }: Issue): PassedBound | null {
  if (code === 'too_small') return { side: 'least', value: Number(minimum) };
  return code === 'too_big' ? { side: 'most', value: Number(maximum) } : null;
}

/** Why a value would not do, or null: the schema's own words, its bounds in the measures of the document. */
export function assumptionRefused(
  document: LayoutDocument,
  field: readonly string[],
  value: number,
): string | null {
  const next = assumptionSet(document, field, value);
  const read =
    field[0] === 'order'
      ? orderSchema.safeParse(next.order ?? {})
      : materialsSchema.safeParse(next.materials ?? {});
  if (read.success) return null;
  const [issue] = read.error.issues;
  const { message } = issue;
  const bound = document.display === 'imperial' ? passedBound(issue) : null;
  const usWords = bound && usBoundWords(field, bound);
  if (usWords) return usWords;
  return `${message[0].toUpperCase()}${message.slice(1)}.`;
}

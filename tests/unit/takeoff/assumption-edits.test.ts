import { describe, expect, it } from 'vitest';
import { layFloor } from '@/paving/laying';
import type { LayoutDocument } from '@/paving/layout-document';
import { floorReport } from '@/paving/report';
import {
  assumptionRefused,
  assumptionSet,
  orderItemSet,
  orderWaySet,
  sparesRuled,
} from '@/takeoff/assumption-edits';
import { takeOff } from '@/takeoff/take-off';
import { documentOf, parsed, unitOf } from '../../oracle/documents';

const plain = parsed(
  documentOf({ units: [unitOf('a', 300)], bond: { kind: 'chequer', unit: 'a', joint: 5 } }),
);
const taken = (document: LayoutDocument) => {
  const laying = layFloor(parsed(document));
  return takeOff(laying, floorReport(laying), null);
};

describe('an assumption that is typed', () => {
  const assumptions = [...taken(plain).lines, ...taken(plain).orders]
    .flatMap(({ assumptions: all }) => all)
    .filter(({ field, raw }) => field !== null && raw !== null);

  it('is kept where its line says, for every line and order', () => {
    expect(assumptions.length).toBeGreaterThan(15);
    for (const { field, raw, name } of assumptions) {
      const typed = raw! * 1.25;
      const next = assumptionSet(plain, field!, typed);
      expect(assumptionRefused(plain, field!, typed), name).toBeNull();
      const now = [...taken(next).lines, ...taken(next).orders]
        .flatMap(({ assumptions: all }) => all)
        .filter((one) => one.field?.join() === field!.join());
      expect(now.length, name).toBeGreaterThan(0);
      for (const one of now)
        expect(one).toMatchObject({ raw: typed, own: true, source: 'typed in' });
    }
  });

  it('put back, leaves the document as it was', () => {
    for (const { field, raw } of assumptions) {
      const there = assumptionSet(plain, field!, raw! * 1.25);
      expect(assumptionSet(there, field!, undefined)).toEqual(plain);
    }
  });

  it.each([
    [['materials', 'base', 'bulk'], 0.2, /at least 0.5/],
    [['materials', 'voids', 'depth'], -3, /more than 0 mm/],
    [['materials', 'base', 'density'], 20, /at least 100 kg\/m³/],
    [['order', 'spares', 'value'], 120, /at most 100 %/],
    [['materials', 'geotextile', 'rollWidth'], 25_000, /^Is over 20 m/],
    [['materials', 'geotextile', 'rollWidth'], 250, /wider than their lap/],
  ])('%j of %d is refused', (field, value, words) => {
    expect(assumptionRefused(plain, field, value)).toMatch(words);
  });
});

it('a count of spares is refused in words', () => {
  const counted = sparesRuled(plain, 'count');
  const refused = (value: number) =>
    assumptionRefused(counted, ['order', 'spares', 'value'], value);
  expect(refused(-3)).toBe('Must be none or more.');
  expect(refused(2.5)).toBe('Must be a whole number.');
  expect(refused(1e7)).toBe('Must be at most a million.');
});

describe('on a floor in feet and inches', () => {
  const us = { ...plain, display: 'imperial' as const };
  // By 1 lb = 0.453 592 37 kg and 1 ft = 304.8 mm, rounded towards what is allowed.
  it.each([
    [['materials', 'base', 'density'], 20, 'Must be at least 6.3\u202flb/ft³.'],
    [['order', 'bag'], 400, 'Must be at most 220.4\u202flb.'],
    [['order', 'bag'], 0.1, 'Must be at least 2.3\u202flb.'],
    [['materials', 'voids', 'depth'], -3, 'Must be more than 0.'],
    [['materials', 'voids', 'depth'], 5000, 'Must be at most 6\' 6".'],
    [['order', 'spares', 'value'], 120, 'Must be at most 100 %.'],
  ])('%j of %d is refused in its own measures', (field, value, words) => {
    expect(assumptionRefused(us, field, value)).toBe(words);
  });
});

it('a kind of stone brings its own figures', () => {
  const own = assumptionSet(plain, ['materials', 'base', 'density'], 1500);
  const chosen = assumptionSet(own, ['materials', 'base', 'kind'], 'openBase');
  expect(chosen.materials).toEqual({ base: { kind: 'openBase' } });
});

it('spares go by count or per cent', () => {
  const counted = sparesRuled(plain, 'count');
  expect(assumptionSet(counted, ['order', 'spares', 'value'], 7).order).toEqual({
    spares: { rule: 'count', value: 7 },
  });
});

describe('an order', () => {
  it('keeps its way, and lets it go', () => {
    const set = orderWaySet(plain, 'material:x', 'load');
    expect(set.order).toEqual({ ways: { 'material:x': 'load' } });
    expect(orderWaySet(set, 'material:x', undefined)).toEqual(plain);
  });

  it('of units names an entry of the catalogue on its unit alone', () => {
    const order = { kind: 'unit' as const, lines: ['units:a:first-tone'] };
    const set = orderItemSet(plain, order, 'slab');
    expect(set.units[0].catalogueId).toBe('slab');
    expect(orderItemSet(set, order, undefined)).toEqual(plain);
  });

  it('of an aggregate names it in every place that the order serves', () => {
    const order = { kind: 'aggregate' as const, lines: ['fill:voids', 'fill:margin'] };
    expect(orderItemSet(plain, order, 'stone').materials).toEqual({
      voids: { catalogueId: 'stone' },
      margin: { catalogueId: 'stone' },
    });
  });
});

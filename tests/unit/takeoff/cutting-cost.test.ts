import { describe, expect, test } from 'vitest';
import { cutReport } from '@/paving/cutting/cut-report';
import { layFloor } from '@/paving/laying';
import { wholeReport } from '@/paving/report';
import { cuttingCautions } from '@/takeoff/cutting-cautions';
import { cuttingComparison, USUAL_SAW, vibrationHours } from '@/takeoff/cutting-cost';
import type { PriceItem, PriceList } from '@/takeoff/price-list';
import { formatHours, formatMinutes } from '@/takeoff/saw-time';
import { takeOff } from '@/takeoff/take-off';
import { documentOf, parsed } from '../../oracle/documents';

/** Ten strips of 190 mm along the top, two to a unit: everything about it can be worked out by hand. */
const laying = layFloor(
  parsed(
    documentOf({
      ground: { perimeter: [[0, 0], [4000, 0], [4000, 590], [0, 590]], keepOuts: [] }, // prettier-ignore
      units: [{ id: 'a', name: 'Slab', length: 400, width: 400, thickness: 50, mass: 18, catalogueId: 'slab' }], // prettier-ignore
      bond: { kind: 'stack', unit: 'a', joint: 0 },
      placement: { origin: [200, 200], turn: 0 },
      clearance: 0,
    }),
  ),
);
const whole = wholeReport(laying);
const cut = cutReport(laying);

const item = (parts: Partial<PriceItem>): PriceItem => ({
  id: 'slab',
  kind: 'unit',
  name: 'Slab',
  supplier: 'Quarry',
  pack: { name: 'slab', holds: 1, measure: 'each', whole: true },
  costMinor: 650,
  from: '2026-01-01',
  massKg: null,
  looseDensity: null,
  stone: null,
  ...parts,
});
const prices: PriceList = { currency: 'EUR', on: '2026-03-01', items: [item({})] };

describe('the same floor whole and cut at its edge', () => {
  test('differs by the units sawn, their waste and the time at the saw', () => {
    const { whole: without, cut: with_ } = cuttingComparison(laying, whole, cut, null, {
      ...USUAL_SAW,
      pace: 0.5,
      minutesACut: 2,
      hourMinor: 4200,
    });
    expect(without).toMatchObject({
      units: 10,
      sawnUnits: 0,
      waste: 0,
      sawMinutes: 0,
      labourMinor: 0,
    });
    expect(with_).toMatchObject({ units: 15, sawnUnits: 5, pieces: 10, cuts: 10, sawLength: 4 });
    // 4 m at 0.5 m a minute, and ten times two minutes: 28 minutes, at 42.00 an hour 19.60.
    expect(with_.sawMinutes).toBeCloseTo(28, 9);
    expect(with_.labourMinor).toBe(1960);
    // Five units of 0.16 m² give ten strips of 0.076 m²: 0.04 m², a quarter of a unit, 4.5 kg.
    expect(with_.waste).toBeCloseTo(0.04, 9);
    expect(with_.wasteKg).toBeCloseTo(4.5, 9);
    expect(without.aggregate).toBeCloseTo(0.76, 9);
    expect(with_.aggregate).toBeCloseTo(0, 9);
    expect([without.materialsMinor, with_.materialsMinor]).toEqual([null, null]);
  });

  test('costs what the take-off orders, and names what has no price', () => {
    const { whole: without, cut: with_, currency } = cuttingComparison(laying, whole, cut, prices);
    expect(currency).toBe('EUR');
    expect(with_.labourMinor).toBeNull();
    expect(without.unpriced.length).toBeGreaterThan(0);
    expect(without.materialsMinor).toBeNull();
    const ordered = (report: Parameters<typeof takeOff>[1]) =>
      takeOff(laying, report, prices).orders.find(({ kind }) => kind === 'unit')!;
    expect(
      ordered({ ...whole, cut }).costMinor! - ordered(whole).costMinor!,
    ).toBeGreaterThanOrEqual(5 * 650);
    expect(without.unpriced).not.toContain('Slab');
  });
});

test('a day at a saw is bounded by its vibration as the directive reckons it', () => {
  // A(8) = a √(T / 8 h); 5 m/s² for 2 h is 2.5 m/s² A(8), and for 8 h is 5 (Directive 2002/44/EC, art. 3).
  expect(vibrationHours(5, 2.5)).toBe(2);
  expect(vibrationHours(5, 5)).toBe(8);
  expect(vibrationHours(10, 2.5)).toBe(0.5);
  expect(vibrationHours(0, 2.5)).toBe(Infinity);
});

test('cautions are those of the pieces, each with whose it is', () => {
  const document = laying.document;
  const ids = (use: 'foot' | 'driveway', change: Partial<typeof cut> = {}) =>
    cuttingCautions(
      { ...document, buildUp: { use, frost: false, bedding: 25, base: 100, geotextile: false, overdig: 0 } }, // prettier-ignore
      { ...cut, ...change },
      USUAL_SAW,
    ).map(({ id, weight }) => `${id} ${weight}`);
  expect(ids('foot')).toEqual(['dust caution', 'vibration caution']);
  // The CMHA (ICPI) sheet: a third of a unit under vehicles, 3/8 in (10 mm) elsewhere.
  expect(ids('foot', { underThird: 1 })).toContain('small look');
  expect(ids('driveway', { underThird: 1 })).toContain('small wrong');
  expect(ids('foot', { narrow: 2 })).toContain('narrow wrong');
  expect(ids('foot', { count: 0 })).toEqual([]);
  expect(cuttingCautions(document, { ...cut, underThird: 1 }, USUAL_SAW).find(({ id }) => id === 'small')!.words).toMatch(/^1 piece smaller than a third/); // prettier-ignore
});

test('minutes are said as people say them', () => {
  expect([0, 0.3, 45.4, 60, 200].map(formatMinutes)).toEqual([
    '0\u202fmin',
    'under a minute',
    '45\u202fmin',
    '1\u202fh',
    '3\u202fh 20\u202fmin',
  ]);
  expect(formatHours(2)).toBe('2\u202fh');
});

import { describe, expect, test } from 'vitest';
import { buildUpAdvice, SOURCES } from '@/paving/build-up-advice';
import { finishLevel } from '@/paving/finish-level';
import { fallOfKind, spotAdded, spotAt, spotChanged, spotRemoved } from '@/paving/level-edits';
import { levelFigure, levelText, oneInText } from '@/paving/level-text';
import type { LayoutDocument } from '@/paving/layout-document';
import { parseLayoutDocument } from '@/paving/layout-validation';
import { levelsSchema } from '@/paving/levels';
import { formatVolume } from '@/paving/volume';
import { documentOf, parsed } from '../../oracle/documents';

const withLevels = (levels: Record<string, unknown>, parts: Partial<LayoutDocument> = {}) =>
  parsed(documentOf({ levels: levelsSchema.parse(levels), ...parts }));
const problemsOf = (levels: unknown) => {
  const result = parseLayoutDocument({ ...documentOf({}), levels });
  return result.ok
    ? []
    : result.problems.map(({ path, message }) => `${path.join('.')}: ${message}`);
};

describe('levels in the document', () => {
  test('what is left out is a flat floor flush with the edge', () => {
    expect(withLevels({}).levels).toEqual({
      finish: 0,
      fall: { kind: 'none' },
      proud: 0,
      spots: [],
    });
    expect(parsed(documentOf({})).levels).toBeUndefined();
  });

  test('each wrong value is named with its path and what would do', () => {
    expect(problemsOf({ finish: 20_000 })).toEqual([
      'levels.finish: is over 10 m above the edge; levels are in millimetres',
    ]);
    expect(problemsOf({ fall: { kind: 'oneWay', direction: 0, percent: 0 } })).toEqual([
      'levels.fall.percent: must be more than 0 %; a floor that falls nowhere has the fall "none"',
    ]);
    expect(problemsOf({ fall: { kind: 'downhill' } })).toEqual([
      'levels.fall.kind: must be one of none, oneWay, toPoint or toLine',
    ]);
    expect(
      problemsOf({ fall: { kind: 'toLine', from: [5, 5], to: [5, 5.5], percent: 2 } }),
    ).toEqual(['levels.fall.to: is the same place as from; a line needs two places apart']);
    expect(
      problemsOf({
        spots: [
          { at: [0, 0], level: 1 },
          { at: [9, 9], level: 2 },
          { at: [0.4, 0.4], level: 3 },
        ],
      }),
    ).toEqual([
      'levels.spots.2.at: is the same place as that of spot 1; keep one of the two, or move one of them',
    ]);
  });

  test('the finish stated is the highest of the floor, whichever way it falls', () => {
    // The ground is 4000 × 3000; the levels follow from the words of the schema by hand.
    const oneWay = withLevels({ finish: -5, fall: { kind: 'oneWay', direction: 0, percent: 2 } });
    expect(finishLevel(oneWay, [0, 1000])).toBeCloseTo(-5, 9);
    expect(finishLevel(oneWay, [4000, 1000])).toBeCloseTo(-85, 9);
    const point = withLevels({ fall: { kind: 'toPoint', at: [1000, 1000], percent: 2 } });
    // Farthest square to a plane's way: 3000 to the right edge: the drain lies 60 below.
    expect(finishLevel(point, [1000, 1000])).toBeCloseTo(-60, 9);
    expect(finishLevel(point, [4000, 3000])).toBeCloseTo(0, 9);
    expect(finishLevel(point, [1000, 3000])).toBeCloseTo(-20, 9);
    const line = withLevels({
      fall: { kind: 'toLine', from: [0, 1000], to: [4000, 1000], percent: 1 },
    });
    expect(finishLevel(line, [200, 1000])).toBeCloseTo(-20, 9);
    expect(finishLevel(line, [200, 0])).toBeCloseTo(-10, 9);
    expect(finishLevel(line, [200, 3000])).toBeCloseTo(0, 9);
  });

  test('edits change one thing and leave the rest', () => {
    const start = withLevels({ finish: -3 });
    const one = spotAdded(start, { name: 'Gate', at: [10, 20], level: -40 });
    expect(one.levels).toMatchObject({ finish: -3, spots: [{ name: 'Gate', level: -40 }] });
    expect(spotAt(one.levels!.spots, [10.5, 20])).toBe(0);
    expect(spotAt(one.levels!.spots, [10.5, 20], 0)).toBe(-1);
    const unnamed = spotChanged(one, 0, { name: undefined, level: 7 });
    expect(unnamed.levels!.spots).toEqual([{ at: [10, 20], level: 7 }]);
    expect(spotRemoved(unnamed, 0).levels!.spots).toEqual([]);
    expect(start.levels!.spots).toEqual([]);
    const fall = fallOfKind(
      'oneWay',
      { kind: 'toLine', from: [0, 0], to: [9, 9], percent: 3 },
      [5, 5],
    );
    expect(fall).toEqual({ kind: 'oneWay', direction: 0, percent: 3 });
  });
});

describe('levels as text', () => {
  test('are said as a tape measures them', () => {
    expect(levelText(-12, 'metric')).toBe('12\u202fmm below the edge');
    expect(levelText(5, 'metric')).toBe('5\u202fmm above the edge');
    expect(levelText(0.2, 'metric')).toBe('flush with the edge');
    expect(levelText(-25.4, 'imperial')).toBe('1" below the edge');
    expect(levelFigure(5, 'metric')).toBe('+5');
    expect(levelFigure(-1200, 'metric')).toBe('−1\u202f200');
    expect(levelFigure(0, 'metric')).toBe('0');
  });

  // 1:20 = 5 %, 1:48 = 2.083 % (arithmetic).
  test('falls are said as one in so many', () => {
    expect(oneInText(5)).toBe('1 in 20');
    expect(oneInText(100 / 48)).toBe('1 in 48');
    expect(oneInText(0.1)).toBe('');
  });

  // NIST SP 811 B.8: 1 yd³ = 7.645 549 E-01 m³.
  test('volumes in cubic metres and cubic yards', () => {
    expect(formatVolume(3.1249, 'metric')).toBe('3.12\u202fm³');
    expect(formatVolume(7.645549, 'imperial')).toBe('10.00\u202fyd³');
    expect(formatVolume(0.0456, 'metric')).toBe('0.0456\u202fm³');
  });
});

describe('what is published', () => {
  const kinds = (document: LayoutDocument) => buildUpAdvice(document).map(({ kind }) => kind);
  const of = (
    buildUp: Partial<NonNullable<LayoutDocument['buildUp']>>,
    thickness = 60,
    length = 200,
  ) =>
    parsed(
      documentOf({
        units: [{ id: 'a', name: 'Block', length, width: 100, thickness }],
        buildUp: {
          use: 'foot',
          frost: false,
          bedding: 25,
          base: 100,
          geotextile: false,
          overdig: 0,
          ...buildUp,
        },
        levels: levelsSchema.parse({ fall: { kind: 'oneWay', direction: 0, percent: 2 } }),
      }),
    );

  // ICPI, Construction Tolerances and Recommendations: base at least 4 in (100 mm) for patios, 6 in (150 mm) for
  // a driveway; bedding 1 in (25 mm); fall at least 2 %.
  test('a base of 100 mm does on foot and 150 mm under cars; less is said with the source', () => {
    expect(kinds(of({}))).toEqual(['byHouse']);
    expect(kinds(of({ base: 101.6 }))).toEqual(['byHouse']);
    const thin = buildUpAdvice(of({ base: 80 }))[0];
    expect(thin).toMatchObject({ kind: 'thinBase', weight: 'look', source: SOURCES.tolerances });
    expect(thin.text).toContain('100\u202fmm');
    const inches = buildUpAdvice({ ...of({ base: 80 }), display: 'imperial' as const })[0];
    expect(inches.text).toContain('at least 4" compacted');
    expect(kinds(of({ use: 'driveway', base: 150 }))).not.toContain('thinBase');
    expect(kinds(of({ use: 'driveway', base: 140 }))).toContain('thinBase');
    expect(kinds(of({ bedding: 60 }))).toContain('thickBedding');
    expect(kinds(of({ frost: true }))).toContain('frost');
  });

  // The same: pavers at least 60 mm, at most 4 times as long as thick. ASTM C1782: what is longer is a slab, at least
  // 1.2 in (30 mm). Worked check of the page: 24 × 24 × 2 in is a slab, 8 × 4 × 2 3/8 in a paver.
  test('pavers and slabs are told apart by length over thickness', () => {
    const inches = (length: number, width: number, thickness: number, use: 'foot' | 'driveway') =>
      parsed(
        documentOf({
          units: [
            {
              id: 'a',
              name: 'Unit',
              length: length * 25.4,
              width: width * 25.4,
              thickness: thickness * 25.4,
            },
          ],
          buildUp: { use, frost: false, bedding: 25, base: 150, geotextile: false, overdig: 0 },
        }),
      );
    expect(kinds(inches(8, 4, 2.375, 'driveway'))).not.toContain('slenderUnit');
    expect(kinds(inches(24, 24, 2, 'foot'))).not.toContain('thinUnit');
    expect(kinds(inches(24, 24, 2, 'driveway'))).toContain('slenderUnit');
    expect(kinds(inches(24, 24, 1, 'foot'))).toContain('thinUnit');
    expect(kinds(inches(8, 4, 2.125, 'foot'))).toContain('thinUnit');
  });

  // 2 % at least for water (ICPI) against 1:48 = 2.083 % at most across a way (ADA 403.3): hardly any room between.
  test('a fall is too little below 2 % and too much for a cross slope above 1 in 48', () => {
    const falling = (percent: number) =>
      kinds(withLevels({ fall: { kind: 'oneWay', direction: 0, percent } }));
    expect(falling(1.9)).toContain('littleFall');
    for (const percent of [2, 2.08]) {
      expect(falling(percent)).not.toContain('littleFall');
      expect(falling(percent)).not.toContain('steepFall');
    }
    expect(falling(2.1)).toContain('steepFall');
    expect(kinds(withLevels({}))).toContain('littleFall');
  });
});

import { readFileSync } from 'node:fs';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { layFloor } from '@/paving/laying';
import type { SetOutChoice } from '@/paving/set-out/datum-choice';
import { setOut } from '@/paving/set-out/set-out';
import type { PathRing } from '@/sheets/drawing';
import type { PanelColumn, PanelRow } from '@/sheets/panel';
import { keptTogether, panelFlowed } from '@/sheets/panel';
import { edgeName } from '@/paving/edge-names';
import { figureText, rangeText } from '@/sheets/figures';
import { keepOutPlace } from '@/sheets/keep-out-place';
import { paperChords } from '@/sheets/plan-view';
import { PREFERRED_SCALES, scaleFitting } from '@/sheets/scales';
import { startPoint } from '@/sheets/start-point';
import { drawingSvg } from '@/sheets/svg-sink';
import { charactersLacked, sheetText, textLines, textWidth } from '@/sheets/text-measure';
import { faceFile, faceMetrics } from '../../../scripts/font-metrics';
import { COURT, TERRACE, floor, rectangle } from './sample-floors';

describe('lettering', () => {
  it('has the advance widths of the TrueType files, for every character', () => {
    for (const weight of [400, 600, 700] as const) {
      const face = faceMetrics(readFileSync(faceFile(weight)));
      for (const [code, advance] of face.advances) {
        if (code < 32) continue;
        const width = textWidth(String.fromCodePoint(code), face.capHeight, weight);
        expect(width).toBeCloseTo(advance, 9);
      }
    }
  });

  it('breaks text into lines no wider than asked, and loses no word', () => {
    fc.assert(
      fc.property(
        fc.array(fc.string({ minLength: 1, maxLength: 30 }), { maxLength: 30 }),
        fc.integer({ min: 12, max: 80 }),
        (words, width) => {
          const text = words.join(' ');
          const lines = textLines(text, width, 2.5);
          for (const line of lines) expect(textWidth(line, 2.5)).toBeLessThanOrEqual(width + 1e-9);
          expect(lines.join('').replaceAll(' ', '')).toBe(sheetText(text).replaceAll(' ', ''));
        },
      ),
    );
  });
});

describe('characters that the typeface lacks', () => {
  it('are those that print as a question mark, each once, and no others', () => {
    expect(charactersLacked('庭 and 庭, Ł → "ß"\n石')).toEqual(['庭', '石']);
    fc.assert(
      fc.property(fc.string({ unit: 'grapheme' }), (text) => {
        const asked = sheetText(text.replaceAll('?', '')).includes('?');
        expect(charactersLacked(text).length > 0).toBe(asked);
      }),
    );
  });
});

describe('a panel', () => {
  const row = (height: number): PanelRow => ({
    height,
    draw: ([x, y], width) => [
      {
        kind: 'line',
        from: [x, y],
        to: [x + width, y],
        stroke: { width: 0.25, colour: '#000000' },
      },
    ],
  });
  const columns = (heights: readonly number[]): PanelColumn[] =>
    heights.map((bottom, n) => ({
      frame: `column ${n}`,
      box: { left: n * 100, top: 0, right: n * 100 + 60, bottom },
    }));
  const columnsOf = (rows: readonly PanelRow[], heights: readonly number[]) =>
    panelFlowed(rows, columns(heights)).commands.map((command) =>
      command.kind === 'line' ? Math.floor(command.from[0] / 100) : -1,
    );
  const list = keptTogether([row(10), row(10), row(10)], 'wished');

  it('moves a list on whole where there is room for it', () => {
    expect(columnsOf([row(10), ...list], [30, 30])).toEqual([0, 1, 1, 1]);
  });

  it('parts it rather than begin a sheet, or where no column could hold it', () => {
    expect(columnsOf([row(10), ...list, row(10)], [30, 30])).toEqual([0, 0, 0, 1, 1]);
    expect(columnsOf([row(10), ...list], [25, 25])).toEqual([0, 0, 1, 1]);
  });
});

describe('figures', () => {
  it('part thousands, and set sixteenths as fractions', () => {
    expect(figureText(7200, 'metric')).toBe('7\u2009200');
    // 23 ft 7 7/16 in = 283.4375 in of 25.4 mm (NIST SP 811).
    expect(figureText(283.4375 * 25.4, 'imperial')).toBe('23\'\u00a07⁷⁄₁₆"');
    expect(figureText(12.5 * 25.4, 'imperial')).toBe('1\'\u00a0¹⁄₂"');
    expect(rangeText(11.2, 26.4, 'metric')).toBe('11–26');
    expect(rangeText(11.2, 11.4, 'metric')).toBe('11');
  });

  it('name edges by their corners, round to the first', () => {
    expect(edgeName(0, 0, 6)).toBe('AB');
    expect(edgeName(0, 5, 6)).toBe('FA');
    expect(edgeName(2, 1, 4)).toBe('K2 bc');
    expect(edgeName(0, 25, 40)).toBe('Z–A1');
  });
});

describe('scales', () => {
  it('are those of ISO 5455 for reductions', () => {
    // ISO 5455:1979, table: 1:2 1:5 1:10 1:20 1:50 1:100 1:200 1:500 1:1000 1:2000 1:5000 1:10000.
    const published = [2, 5, 10, 20, 50, 100, 200, 500, 1000, 2000, 5000, 10_000];
    expect(PREFERRED_SCALES).toEqual(expect.arrayContaining(published));
  });

  it('fit, and the next larger would not', () => {
    fc.assert(
      fc.property(fc.integer({ min: 100, max: 500_000 }), (length) => {
        const scale = scaleFitting(length, length / 2, 150, 120);
        expect(length / scale).toBeLessThanOrEqual(150);
        const larger = PREFERRED_SCALES[PREFERRED_SCALES.indexOf(scale) - 1];
        if (larger) expect(length / larger).toBeGreaterThan(150);
      }),
    );
  });
});

describe('set-out', () => {
  const FROM_A: SetOutChoice = {
    datums: [
      [0, 0],
      [0, 1],
    ],
  };

  it('starts from the unit corner nearest to the first datum, measured along the line and square to it', () => {
    // Slabs of 450 with a centre at (240, 240): the nearest corner lies at (15, 15).
    const plain = floor(rectangle(0, 0, 3000, 2000), {
      placement: { origin: [240, 240], turn: 0 },
      setOut: FROM_A,
    });
    const start = startPoint(layFloor(plain))!;
    expect([start.from, start.to]).toEqual(['A', 'B']);
    expect(start.along).toBeCloseTo(15, 6);
    expect(start.square).toBeCloseTo(15, 6);
    expect(start.turnDeg).toBeCloseTo(0, 9);
  });

  it('is the first unit of the control points and courses, from whichever corners these are taped', () => {
    const datums = fc
      .tuple(fc.integer({ min: 0, max: 5 }), fc.integer({ min: 0, max: 5 }))
      .filter(([a, b]) => a !== b);
    fc.assert(
      fc.property(datums, ([a, b]) => {
        const chosen = {
          ...COURT,
          setOut: {
            datums: [
              [0, a],
              [0, b],
            ],
          } satisfies SetOutChoice,
        };
        const laying = layFloor(chosen);
        const plan = setOut(laying);
        const start = startPoint(laying)!;
        expect(start.unit).toBe(plan.firstUnit!.unit);
        const point = plan.points.find(({ name }) => name === `U${plan.firstUnit!.nearest + 1}`)!;
        expect([start.from, start.along, start.square]).toEqual([
          plan.datums[0].name,
          point.along,
          point.square,
        ]);
      }),
      { numRuns: 10 },
    );
  });

  it('gives the same distances wherever the ground lies and however it is turned', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: -170, max: 170 }),
        fc.integer({ min: -9000, max: 9000 }),
        (turn, away) => {
          const angle = (turn * Math.PI) / 180;
          const [cos, sin] = [Math.cos(angle), Math.sin(angle)];
          const moved = ([x, y]: readonly number[]): [number, number] => [
            x * cos - y * sin + away,
            x * sin + y * cos - away,
          ];
          const turned = floor(rectangle(0, 0, 3000, 2000).map(moved), {
            placement: { origin: moved([240, 240]), turn },
            setOut: FROM_A,
          });
          const start = startPoint(layFloor(turned))!;
          expect(start.along).toBeCloseTo(15, 5);
          expect(start.square).toBeCloseTo(15, 5);
          expect(start.turnDeg).toBeCloseTo(0, 6);
        },
      ),
      { numRuns: 25 },
    );
  });

  it('states the turn of rows as the lesser of the two ways round, for a row runs both ways', () => {
    const turnOf = (turn: number) =>
      startPoint(
        layFloor(
          floor(rectangle(0, 0, 3000, 2000), {
            placement: { origin: [240, 240], turn },
            setOut: FROM_A,
          }),
        ),
      )!.turnDeg;
    const stated = [
      [26.98, 26.98],
      [-153.02, 26.98],
      [180, 0],
      [90, 90],
      [-90, 90],
      [135, -45],
      [359, -1],
    ];
    for (const [turn, expected] of stated) expect(turnOf(turn)).toBeCloseTo(expected, 9);
  });

  it('places the tree pit of the court by its corner nearest to two edges', () => {
    const { ground } = layFloor(COURT);
    const place = keepOutPlace(ground, ground.rings[1]);
    expect(place.point).toEqual([1500, 4600]);
    expect(place.offsets.map(({ edge, distance }) => [edge, distance])).toEqual([
      [4, 800],
      [5, 1500],
    ]);
    expect(place.size).toEqual({ kind: 'rectangle', length: 1000, width: 1000 });
  });

  it('tapes a keep-out from two corners where no straight edge faces it', () => {
    const bowl = floor(TERRACE.ground.perimeter, {
      ground: {
        perimeter: TERRACE.ground.perimeter,
        keepOuts: [
          {
            name: 'Fire bowl',
            ring: [
              [-300, 0, 1],
              [300, 0, 1],
            ],
          },
        ],
      },
    });
    const { ground } = layFloor(bowl);
    const place = keepOutPlace(ground, ground.rings[1]);
    expect(place.corner).toBeNull();
    expect(place.offsets).toEqual([]);
    expect(place.tapes.map(({ distance }) => Math.round(distance))).toEqual([2300, 2300]);
    expect(place.size).toMatchObject({ kind: 'circle' });
  });
});

describe('the SVG sink', () => {
  it('bends arcs to the side their bulge says', () => {
    // A half circle anticlockwise from (0, 0) to (20, 0) as seen passes below the chord: y grows down.
    const ring: PathRing = {
      points: [
        [0, 0],
        [20, 0],
      ],
      bulges: [1, 0],
      closed: false,
    };
    const svg = drawingSvg({
      width: 20,
      height: 20,
      layers: [{ name: 'a', commands: [{ kind: 'path', rings: [ring] }] }],
    });
    expect(svg).toContain('M0 0A10 10 0 0 0 10 10A10 10 0 0 0 20 0');
    const chords = paperChords(
      { scale: 1, ground: [0, 0], at: [0, 0] },
      { start: [0, 0], end: [20, 0], bulge: 1 },
    );
    const lowest = chords.reduce((low, [x, y]) => (y > low[1] ? [x, y] : low), [0, 0]);
    expect(lowest[0]).toBeCloseTo(10, 0);
    expect(lowest[1]).toBeCloseTo(10, 1);
  });
});

import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { regionIntegral } from '@/geometry/convex-part';
import { levelPlane, planeHeight, surfaceHeight } from '@/geometry/plane-pieces';
import type { Point } from '@/geometry/point';
import type { Segment } from '@/geometry/region-segments';
import { ringHolds } from '@/geometry/ring';
import { finishLevel } from '@/paving/finish-level';
import { documentGround } from '@/paving/ground';
import { layFloor } from '@/paving/laying';
import type { LayoutDocument } from '@/paving/layout-document';
import { levelsSchema } from '@/paving/levels';
import { dugRegion } from '@/takeoff/dug-region';
import { buildUpDepth, earthModel } from '@/takeoff/earth-cells';
import { earthVolumes } from '@/takeoff/earth-volumes';
import { contourInterval, levelMap } from '@/takeoff/level-map';
import { levelsReport } from '@/takeoff/levels-report';
import { pegLevels } from '@/takeoff/peg-levels';
import { ringArea } from '@/geometry/ring';
import { screedBoard } from '@/takeoff/screed-board';
import { anyDocument, documentOf, parsed, real } from '../../oracle/documents';

const L_COURT: LayoutDocument['ground'] = {
  perimeter: [
    [0, 0],
    [7200, 0],
    [7200, 3100],
    [4300, 3100],
    [4300, 5400],
    [0, 5400],
  ],
  keepOuts: [
    {
      name: 'Tree pit',
      ring: [
        [1500, 3600],
        [2500, 3600],
        [2500, 4600],
        [1500, 4600],
      ],
    },
  ],
};
const SPOTS: [number, number, number][] = [
  [0, 0, -305],
  [3600, 0, -330],
  [7200, 0, -290],
  [7200, 3100, -205],
  [4300, 3100, -190],
  [4300, 5400, -95],
  [2000, 5400, -60],
  [0, 5400, -85],
  [900, 2600, -215],
  [2800, 3300, -150],
];
const levelled = (levels: Record<string, unknown> = {}, parts: Partial<LayoutDocument> = {}) =>
  parsed(
    documentOf({
      ground: L_COURT,
      levels: levelsSchema.parse({
        spots: SPOTS.map(([x, y, level]) => ({ at: [x, y], level })),
        ...levels,
      }),
      ...parts,
    }),
  );
const buildUp = (overdig: number) =>
  ({ use: 'foot', frost: false, bedding: 25, base: 100, geotextile: false, overdig }) as const;

describe('what is dug', () => {
  // A ring moved out by d with square corners: A + d·P + d² for each right corner that stands out, less d² for each
  // that goes in (mitred offset of a rectilinear ring; by hand: L of 32.21 m², 25.2 m round, five out and one in).
  test('goes on beyond the edge by the overdig, square at the corners', () => {
    for (const d of [50, 150, 400]) {
      const region = dugRegion(documentGround({ ground: { ...L_COURT, keepOuts: [] } }), d)!;
      const area = regionIntegral(region, levelPlane(0)).area;
      expect(area / 1e6).toBeCloseTo(32.21 + (d * 25_200 + 4 * d * d) / 1e6, 6);
    }
  });

  test('any ground can be overdug, and just outside each of its corners is dug', () => {
    fc.assert(
      fc.property(anyDocument({ arcs: true }), real(1, 300), (document, d) => {
        const ground = documentGround(document);
        const region = dugRegion(ground, d)!;
        const dug = regionIntegral(region, levelPlane(0)).area;
        expect(dug).toBeGreaterThan(ground.area);
        for (const [x, y] of ground.rings[0].outline) {
          // Just outside each corner of the outline lies what is dug.
          const inside = region.filter((ring) => ringHolds(ring, [x + d / 3, y])).length % 2 === 1;
          const outside = !ringHolds(ground.rings[0].outline, [x + d / 3, y]);
          if (outside) expect(inside).toBe(true);
        }
      }),
      { numRuns: 40 },
    );
  });

  test('base lies over the overdig, bedding within the edge, and more bedding under thinner units', () => {
    const plain = earthVolumes(layFloor(levelled({}, { buildUp: buildUp(0) })));
    const wide = earthVolumes(layFloor(levelled({}, { buildUp: buildUp(150) })));
    expect(wide.bedding).toBeCloseTo(plain.bedding, 9);
    expect(wide.baseLayer).toBeCloseTo(0.1 * wide.dugArea, 9);
    expect(wide.cut).toBeGreaterThan(plain.cut);
    const mixed = layFloor(
      levelled(
        {},
        {
          buildUp: buildUp(0),
          units: [
            { id: 'a', name: 'A', length: 300, width: 300, thickness: 60 },
            { id: 'b', name: 'B', length: 100, width: 100, thickness: 40 },
          ],
          bond: { kind: 'pinwheel', unit: 'a', small: 'b', joint: 4 },
        },
      ),
    );
    const small = Array.from(mixed.laid.k).filter((k) => mixed.motif[k].unit.id === 'b').length;
    expect(small).toBeGreaterThan(50);
    expect(earthVolumes(mixed).beddingUnderThin).toBeCloseTo(small * 0.1 * 0.1 * 0.02, 9);
  });
});

describe('warnings', () => {
  const kinds = (spots: [number, number, number][]) =>
    earthVolumes(
      layFloor(levelled({ spots: spots.map(([x, y, level]) => ({ at: [x, y], level })) })),
    ).warnings.map(({ kind }) => kind);

  test('say when spots are none, few, in line, short of the edge, far apart or far away', () => {
    expect(kinds(SPOTS)).toEqual([]);
    expect(kinds([])).toEqual(['noSpots']);
    expect(kinds([[0, 0, -100]])).toEqual(['fewSpots']);
    expect(
      kinds([
        [0, 0, -100],
        [3000, 0, -90],
      ]),
    ).toEqual(['fewSpots']);
    expect(
      kinds([
        [0, 0, -100],
        [3000, 0, -90],
        [7200, 0, -80],
      ]),
    ).toEqual(['spotsInLine']);
    expect(
      kinds([
        [0, 0, -100],
        [3000, 0, -90],
        [0, 2000, -80],
      ]),
    ).toEqual(['groundBeyondSpots']);
    const wide: [number, number, number][] = [
      [-4000, -4000, 0],
      [14_000, -4000, 0],
      [3000, 14_000, 0],
    ];
    expect(kinds(wide)).toEqual([
      'spotsFarApart',
      'spotFarOutside',
      'spotFarOutside',
      'spotFarOutside',
    ]);
  });

  test('ground without spots is level with the edge, and the dig is the depth of the layers', () => {
    const document = levelled({ spots: [] });
    const volumes = earthVolumes(layFloor(document));
    expect(volumes.from).toBe('assumed');
    expect(volumes.cut).toBeCloseTo((volumes.area * buildUpDepth(document)) / 1000, 9);
  });
});

describe('pegs', () => {
  test('stand at each corner and where the floor is lowest, with every layer’s level', () => {
    const document = levelled({
      finish: -4,
      proud: 3,
      fall: { kind: 'toPoint', at: [3000, 1500], percent: 2 },
    });
    const pegs = pegLevels(document);
    expect(pegs.map(({ name }) => name)).toEqual(['A', 'B', 'C', 'D', 'E', 'F', 'Low']);
    for (const peg of pegs) {
      expect(peg.finish).toBeCloseTo(finishLevel(document, peg.at), 9);
      expect(peg.laid - peg.finish).toBeCloseTo(3, 9);
      expect(peg.laid - peg.screeded).toBeCloseTo(50, 9);
      expect(peg.finish - peg.base).toBeCloseTo(75, 9);
      expect(peg.base - peg.formation).toBeCloseTo(100, 9);
      expect(peg.dig).toBeCloseTo(peg.existing! - peg.formation, 9);
    }
    expect(Math.min(...pegs.map(({ finish }) => finish))).toBe(pegs[6].finish);
    expect(pegs[0].existing).toBeCloseTo(-305, 6);
  });

  test('where a line crosses the edge stands a low peg on each side', () => {
    const pegs = pegLevels(
      levelled({ fall: { kind: 'toLine', from: [100, 1000], to: [200, 1000], percent: 2 } }),
    );
    expect(
      pegs
        .filter(({ kind }) => kind === 'low')
        .map(({ at }) => at[0])
        .sort((p, q) => p - q),
    ).toEqual([0, 7200]);
    expect(
      levelsReport(levelled({ spots: [] })).pegs.every(
        ({ existing, dig }) => existing === null && dig === null,
      ),
    ).toBe(true);
  });
});

describe('the screed board', () => {
  // Common practice: cut about 300 mm shorter than the clear width, its lower edge hung the unit's thickness below the ears.
  test('is 300 mm shorter than the clear width and hangs by the unit’s thickness', () => {
    const board = screedBoard(parsed(documentOf({})));
    expect(board).toMatchObject({
      clearWidth: 3000,
      passes: 1,
      bayWidth: 3000,
      boardLength: 2700,
      depth: 50,
      rides: 'edge',
      rails: 0,
      pullDeg: 0,
    });
  });

  test('a lower finish and units left proud change how far it hangs; a fall needs rails', () => {
    expect(screedBoard(levelled({ finish: -10, proud: 4 })).depth).toBe(56);
    expect(
      screedBoard(
        levelled({ fall: { kind: 'oneWay', direction: 0, percent: 2 }, finish: -10, proud: 4 }),
      ),
    ).toMatchObject({ depth: 46, rides: 'rails', passes: 1, rails: 4, limbs: { length: 2 } });
  });

  test('of an L is one for each limb, each across its own width', () => {
    // Worked out by hand: 8 × 6 m with limbs of 3 and 2.5 m: the one 6 × 3 m, pulled up and down; the other 5 × 2.5 m, pulled
    // along. Where they meet the first has no edge along its pull: a rail.
    const L = parsed(
      documentOf({
        ground: { perimeter: [[0, 0], [8000, 0], [8000, 2500], [3000, 2500], [3000, 6000], [0, 6000]], keepOuts: [] }, // prettier-ignore
      }),
    );
    const { limbs, ...board } = screedBoard(L);
    expect(board).toMatchObject({ clearWidth: 2500, boardLength: 2200, pullDeg: 0, rides: 'edge' });
    expect(
      limbs.map(({ clearWidth, passes, boardLength, pullDeg, rails }) => [clearWidth, passes, boardLength, pullDeg, rails]), // prettier-ignore
    ).toEqual([
      [2500, 1, 2200, 0, 1],
      [3000, 1, 2700, 90, 0],
    ]);
    expect(limbs.map((run) => Math.round(ringArea(run.outline) / 1e4) / 100)).toEqual([20, 10.5]);
  });

  test('passes a step that is no more than the board is cut short by, and no larger one', () => {
    const stepped = (step: number) =>
      screedBoard(
        parsed(
          documentOf({
            ground: { perimeter: [[0, 0], [6000, 0], [6000, 2000], [3000, 2000], [3000, 2000 + step], [0, 2000 + step]], keepOuts: [] }, // prettier-ignore
          }),
        ),
      ).limbs.map(({ clearWidth }) => Math.round(clearWidth));
    expect(stepped(300)).toEqual([2300]);
    expect(stepped(301).length).toBe(2);
  });

  test('of a U has three, and a round floor one', () => {
    const U = parsed(
      documentOf({
        ground: { perimeter: [[0, 0], [6000, 0], [6000, 5000], [4500, 5000], [4500, 1500], [1500, 1500], [1500, 5000], [0, 5000]], keepOuts: [] }, // prettier-ignore
      }),
    );
    expect(screedBoard(U).limbs.map(({ clearWidth }) => Math.round(clearWidth))).toEqual([1500, 1500, 1500]); // prettier-ignore
    const round = parsed(documentOf({ ground: { perimeter: [[-2000, 0, 1], [2000, 0, 1]], keepOuts: [] } })); // prettier-ignore
    expect(screedBoard(round).limbs.length).toBe(1);
  });

  test('limbs make up the floor, whatever it is', () => {
    fc.assert(
      fc.property(anyDocument({ arcs: true }), (document) => {
        const { limbs } = screedBoard(document);
        const whole = ringArea(documentGround(document).rings[0].outline);
        const parts = limbs.reduce((all, run) => all + ringArea(run.outline), 0);
        expect(parts / whole).toBeCloseTo(1, 4);
      }),
      { numRuns: 60 },
    );
  });

  test('strips and boards make up the clear width, whatever the ground and its turn', () => {
    fc.assert(
      fc.property(anyDocument({ arcs: true }), (document) => {
        const board = screedBoard(document);
        expect(board.passes * board.bayWidth).toBeCloseTo(board.clearWidth, 6);
        expect(board.boardLength).toBeLessThanOrEqual(3000 + 1e-6);
        expect(board.boardLength).toBeGreaterThan(0);
        const { outline } = board;
        const radians = (board.pullDeg * Math.PI) / 180;
        const across = outline.map(([x, y]) => y * Math.cos(radians) - x * Math.sin(radians));
        expect(Math.max(...across) - Math.min(...across)).toBeCloseTo(board.clearWidth, 2);
      }),
      { numRuns: 60 },
    );
  });
});

describe('the level map', () => {
  const document = levelled({ fall: { kind: 'oneWay', direction: 270, percent: 2 } });
  const model = earthModel(document);
  const map = levelMap(model, 'metric');
  const middle = ({ from, to }: Segment): Point => [(from[0] + to[0]) / 2, (from[1] + to[1]) / 2];
  const existing = (at: Point) => surfaceHeight(model.existing.surface, at);
  const depth = (at: Point) => existing(at) - finishLevel(document, at) + buildUpDepth(document);
  const inGround = (at: Point) =>
    ringHolds(model.ground.rings[0].outline, at) && !ringHolds(model.ground.rings[1].outline, at);

  test('contours lie at their level, and the thick line where nothing is dug or filled', () => {
    expect(map.contours.length).toBeGreaterThan(4);
    for (const { level, segments } of map.contours)
      for (const segment of segments) {
        for (const at of [segment.from, segment.to, middle(segment)])
          expect(existing(at)).toBeCloseTo(level, 5);
        expect(inGround(middle(segment))).toBe(true);
      }
    expect(map.meeting.length).toBeGreaterThan(0);
    for (const segment of map.meeting) expect(depth(middle(segment))).toBeCloseTo(0, 5);
  });

  test('hatching of cut lies where earth is dug, of fill where it is not, all within the ground', () => {
    expect(map.cut.length).toBeGreaterThan(5);
    expect(map.fill.length).toBeGreaterThan(5);
    for (const [segments, sign] of [
      [map.cut, 1],
      [map.fill, -1],
    ] as const)
      for (const segment of segments)
        for (const t of [0.02, 0.5, 0.98]) {
          const { from, to } = segment;
          const at: Point = [from[0] + t * (to[0] - from[0]), from[1] + t * (to[1] - from[1])];
          expect(sign * depth(at)).toBeGreaterThan(-1e-6);
          expect(inGround(at)).toBe(true);
        }
  });

  test('the interval is a round figure and leaves ten contours at most', () => {
    expect(contourInterval(270, 'metric')).toBe(50);
    expect(contourInterval(0, 'metric')).toBe(1);
    expect(contourInterval(10 * 25.4, 'imperial')).toBeCloseTo(25.4, 9);
  });

  test('cells are planes that agree with the surfaces', () => {
    for (const { piece, existing: ground, formation } of model.cells) {
      const at: Point = [0, 1].map(
        (axis) => piece.outline.reduce((sum, p) => sum + p[axis], 0) / piece.outline.length,
      ) as unknown as Point;
      expect(planeHeight(ground, at)).toBeCloseTo(existing(at), 5);
      expect(planeHeight(formation, at)).toBeCloseTo(
        finishLevel(document, at) - buildUpDepth(document),
        5,
      );
    }
  });
});

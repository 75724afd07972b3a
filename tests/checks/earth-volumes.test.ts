import fc from 'fast-check';
import Fraction from 'fraction.js';
import Centroid from 'jsts/org/locationtech/jts/algorithm/Centroid.js';
import Coordinate from 'jsts/org/locationtech/jts/geom/Coordinate.js';
import GeometryFactory from 'jsts/org/locationtech/jts/geom/GeometryFactory.js';
import SnapIfNeededOverlayOp from 'jsts/org/locationtech/jts/operation/overlay/snap/SnapIfNeededOverlayOp.js';
import { describe, expect, test } from 'vitest';
import { ringIntegral } from '@/geometry/convex-part';
import { surfaceHeight, type Plane } from '@/geometry/plane-pieces';
import type { Point } from '@/geometry/point';
import { rotation } from '@/geometry/rotation';
import { ringHolds } from '@/geometry/ring';
import { finishLevel } from '@/paving/finish-level';
import { layFloor } from '@/paving/laying';
import type { LayoutDocument, Vertex } from '@/paving/layout-document';
import { levelsSchema, spotClashes, type Spot } from '@/paving/levels';
import { buildUpDepth } from '@/takeoff/earth-cells';
import { earthVolumes } from '@/takeoff/earth-volumes';
import { existingGround } from '@/takeoff/existing-ground';
import { anyDocument, documentOf, parsed, real } from '../oracle/documents';

const MM_PER_FOOT = 304.8;
const M3_PER_CUBIC_YARD = 0.764554857984;

const rectangle = (width: number, height: number): Vertex[] => [
  [0, 0],
  [width, 0],
  [width, height],
  [0, height],
];

/** A document of units without thickness to speak of, so that its formation is the finish itself. */
function bareDocument(parts: Partial<LayoutDocument>): LayoutDocument {
  return parsed(
    documentOf({
      units: [{ id: 'a', name: 'Unit', length: 450, width: 450, thickness: 1e-9 }],
      buildUp: { use: 'foot', frost: false, bedding: 0, base: 0, geotextile: false, overdig: 0 },
      ...parts,
    }),
  );
}

/** The ground is joined on a grid of micrometres; so are the places here. */
const micrometres = (min: number, max: number) =>
  fc.integer({ min: min * 1000, max: max * 1000 }).map((value) => value / 1000);

const levels = (parts: Record<string, unknown>) => levelsSchema.parse(parts);
const volumesOf = (document: LayoutDocument) => earthVolumes(layFloor(document));
const spot = (x: number, y: number, level: number): Spot => ({ at: [x, y], level });

describe('published volumes', () => {
  // Borrow-pit cell (worked example, expertsmind 30170481): 50 × 50 ft, corners at 87.6, 87.6, 87.6 and
  // 88.6 ft, grade 90 ft: mean 87.85, fill 2.15 ft, 199 yd³ (199.07 to two places). The method takes the mean
  // of the corners; triangles have it when a spot at the middle stands at that mean.
  test('the borrow-pit cell of 50 × 50 ft takes 199.07 yd³', () => {
    const feet = (ft: number) => ft * MM_PER_FOOT;
    const at = (x: number, y: number, level: number): Spot => spot(feet(x), feet(y), feet(level));
    const corners = [at(0, 0, -2.4), at(50, 0, -2.4), at(0, 50, -2.4), at(50, 50, -1.4)];
    const document = bareDocument({
      ground: { perimeter: rectangle(feet(50), feet(50)), keepOuts: [] },
      levels: levels({ spots: [...corners, at(25, 25, -2.15)] }),
    });
    const volumes = volumesOf(document);
    expect(volumes.fill / M3_PER_CUBIC_YARD).toBeCloseTo(199.07, 2);
    expect(volumes.cut).toBe(0);
    expect(volumes.base).toBeCloseTo(volumes.fill, 12);
  });

  // Identity of triangle nets: each diagonal of a cell gives a volume of its own; their mean is that of the four
  // corners, and both are it just when the sums of opposite corners agree.
  test('two triangles a cell are the four-corner mean when opposite corners agree, and on the mean of both diagonals always', () => {
    const heights = fc.tuple(real(-900, 900), real(-900, 900), real(-900, 900), real(-900, 900));
    fc.assert(
      fc.property(heights, micrometres(100, 9000), ([a, b, c, d], side) => {
        const prism = (p: number, q: number, r: number) => ((side * side) / 2) * ((p + q + r) / 3);
        const surface = (spots: Spot[]) => {
          const { surface: pieces, within } = existingGround(spots);
          expect(within).toBe(2);
          return volumeOver(pieces, rectangle(side, side));
        };
        const spots = [spot(0, 0, a), spot(side, 0, b), spot(side, side, c), spot(0, side, d)];
        const either = [prism(a, b, c) + prism(a, c, d), prism(a, b, d) + prism(b, c, d)];
        const mean = (side * side * (a + b + c + d)) / 4;
        expect((either[0] + either[1]) / 2).toBeCloseTo(mean, 0);
        const got = surface(spots);
        expect(Math.min(...either.map((each) => Math.abs(each - got)))).toBeLessThan(
          1e-9 * side * side * 900,
        );
        // With the fourth corner in the plane of the other three, it is the same whichever way.
        const flat = surface([...spots.slice(0, 3), spot(0, side, a + c - b)]);
        expect(Math.abs(flat - side * side * ((a + c) / 2))).toBeLessThan(1e-9 * side * side * 900);
      }),
      { numRuns: 100 },
    );
  });

  // Prismoidal numbers (hpmuseum.org forum 13022): pyramid of height 10 on a base of 8 × 6: 160, where the
  // average of the end areas gives 240.
  test('a pyramid of height 10 on 8 × 6 holds 160, dug and heaped alike', () => {
    for (const sign of [1, -1]) {
      const rim = [spot(0, 0, 0), spot(8000, 0, 0), spot(8000, 6000, 0), spot(0, 6000, 0)];
      const document = bareDocument({
        ground: { perimeter: rectangle(8000, 6000), keepOuts: [] },
        levels: levels({ spots: [...rim, spot(4000, 3000, sign * 10_000)] }),
      });
      const { cut, fill, deepestCut, deepestFill } = volumesOf(document);
      expect(sign > 0 ? cut : fill).toBeCloseTo(160, 9);
      expect(sign > 0 ? fill : cut).toBeCloseTo(0, 12);
      expect(sign > 0 ? deepestCut : deepestFill).toBeCloseTo(10_000, 6);
    }
  });

  // The same page: box of 6 × 12 × 4: 288.
  test('a box of 6 × 12 × 4 holds 288', () => {
    const document = bareDocument({
      ground: { perimeter: rectangle(6000, 12_000), keepOuts: [] },
      levels: levels({ spots: [spot(300, 5, 4000)] }),
    });
    expect(volumesOf(document).cut).toBeCloseTo(288, 9);
  });

  // V = L (A₁ + A₂) / 2, average end area, and V = L (A₁ + 4 Aₘ + A₂) / 6, the prismoidal formula: both are
  // exact for a wedge whose sections change evenly.
  test('a wedge is its length times the mean of its end areas, and by the prismoidal formula', () => {
    const [length, width, near, far] = [9000, 4000, 300, 900];
    const document = bareDocument({
      ground: { perimeter: rectangle(length, width), keepOuts: [] },
      levels: levels({
        spots: [
          spot(0, 0, near),
          spot(0, width, near),
          spot(length, 0, far),
          spot(length, width, far),
        ],
      }),
    });
    const area = (depth: number) => (depth * width) / 1e6;
    const [first, last] = [area(near), area(far)];
    const middle = area((near + far) / 2);
    const { cut } = volumesOf(document);
    expect(cut).toBeCloseTo(((length / 1000) * (first + last)) / 2, 9);
    expect(cut).toBeCloseTo(((length / 1000) * (first + 4 * middle + last)) / 6, 9);
  });
});

/** Volume of a surface over a ring, mm³, by its pieces. */
function volumeOver(pieces: ReturnType<typeof existingGround>['surface'], ring: Vertex[]): number {
  let volume = 0;
  for (const piece of pieces) {
    const outline = ring.map(([x, y]): Point => [x, y]);
    const part = piece.sides.reduce<readonly Point[]>((kept, side) => clipped(kept, side), outline);
    volume += ringIntegral(part, piece.plane).volume;
  }
  return volume;
}

/** Sutherland and Hodgman once more, written apart from the program. */
function clipped(ring: readonly Point[], side: Plane): Point[] {
  const of = ([x, y]: Point) => side.a * (x - side.at[0]) + side.b * (y - side.at[1]) + side.height;
  return ring.flatMap((to, n) => {
    const from = ring[(n + ring.length - 1) % ring.length];
    const [f, t] = [of(from), of(to)];
    const cross: Point[] =
      f < 0 === t < 0
        ? []
        : [
            [
              from[0] + ((to[0] - from[0]) * f) / (f - t),
              from[1] + ((to[1] - from[1]) * f) / (f - t),
            ],
          ];
    return t >= 0 ? [...cross, to] : cross;
  });
}

describe('prisms', () => {
  // V = A (h₁ + h₂ + h₃) / 3 over a triangle; exact in rational numbers (fraction.js).
  test('one triangle is its plan area times the mean of its heights, as in exact arithmetic', () => {
    const whole = fc.integer({ min: -4000, max: 4000 });
    fc.assert(
      fc.property(
        fc.tuple(whole, whole, whole, whole, whole, whole),
        fc.tuple(whole, whole, whole),
        (at, heights) => {
          const [x0, y0, x1, y1, x2, y2] = at.map((value) => new Fraction(value));
          const twice = x1
            .sub(x0)
            .mul(y2.sub(y0))
            .sub(x2.sub(x0).mul(y1.sub(y0)));
          fc.pre(twice.n !== 0n);
          const exact = twice
            .div(2)
            .mul(heights.reduce((sum, h) => sum + h, 0))
            .div(3)
            .valueOf();
          const corners: Point[] = [
            [at[0], at[1]],
            [at[2], at[3]],
            [at[4], at[5]],
          ];
          const spots = corners.map((p, n) => spot(p[0], p[1], heights[n]));
          const { surface, within } = existingGround(spots);
          fc.pre(within === 1);
          const got = ringIntegral(corners, surface[0].plane).volume;
          expect(Math.abs(got - exact)).toBeLessThan(1e-7 * (1 + Math.abs(twice.valueOf()) * 4000));
        },
      ),
      { numRuns: 200 },
    );
  });

  test('halving the triangles changes nothing on a plane', () => {
    const plane = ([x, y]: Point) => 0.021 * x - 0.013 * y - 35;
    const corners: Point[] = [
      [-500, -500],
      [7500, -400],
      [7000, 5200],
      [-300, 5600],
    ];
    const halved = (points: Point[]): Point[] => [
      ...points,
      ...points.map((p, n): Point => {
        const q = points[(n + 1) % points.length];
        return [(p[0] + q[0]) / 2, (p[1] + q[1]) / 2];
      }),
      [3400, 2500],
    ];
    const cutOf = (points: Point[]) =>
      volumesOf(
        parsed(
          documentOf({
            ground: {
              perimeter: [
                [0, 0],
                [6400, 0],
                [6400, 2900],
                [4100, 2900, 0.2],
                [4100, 4700],
                [0, 4700],
              ],
              keepOuts: [
                {
                  name: 'Bed',
                  ring: [
                    [1000, 1000],
                    [1800, 1100],
                    [1500, 2000],
                  ],
                },
              ],
            },
            levels: levels({ spots: points.map((at) => ({ at, level: plane(at) })) }),
          }),
        ),
      );
    const once = cutOf(corners);
    const twice = cutOf(halved(corners));
    const thrice = cutOf(
      halved(halved(corners)).filter(
        (p, n, all) => all.findIndex((q) => Math.hypot(p[0] - q[0], p[1] - q[1]) < 2) === n,
      ),
    );
    for (const finer of [twice, thrice]) {
      expect(finer.cut).toBeCloseTo(once.cut, 9);
      expect(finer.fill).toBeCloseTo(once.fill, 9);
      expect(finer.cutArea).toBeCloseTo(once.cutArea, 9);
      expect(finer.beyondSpots).toBeCloseTo(0, 9);
    }
  });
});

/** Any ground: bays, irregular rings, arcs, some with a keep-out. */
const groundOf = anyDocument({ arcs: true }).map(({ ground }) => ground);

const fallOf = fc.oneof(
  fc.constant({ kind: 'none' as const }),
  fc.record({
    kind: fc.constant('oneWay' as const),
    direction: real(0, 360),
    percent: real(0.5, 6),
  }),
  fc.record({
    kind: fc.constant('toPoint' as const),
    at: fc.tuple(real(-4000, 4000), real(-4000, 4000)),
    direction: real(0, 90),
    percent: real(0.5, 6),
  }),
  fc.record({
    kind: fc.constant('toLine' as const),
    from: fc.tuple(real(-4000, -200), real(-4000, 4000)),
    to: fc.tuple(real(200, 4000), real(-4000, 4000)),
    percent: real(0.5, 6),
  }),
);
const place = fc.oneof(
  fc.tuple(micrometres(-4500, 4500), micrometres(-4500, 4500)),
  // On a grid many spots stand in lines and squares, where triangles are not unique.
  fc
    .tuple(fc.integer({ min: -4, max: 4 }), fc.integer({ min: -4, max: 4 }))
    .map(([i, j]): [number, number] => [i * 1000, j * 1000]),
);
const spotsOf = (least: number) =>
  fc
    .array(fc.record({ at: place, level: real(-450, 200) }), { minLength: least, maxLength: 14 })
    .filter((spots) => spotClashes(spots).length === 0);

describe('against a slow sum', () => {
  /** Level of the ground written apart from the program: barycentric in the triangles, else nearest on their rim. */
  function slowGround(spots: readonly Spot[]): (p: Point) => number {
    const { triangles } = existingGround(spots);
    const cross = (o: Point, p: Point, q: Point) =>
      (p[0] - o[0]) * (q[1] - o[1]) - (p[1] - o[1]) * (q[0] - o[0]);
    return (point) => {
      for (const [i, j, k] of triangles) {
        const [a, b, c] = [spots[i], spots[j], spots[k]];
        const whole = cross(a.at, b.at, c.at);
        const parts = [
          cross(point, b.at, c.at),
          cross(point, c.at, a.at),
          cross(point, a.at, b.at),
        ];
        if (parts.every((part) => part / whole >= 0))
          return (parts[0] * a.level + parts[1] * b.level + parts[2] * c.level) / whole;
      }
      let [best, level] = [Infinity, NaN];
      const sides = triangles.flatMap(([i, j, k]) => [
        [i, j],
        [j, k],
        [k, i],
      ]);
      for (const [i, j] of sides) {
        const [a, b] = [spots[i], spots[j]];
        const [dx, dy] = [b.at[0] - a.at[0], b.at[1] - a.at[1]];
        const t = Math.max(
          0,
          Math.min(
            1,
            ((point[0] - a.at[0]) * dx + (point[1] - a.at[1]) * dy) / (dx * dx + dy * dy),
          ),
        );
        const away = Math.hypot(point[0] - a.at[0] - t * dx, point[1] - a.at[1] - t * dy);
        if (away < best) [best, level] = [away, a.level + t * (b.level - a.level)];
      }
      return level;
    };
  }

  /** Finish level, from the words of the schema: highest on the outline, falling as the fall says. */
  function slowFinish(document: LayoutDocument, outline: readonly Point[]): (p: Point) => number {
    const { finish, fall } = document.levels!;
    const rise = (p: Point): number => {
      switch (fall.kind) {
        case 'none':
          return 0;
        case 'oneWay': {
          const [cos, sin] = rotation(fall.direction);
          return -(p[0] * cos + p[1] * sin) * (fall.percent / 100);
        }
        case 'toPoint': {
          const [cos, sin] = rotation(fall.direction);
          const [dx, dy] = [p[0] - fall.at[0], p[1] - fall.at[1]];
          return (
            Math.max(Math.abs(dx * cos + dy * sin), Math.abs(dy * cos - dx * sin)) *
            (fall.percent / 100)
          );
        }
        case 'toLine': {
          const [ux, uy] = [fall.to[0] - fall.from[0], fall.to[1] - fall.from[1]];
          const across = ux * (p[1] - fall.from[1]) - uy * (p[0] - fall.from[0]);
          return (Math.abs(across) / Math.hypot(ux, uy)) * (fall.percent / 100);
        }
      }
    };
    const highest = Math.max(...outline.map(rise));
    return (p) => finish + rise(p) - highest;
  }

  test('cut, fill and their areas are those of a fine grid of samples, on any ground, fall and spots', () => {
    fc.assert(
      fc.property(groundOf, fallOf, spotsOf(3), real(-120, 20), (ground, fall, spots, finish) => {
        const document = parsed(documentOf({ ground, levels: levels({ finish, fall, spots }) }));
        const laying = layFloor(document);
        fc.pre(existingGround(document.levels!.spots).shape === 'triangles');
        const volumes = earthVolumes(laying);
        const [{ outline }, ...keepOuts] = laying.ground.rings;
        const existing = slowGround(document.levels!.spots);
        const formation = slowFinish(document, outline);
        const below = buildUpDepth(document);
        const { min, max } = laying.ground.box;
        const steps = 70;
        const [dx, dy] = [(max[0] - min[0]) / steps, (max[1] - min[1]) / steps];
        const sum = { cut: 0, fill: 0, cutArea: 0, area: 0, deep: 0 };
        for (let i = 0; i < steps; i++)
          for (let j = 0; j < steps; j++) {
            const p: Point = [min[0] + (i + 0.5) * dx, min[1] + (j + 0.5) * dy];
            if (!ringHolds(outline, p) || keepOuts.some((k) => ringHolds(k.outline, p))) continue;
            const depth = existing(p) - formation(p) + below;
            const cell = (dx * dy) / 1e6;
            sum.area += cell;
            if (depth > 0) sum.cutArea += cell;
            if (depth > 0) sum.cut += (depth / 1000) * cell;
            else sum.fill -= (depth / 1000) * cell;
            sum.deep = Math.max(sum.deep, depth);
          }
        // Samples err along the border, by up to about half a cell of it.
        const slack = volumes.area * 0.03;
        expect(volumes.cutArea + volumes.fillArea).toBeCloseTo(volumes.area, 6);
        expect(Math.abs(volumes.area - sum.area)).toBeLessThan(slack);
        expect(Math.abs(volumes.cut - sum.cut)).toBeLessThan(slack * 0.6);
        expect(Math.abs(volumes.fill - sum.fill)).toBeLessThan(slack * 0.6);
        expect(Math.abs(volumes.cutArea - sum.cutArea)).toBeLessThan(slack * 2);
        expect(volumes.deepestCut).toBeGreaterThan(sum.deep - 1e-6);
        expect(volumes.base).toBeCloseTo(volumes.baseLayer + volumes.fill, 12);
      }),
      { numRuns: 40 },
    );
  });

  test('levels at a place are those of the words of the schema', () => {
    fc.assert(
      fc.property(
        groundOf,
        fallOf,
        spotsOf(3),
        real(-5000, 5000),
        real(-5000, 5000),
        (ground, fall, spots, x, y) => {
          const document = parsed(documentOf({ ground, levels: levels({ fall, spots }) }));
          const laying = layFloor(document);
          const existing = existingGround(document.levels!.spots);
          fc.pre(existing.shape === 'triangles');
          const finish = slowFinish(document, laying.ground.rings[0].outline)([x, y]);
          expect(finishLevel(document, [x, y])).toBeCloseTo(finish, 6);
          expect(surfaceHeight(existing.surface, [x, y])).toBeCloseTo(
            slowGround(document.levels!.spots)([x, y]),
            4,
          );
        },
      ),
      { numRuns: 200 },
    );
  });
});

describe('against JSTS', () => {
  const factory = new GeometryFactory();
  const ringOf = (ring: readonly Point[]) =>
    factory.createLinearRing([...ring, ring[0]].map(([x, y]) => new Coordinate(x, y)));

  // JSTS, a port of JTS, cuts each triangle's dug and filled part to the ground; area times the depth at the
  // centroid is the volume under a plane.
  test('cut and fill are those of its overlays, on any ground with any spots', () => {
    const corners: Spot[] = [
      spot(-9000, -9000, -120),
      spot(9000, -9000, -300),
      spot(9000, 9000, -60),
      spot(-9000, 9000, -200),
    ];
    fc.assert(
      fc.property(
        groundOf,
        spotsOf(0),
        real(0, 360),
        real(0.5, 6),
        (ground, inner, direction, percent) => {
          const fall = { kind: 'oneWay' as const, direction, percent };
          const document = parsed(
            documentOf({ ground, levels: levels({ fall, spots: [...corners, ...inner] }) }),
          );
          const laying = layFloor(document);
          const volumes = earthVolumes(laying);
          const [perimeter, ...holes] = laying.ground.rings.map(({ outline }) => ringOf(outline));
          const area = factory.createPolygon(perimeter, holes);
          const { spots: all } = document.levels!;
          const [cos, sin] = rotation(direction);
          const formation = (p: Point) =>
            -(p[0] * cos + p[1] * sin) * (percent / 100) - buildUpDepth(document);
          const highest = Math.max(
            ...laying.ground.rings[0].outline.map((p) => formation(p) + buildUpDepth(document)),
          );
          const sum = { cut: 0, fill: 0 };
          for (const triangle of existingGround(all).triangles) {
            const points = triangle.map((n) => all[n].at);
            const depths = triangle.map((n) => all[n].level - formation(all[n].at) + highest);
            const [[x0, y0], [x1, y1], [x2, y2]] = points;
            const twice = (x1 - x0) * (y2 - y0) - (x2 - x0) * (y1 - y0);
            const depth: Plane = {
              a:
                ((depths[1] - depths[0]) * (y2 - y0) - (depths[2] - depths[0]) * (y1 - y0)) / twice,
              b:
                ((depths[2] - depths[0]) * (x1 - x0) - (depths[1] - depths[0]) * (x2 - x0)) / twice,
              at: points[0],
              height: depths[0],
            };
            for (const sign of [1, -1]) {
              const side = {
                a: sign * depth.a,
                b: sign * depth.b,
                at: depth.at,
                height: sign * depth.height,
              };
              const part = clipped(points, side);
              if (part.length < 3) continue;
              const within = SnapIfNeededOverlayOp.intersection(
                area,
                factory.createPolygon(ringOf(part)),
              );
              if (within.isEmpty()) continue;
              const centre = Centroid.getCentroid(within);
              const [dx, dy] = [centre.x - side.at[0], centre.y - side.at[1]];
              const volume = within.getArea() * (side.height + side.a * dx + side.b * dy);
              sum[sign > 0 ? 'cut' : 'fill'] += volume / 1e9;
            }
          }
          expect(volumes.cut).toBeCloseTo(sum.cut, 6);
          expect(volumes.fill).toBeCloseTo(sum.fill, 6);
        },
      ),
      { numRuns: 60 },
    );
  });
});

describe('what must not matter', () => {
  test('cut and fill are the same when all is moved, up to 90 km', () => {
    fc.assert(
      fc.property(groundOf, spotsOf(3), fc.constantFrom(0, 1e6, 9e7), (ground, spots, far) => {
        const plain = parsed(documentOf({ ground, levels: levels({ spots }) }));
        const moved = (ring: Vertex[]): Vertex[] =>
          ring.map(([x, y, bulge]): Vertex =>
            bulge === undefined ? [x + far, y - far] : [x + far, y - far, bulge],
          );
        const away = parsed(
          documentOf({
            placement: { origin: [far, -far], turn: 0 },
            ground: {
              perimeter: moved(plain.ground.perimeter),
              keepOuts: plain.ground.keepOuts.map((k) => ({ ...k, ring: moved(k.ring) })),
            },
            levels: levels({
              spots: spots.map(({ at, level }) => ({ at: [at[0] + far, at[1] - far], level })),
            }),
          }),
        );
        const [one, other] = [volumesOf(plain), volumesOf(away)];
        expect(other.cut).toBeCloseTo(one.cut, 5);
        expect(other.fill).toBeCloseTo(one.fill, 5);
      }),
      { numRuns: 60 },
    );
  });
});

import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { regionArea, regionClip } from '@/geometry/clipping';
import type { Point } from '@/geometry/point';
import { ringArea, ringHolds } from '@/geometry/ring';
import { layFloor } from '@/paving/laying';
import { floorReport } from '@/paving/report';
import { documentOf, parsed, unitOf } from '../oracle/documents';

describe('polygon area', () => {
  const example: Point[] = [
    [3, 4],
    [5, 11],
    [12, 8],
    [9, 5],
    [5, 6],
  ];

  test('the shoelace example has area 30, negative in its clockwise order', () => {
    // Rosetta Code, task "Shoelace formula for polygonal area".
    expect(ringArea(example)).toBe(-30);
    expect(ringArea([...example].reverse())).toBe(30);
  });

  test('the same by Pick: 27 points inside, 8 on the boundary', () => {
    // Pick's theorem, A = I + B / 2 − 1; I and B of the example counted by hand for this project.
    const gcd = (m: number, n: number): number => (n === 0 ? Math.abs(m) : gcd(n, m % n));
    const boundary = example.reduce((sum, [x, y], n) => {
      const [nx, ny] = example[(n + 1) % example.length];
      return sum + gcd(nx - x, ny - y);
    }, 0);
    expect(boundary).toBe(8);
    // A point on the boundary counts as neither; a nudge inward or outward would change its side.
    let inside = 0;
    for (let x = 3; x <= 12; x++) {
      for (let y = 4; y <= 11; y++) {
        const around = [
          [1e-6, 0],
          [-1e-6, 0],
          [0, 1e-6],
          [0, -1e-6],
        ].map(([dx, dy]) => ringHolds(example, [x + dx, y + dy]));
        if (around.every(Boolean)) inside++;
      }
    }
    expect(inside).toBe(27);
    expect(inside + boundary / 2 - 1).toBe(30);
  });

  test('a small triangle far from the origin keeps its area', () => {
    // A published loss: (0, π), (0, 0), (2, 0) moved by (10⁶, 10⁶) drifts to 3.1416015… when the
    // first corner is not taken off; its area is π.
    for (const far of [0, 1e4, 1e5, 1e6, 1e8]) {
      const triangle: Point[] = [
        [far, far + Math.PI],
        [far, far],
        [far + 2, far],
      ];
      expect(ringArea(triangle)).toBeCloseTo(Math.PI, far < 1e8 ? 8 : 6);
    }
  });
});

describe('clipping', () => {
  test('the published example clips to its ten corners, of area 111250 ÷ 3', () => {
    // Rosetta Code, task "Sutherland–Hodgman polygon clipping"; the area worked out exactly.
    const subject: Point[] = [
      [50, 150],
      [200, 50],
      [350, 150],
      [350, 300],
      [250, 300],
      [200, 250],
      [150, 350],
      [100, 250],
      [100, 200],
    ];
    const clip: Point[] = [
      [100, 100],
      [300, 100],
      [300, 300],
      [100, 300],
    ];
    const result = regionClip('intersection', [[subject]], [[[clip]]]);
    if (!result.ok) throw new Error(result.reason);
    expect(ringArea(subject)).toBe(52500);
    expect(result.area).toBeCloseTo(111250 / 3, 0);
    const outside = regionClip('difference', [[subject]], [[[clip]]]);
    if (!outside.ok) throw new Error(outside.reason);
    expect(outside.area).toBeCloseTo(46250 / 3, 0);
    const expected = [
      [100, 116.667],
      [125, 100],
      [275, 100],
      [300, 116.667],
      [300, 300],
      [250, 300],
      [200, 250],
      [175, 300],
      [125, 300],
      [100, 250],
    ];
    const corners = result.region[0][0];
    for (const [x, y] of expected) {
      const near = corners.some(([cx, cy]) => Math.hypot(cx - x, cy - y) < 0.002);
      expect(near, `no corner at ${x}, ${y}`).toBe(true);
    }
    // (200, 250) may be met once by each of the two parts that share it.
    expect(corners.length).toBeLessThanOrEqual(expected.length + 1);
  });

  test('abutting turned rectangles unite to their whole area, which raw doubles do not promise', () => {
    fc.assert(
      fc.property(fc.integer({ min: 1, max: 89 }), fc.integer({ min: 2, max: 6 }), (turn, side) => {
        const [cos, sin] = [Math.cos((turn * Math.PI) / 180), Math.sin((turn * Math.PI) / 180)];
        const cells = Array.from({ length: side * side }, (_, n) => {
          const [i, j] = [n % side, Math.floor(n / side)];
          return [
            [i, j],
            [i + 1, j],
            [i + 1, j + 1],
            [i, j + 1],
          ].map(([x, y]): Point => [
            203 * (x * cos - y * sin) + 11.3,
            203 * (x * sin + y * cos) - 7.7,
          ]);
        });
        const [first, ...rest] = cells.map((cell) => [[cell]]);
        const united = regionClip('union', first, rest, (203 * side) ** 2);
        if (!united.ok) throw new Error(united.reason);
        expect(united.region).toHaveLength(1);
        expect(Math.abs(regionArea(united.region))).toBeCloseTo((203 * side) ** 2, -2);
      }),
      { numRuns: 40 },
    );
  });
});

describe('a rectangle eroded by the clearance', () => {
  // A rectangle w × h shrunk by r all round is (w − 2r) × (h − 2r): an identity. The JTS test
  // suite's TestBuffer.xml has the square (100, 100)–(200, 200): by 10 it is (110, 110)–(190, 190),
  // area 6400, and by 100 it is empty.
  const floor = (clearance: number) =>
    layFloor(
      parsed(
        documentOf({
          ground: {
            perimeter: [
              [100, 100],
              [200, 100],
              [200, 200],
              [100, 200],
            ],
            keepOuts: [],
          },
          units: [unitOf('a', 10)],
          bond: { kind: 'stack', unit: 'a', joint: 0 },
          placement: { origin: [105, 105], turn: 0 },
          clearance,
        }),
      ),
    );

  test('units of 10 fill what is left exactly', () => {
    expect(floorReport(floor(0)).coveredArea * 1e6).toBeCloseTo(10_000, 6);
    const eroded = floor(10);
    expect(floorReport(eroded).coveredArea * 1e6).toBeCloseTo(6400, 6);
    expect(floorReport(eroded).leastGap).toBeCloseTo(10, 9);
    expect(floorReport(eroded).leftOut).toBe(36);
    const none = floorReport(floor(100));
    expect(none.wholeUnits).toBe(0);
    expect(none.leftOut).toBe(100);
    expect([none.leastGap, none.play]).toEqual([null, null]);
    expect(
      none.edges.map(({ facing, least, greatest, mean }) => [facing, least, greatest, mean]),
    ).toEqual(Array(4).fill([0, null, null, null]));
  });
});

describe('ten units of 300 in 3,000 mm, without a joint', () => {
  // The exact floor of the layout document, under "The fit": 100 whole units by one origin only.
  const floor = (origin: [number, number]) =>
    layFloor(
      parsed(
        documentOf({
          ground: {
            perimeter: [
              [0, 0],
              [3000, 0],
              [3000, 3000],
              [0, 3000],
            ],
            keepOuts: [],
          },
          units: [unitOf('a', 300)],
          bond: { kind: 'stack', unit: 'a', joint: 0 },
          placement: { origin, turn: 0 },
          clearance: 0,
        }),
      ),
    );

  test('the one origin lays 100, to the hundredth of a millimetre, and no other does', () => {
    expect(floor([150, 150]).laid.count).toBe(100);
    expect(floor([150.009, 149.991]).laid.count).toBe(100);
    expect(floor([150.011, 150]).laid.count).toBe(90);
    expect(floor([150.011, 149.989]).laid.count).toBe(81);
    expect(floor([450, -150]).laid.count).toBe(100);
  });

  test('nothing is left out or over, and every edge is faced by ten units at no distance', () => {
    const laying = floor([150, 150]);
    const report = floorReport(laying);
    expect(laying.leftOut.count).toBe(0);
    expect(report.fillArea).toBeCloseTo(0, 12);
    for (const edge of report.edges) {
      expect(edge).toMatchObject({ facing: 10, length: 3000 });
      expect(edge.least).toBeCloseTo(0, 9);
      expect(edge.greatest).toBeCloseTo(0, 9);
    }
  });
});

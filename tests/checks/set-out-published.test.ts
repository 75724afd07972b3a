import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { figuredText } from '@/paving/figured-words';
import { layFloor } from '@/paving/laying';
import type { LayoutDocument, Vertex } from '@/paving/layout-document';
import { setOut } from '@/paving/set-out/set-out';
import { crossingAngle, tapeCross, tapeUncertainty } from '@/paving/set-out/tape-cross';
import { documentOf, parsed, real } from '../oracle/documents';

const floorOf = (perimeter: Vertex[], parts: Partial<LayoutDocument> = {}) =>
  setOut(layFloor(parsed(documentOf({ ground: { perimeter, keepOuts: [] }, ...parts }))));

const rectangle = (width: number, depth: number, skew = 0): Vertex[] => [
  [0, 0],
  [width, 0],
  [width + skew, depth],
  [skew, depth],
];

const RAD = Math.PI / 180;

describe('right angles and outlines', () => {
  /** FAO Irrigation Training Manual 2 (Brouwer et al. 1985), 4.1: a triangle of 3, 4 and 5, and its multiples 6-8-10, 9-12-15. */
  test('a square corner is proved by 3, 4 and 5 or a multiple of them', () => {
    const { checks } = floorOf(rectangle(12_000, 9000));
    const squares = checks.filter(({ kind }) => kind === 'square');
    expect(squares.map(({ id }) => id)).toEqual(['square-A', 'square-B', 'square-C', 'square-D']);
    for (const { what, expected } of squares) {
      const sides = [...figuredText(what, 'metric').matchAll(/([\d\u202f]+)\u202fmm/g)].map(
        ([, figures]) => Number(figures.replace(/\u202f/g, '')),
      );
      const unit = expected / 5;
      expect(sides.sort((p, q) => p - q)).toEqual([3 * unit, 4 * unit]);
    }
    expect(squares[0].expected).toBe(10_000);
  });

  /** The Noble Foundation's sheet on raised beds squares a large corner by 24, 32 and 40 ft: eight times 3-4-5. */
  test('in feet, a large corner is proved by 24, 32 and 40', () => {
    const { checks } = floorOf(rectangle(12_000, 9000), { display: 'imperial' });
    const square = checks.find(({ id }) => id === 'square-A')!;
    expect(figuredText(square.what, 'imperial')).toContain("24'");
    expect(figuredText(square.what, 'imperial')).toContain("32'");
    expect(square.expected).toBeCloseTo(40 * 304.8, 9);
  });

  /** Closed form: a parallelogram w × h sheared by s at the top has diagonals √((w ± s)² + h²); 12 × 9 m square has 15.000 m both. */
  test.each([0, 40, -75, 300])('diagonals of a 12 × 9 m outline sheared by %d mm', (skew) => {
    const { diagonals } = floorOf(rectangle(12_000, 9000, skew));
    expect(diagonals).toHaveLength(2);
    expect(diagonals[0].length).toBeCloseTo(Math.hypot(12_000 + skew, 9000), 9);
    expect(diagonals[1].length).toBeCloseTo(Math.hypot(12_000 - skew, 9000), 9);
    expect(diagonals.every(({ sameAs }) => (sameAs !== null) === (skew === 0))).toBe(true);
  });

  /** FAO x6707e, ch. 3: the angles of a polygon of N sides add up to (N − 2) · 180°; of five, 540°. */
  test.each([3, 4, 5, 6, 9])('the corners of an outline of %d sides add up', (sides) => {
    const perimeter = Array.from({ length: sides }, (_, n): Vertex => {
      const radius = n % 2 === 0 ? 4000 : 2900;
      return [
        radius * Math.cos((2 * Math.PI * n) / sides),
        radius * Math.sin((2 * Math.PI * n) / sides),
      ];
    });
    const angles = floorOf(perimeter)
      .points.filter(({ kind }) => kind === 'corner')
      .map(({ angleDeg }) => angleDeg!);
    expect(angles).toHaveLength(sides);
    expect(angles.reduce((sum, angle) => sum + angle, 0)).toBeCloseTo((sides - 2) * 180, 9);
  });

  test('edges and diagonals together fix an outline: 2N − 3 lengths, and one more to prove it', () => {
    const outline: Vertex[] = [
      [0, 0],
      [5000, 0],
      [6400, 2500],
      [3000, 4600],
      [-400, 3000],
    ];
    const { diagonals } = floorOf(outline);
    // Closed form: N edges and N − 3 diagonals from one corner part it into N − 2 triangles.
    expect(outline.length + diagonals.length).toBe(2 * outline.length - 3 + 1);
  });
});

/** A triangle of two tapes: baseline, and the point by its angle of crossing and its place. */
const crossing = fc
  .record({
    baseline: real(1000, 30_000),
    gamma: real(12, 168),
    turn: real(0.05, 0.95),
  })
  .map(({ baseline, gamma, turn }) => {
    // The angles at the two datums share what the crossing leaves of 180°.
    const alpha = (180 - gamma) * turn;
    const p = (baseline * Math.sin((180 - gamma - alpha) * RAD)) / Math.sin(gamma * RAD);
    return { baseline, gamma, along: p * Math.cos(alpha * RAD), square: p * Math.sin(alpha * RAD) };
  });

describe('what two tapes can be off', () => {
  test('the crossing angle is that of the triangle', () => {
    fc.assert(
      fc.property(crossing, ({ baseline, gamma, along, square }) => {
        expect(crossingAngle([0, 0], [baseline, 0], [along, square])).toBeCloseTo(gamma, 6);
      }),
    );
  });

  /**
   * Identity of the textbooks on surveying (recalled from memory, and derived here from the four errors themselves): two distances off by σ each and
   * independently put a point √(σ² + σ²) / sin γ off in the mean square, with semi-axes σ / (√2 sin γ/2) and σ / (√2 cos γ/2).
   * The worst, to first order, is √2 times the longer: σ / min(sin γ/2, cos γ/2).
   */
  test('for small errors it follows the crossing angle alone', () => {
    fc.assert(
      fc.property(crossing, ({ baseline, gamma, along, square }) => {
        const small = 1e-3;
        const half = (gamma * RAD) / 2;
        const worst = tapeUncertainty(baseline, along, square, small)!;
        const axes = [Math.sin(half), Math.cos(half)].map((share) => small / (Math.SQRT2 * share));
        expect(worst / (Math.SQRT2 * Math.max(...axes))).toBeCloseTo(1, 3);
        expect(
          Math.hypot(...axes) / (Math.hypot(small, small) / Math.sin(gamma * RAD)),
        ).toBeCloseTo(1, 9);
      }),
    );
  });

  test('no error within ±2 mm on each tape puts the point farther off, and one puts it as far', () => {
    fc.assert(
      fc.property(crossing, ({ baseline, along, square }) => {
        const bound = tapeUncertainty(baseline, along, square);
        fc.pre(bound !== null);
        const [p, q] = [Math.hypot(along, square), Math.hypot(along - baseline, square)];
        let farthest = 0;
        const steps = 20;
        for (let m = 0; m <= steps; m++) {
          for (let n = 0; n <= steps; n++) {
            const r = p - 2 + (4 * m) / steps;
            const s = q - 2 + (4 * n) / steps;
            // Where circles of r and s about the datums meet, by the cosine rule.
            const x = (r * r - s * s + baseline * baseline) / (2 * baseline);
            const y = Math.sqrt(Math.max(0, r * r - x * x));
            farthest = Math.max(farthest, Math.hypot(x - along, y - square));
          }
        }
        expect(farthest).toBeLessThanOrEqual(bound! + 1e-6);
        expect(farthest).toBeGreaterThanOrEqual(bound! - 1e-6);
      }),
    );
  });

  test('square tapes: √2 times the reading', () => {
    // 3, 4 and 5 m: a right angle at the point. To first order 2·√2; the tapes' curvature adds under a hundredth.
    const { crossingDeg, uncertainty, tapes } = tapeCross([0, 0], [5000, 0], [1800, 2400]);
    expect(crossingDeg).toBeCloseTo(90, 9);
    expect(tapes.map((tape) => Math.round(tape * 1e6) / 1e6)).toEqual([3000, 4000]);
    expect(uncertainty!).toBeCloseTo(2 * Math.SQRT2, 2);
  });

  test('tapes that may not meet at all have no figure', () => {
    expect(tapeCross([0, 0], [5000, 0], [2500, 0])).toMatchObject({
      uncertainty: null,
      clean: false,
      side: 'on',
    });
  });

  test('the same 100 km from the origin', () => {
    const near = tapeCross([0, 0], [5000, 0], [1800, 2400]);
    const far = tapeCross([1e8, -1e8], [1e8 + 5000, -1e8], [1e8 + 1800, -1e8 + 2400]);
    expect(far.uncertainty!).toBeCloseTo(near.uncertainty!, 6);
    expect(far.crossingDeg).toBeCloseTo(near.crossingDeg, 6);
  });
});

import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import type { Point } from '@/geometry/point';
import { ringHolds } from '@/geometry/ring';
import { layFloor, unitCorners, type Laying } from '@/paving/laying';
import type { LayoutDocument, Vertex } from '@/paving/layout-document';
import { parseLayoutDocument } from '@/paving/layout-validation';
import { SAME_STRING_MM } from '@/paving/set-out/course-frame';
import { layingCourses } from '@/paving/set-out/courses';
import type { Course } from '@/paving/set-out/set-out-types';
import {
  anyDocument,
  asCustom,
  bondOf,
  documentOf,
  gridDocument,
  parsed,
  real,
} from '../../../oracle/documents';

/** Lengths agree to this, mm: the tolerance of every length here. */
const TOLERANCE = 0.01;

const coursesOf = (laying: Laying) => layingCourses(laying).courses;
const total = (courses: readonly Course[]) => courses.reduce((sum, { units }) => sum + units, 0);

/** A point of the string, that far from its start. */
const onString = ({ from, to, length }: Course, at: number): Point => [
  from[0] + ((to[0] - from[0]) * at) / length,
  from[1] + ((to[1] - from[1]) * at) / length,
];

const inGround = ({ ground }: Laying, at: Point) =>
  ground.rings.every(({ ring, outline }) => ringHolds(outline, at) === (ring === 0));

/** What holds of any floor's courses. */
function coursesHold(laying: Laying): void {
  const { courses, courseOf } = layingCourses(laying);
  expect(total(courses)).toBe(laying.laid.count);
  const seen = new Set<number>();
  courses.forEach((course, n) => {
    expect(course.number).toBe(n + 1);
    if (n > 0) expect(course.step).toBeGreaterThan(TOLERANCE);
    expect(course.runs.reduce((sum, { units }) => sum + units, 0)).toBe(course.units);
    expect(Object.values(course.byUnit).reduce((sum, count) => sum + count, 0)).toBe(course.units);
    expect(course.startGap).toBeCloseTo(course.runs[0].from, 6);
    expect(course.endGap).toBeCloseTo(course.length - course.runs.at(-1)!.to, 6);
    expect(Math.min(course.startGap, course.endGap)).toBeGreaterThanOrEqual(0);
    // From left to right on the plan.
    expect(course.to[0] - course.from[0]).toBeGreaterThan(-1e-6 * course.length);
    let last = -Infinity;
    for (const { ticks, laid } of course.runs) {
      expect(ticks).toHaveLength(laid.length);
      ticks.forEach(([from, to], m) => {
        const unit = laid[m];
        expect(seen.has(unit)).toBe(false);
        seen.add(unit);
        expect(courseOf[unit]).toBe(n);
        expect(from).toBeGreaterThanOrEqual(last - TOLERANCE);
        last = to;
        const corners = unitCorners(
          laying.motif[laying.laid.k[unit]],
          laying.laid.x[unit],
          laying.laid.y[unit],
        );
        const [sx, sy] = [
          (course.to[0] - course.from[0]) / course.length,
          (course.to[1] - course.from[1]) / course.length,
        ];
        for (const tick of [from, to]) {
          const at = onString(course, tick);
          const off = corners.map(([x, y]) => ({
            along: Math.abs((x - at[0]) * sx + (y - at[1]) * sy),
            square: Math.abs((y - at[1]) * sx - (x - at[0]) * sy),
          }));
          const near = off.filter(({ square }) => square < SAME_STRING_MM + TOLERANCE);
          expect(Math.min(...near.map(({ along }) => along))).toBeLessThan(TOLERANCE);
        }
        // The unit stands on the string, left of it.
        const [dx, dy] = [course.to[0] - course.from[0], course.to[1] - course.from[1]];
        for (const [x, y] of corners) {
          const left = (dx * (y - course.from[1]) - dy * (x - course.from[0])) / course.length;
          expect(left).toBeGreaterThan(-TOLERANCE);
        }
      });
    }
  });
  expect(seen.size).toBe(laying.laid.count);
}

describe('courses of any floor', () => {
  test('every laid unit is in one course, its ticks at its corners, the string at its side', () => {
    fc.assert(
      fc.property(anyDocument({ arcs: true }), (document) => coursesHold(layFloor(document))),
      { numRuns: 100 },
    );
  });

  test('where units touch edges and keep-outs exactly', () => {
    fc.assert(
      fc.property(gridDocument, (document) => {
        const valid = parseLayoutDocument(document);
        fc.pre(valid.ok);
        coursesHold(layFloor(valid.document));
      }),
      { numRuns: 80 },
    );
  });

  test('with units lifted', () => {
    fc.assert(
      fc.property(
        anyDocument(),
        fc.array(fc.nat(1e6), { minLength: 1, maxLength: 12 }),
        (document, picks) => {
          const { laid } = layFloor(document);
          fc.pre(laid.count > 0);
          const lifted = picks.map((pick): [number, number, number] => {
            const n = pick % laid.count;
            return [laid.i[n], laid.j[n], laid.k[n]];
          });
          coursesHold(layFloor(parsed({ ...document, lifted })));
        },
      ),
      { numRuns: 60 },
    );
  });

  test('strings lie over the ground but for the stretches that are said to be outside', () => {
    fc.assert(
      fc.property(anyDocument({ arcs: true }), (document) => {
        const laying = layFloor(document);
        for (const course of coursesOf(laying)) {
          const [dx, dy] = [
            (course.to[0] - course.from[0]) / course.length,
            (course.to[1] - course.from[1]) / course.length,
          ];
          for (let m = 1; m < 24; m++) {
            const at = (course.length * m) / 24;
            const ends = [
              0,
              course.length,
              ...course.outside.flatMap(({ from, to }) => [from, to]),
            ];
            // An arc and its chords part by up to 0.05 mm, along a flat crossing by more.
            if (ends.some((end) => Math.abs(end - at) < 5)) continue;
            const [x, y] = onString(course, at);
            const left: Point = [x - 0.03 * dy, y + 0.03 * dx];
            const out = course.outside.some(({ from, to }) => from < at && at < to);
            expect(inGround(laying, left)).toBe(!out);
          }
        }
      }),
      { numRuns: 80 },
    );
  });

  test('the same floor far away and turned has the same courses', () => {
    fc.assert(
      fc.property(
        anyDocument(),
        fc.tuple(real(-1e7, 1e7), real(-1e7, 1e7)),
        ({ ground, placement, ...rest }, [x, y]) => {
          const moved = ([px, py, bulge]: Vertex): Vertex =>
            bulge === undefined ? [px + x, py + y] : [px + x, py + y, bulge];
          const here = coursesOf(layFloor({ ...rest, ground, placement } as LayoutDocument));
          const there = coursesOf(
            layFloor({
              ...rest,
              ground: {
                perimeter: ground.perimeter.map(moved),
                keepOuts: ground.keepOuts.map((keepOut) => ({
                  ...keepOut,
                  ring: keepOut.ring.map(moved),
                })),
              },
              placement: {
                ...placement,
                origin: [placement.origin[0] + x, placement.origin[1] + y],
              },
            } as LayoutDocument),
          );
          fc.pre(total(here) === total(there));
          expect(there.map(({ units }) => units)).toEqual(here.map(({ units }) => units));
          there.forEach((course, n) => {
            const twin = here[n];
            course.runs.forEach(({ ticks, after }, r) => {
              expect(after).toBe(twin.runs[r].after);
              ticks.forEach(([from, to], m) => {
                // What is measured from the first unit hangs on no edge met at a flat angle.
                const [start, end] = twin.runs[r].ticks[m];
                expect(Math.abs(from - course.startGap - (start - twin.startGap))).toBeLessThan(
                  TOLERANCE,
                );
                expect(Math.abs(to - course.startGap - (end - twin.startGap))).toBeLessThan(
                  TOLERANCE,
                );
              });
            });
          });
        },
      ),
      { numRuns: 60 },
    );
  });

  test('mirrored, pattern and all, as many units stand in courses, each with its ticks at its corners', () => {
    fc.assert(
      fc.property(anyDocument().map(asCustom), (document) => {
        const { bond, ground, placement } = document;
        if (bond.kind !== 'custom') return;
        const mirrored = ([x, y]: readonly [number, number, ...number[]]): [number, number] => [
          -x,
          y,
        ];
        const ring = (vertices: readonly Vertex[]): Vertex[] => vertices.map(mirrored).reverse();
        const laying = layFloor(
          parsed({
            ...document,
            ground: {
              perimeter: ring(ground.perimeter),
              keepOuts: ground.keepOuts.map((keepOut) => ({
                ...keepOut,
                ring: ring(keepOut.ring),
              })),
            },
            bond: {
              ...bond,
              a: mirrored(bond.a),
              b: mirrored(bond.b),
              motif: bond.motif.map((entry) => ({
                ...entry,
                at: mirrored(entry.at),
                turn: -entry.turn,
              })),
            },
            placement: { origin: mirrored(placement.origin), turn: -placement.turn },
          }),
        );
        fc.pre(laying.laid.count === layFloor(document).laid.count);
        coursesHold(laying);
      }),
      { numRuns: 60 },
    );
  });

  test('turned by half a turn, pattern and all, the courses are the same ones from the other end', () => {
    fc.assert(
      fc.property(bondOf, real(-80, 80), ({ units, bond }, turn) => {
        const at = (placement: LayoutDocument['placement']) =>
          layFloor(parsed(documentOf({ units, bond, placement })));
        const laying = at({ origin: [2000, 1500], turn });
        const turned = at({ origin: [2000, 1500], turn: turn + 180 });
        fc.pre(laying.laid.count === turned.laid.count);
        // The ground is a rectangle about (2000, 1500): the whole floor is turned about its middle. A bond of
        // which units touch the string from one side only has other courses seen from the other side.
        expect(total(coursesOf(turned))).toBe(total(coursesOf(laying)));
        if (bond.kind === 'stack' || bond.kind === 'running' || bond.kind === 'chequer') {
          expect(
            coursesOf(turned)
              .map((course) => course.units)
              .reverse(),
          ).toEqual(coursesOf(laying).map((course) => course.units));
        }
      }),
      { numRuns: 60 },
    );
  });
});

describe('courses worked out by hand', () => {
  const tenByTen: Partial<LayoutDocument> = {
    ground: {
      perimeter: [
        [0, 0],
        [4536, 0],
        [4536, 4536],
        [0, 4536],
      ],
      keepOuts: [],
    },
    clearance: 3,
    placement: { origin: [229.5, 229.5], turn: 0 },
  };

  test('ten rows of ten slabs of 450 with 3 mm joints, 4.5 mm off every side', () => {
    const courses = coursesOf(layFloor(parsed(documentOf(tenByTen))));
    expect(courses).toHaveLength(10);
    courses.forEach((course, n) => {
      expect(course).toMatchObject({ units: 10, startGap: 4.5, from: [0, 4.5 + 453 * n] });
      expect(course.endGap).toBeCloseTo(4536 - 4.5 - 10 * 450 - 9 * 3, 9);
      expect(course.runs).toHaveLength(1);
      expect(course.runs[0].ticks.flat()).toEqual(
        Array.from({ length: 10 }, (_, m) => [4.5 + 453 * m, 4.5 + 453 * m + 450]).flat(),
      );
    });
  });

  test('a unit lifted out parts its course, and a keep-out in a string is said', () => {
    const courses = coursesOf(
      layFloor(
        parsed(
          documentOf({
            ...tenByTen,
            ground: {
              perimeter: tenByTen.ground!.perimeter,
              keepOuts: [
                {
                  name: 'Post',
                  ring: [
                    [2000, 900],
                    [2100, 900],
                    [2100, 1000],
                    [2000, 1000],
                  ],
                },
              ],
            },
            lifted: [[3, 0, 0]],
          }),
        ),
      ),
    );
    expect(courses[0].runs.map(({ units, after }) => [units, after])).toEqual([
      [3, 'start'],
      [6, 'lifted'],
    ]);
    expect(courses[0].outside).toEqual([]);
    // Course 3 starts at 910.5: the post stands in it from 2000 to 2100, and takes unit 5 (1816.5 to 2266.5).
    expect(courses[2].runs.map(({ units, after }) => [units, after])).toEqual([
      [4, 'start'],
      [5, 'outside'],
    ]);
    expect(courses[2].outside).toEqual([{ from: 2000, to: 2100, over: 'K1' }]);
    // Course 2 ends at 907.5 beside the post: a unit is missing, but nothing stands in its string.
    expect(courses[1].runs.map(({ units, after }) => [units, after])).toEqual([
      [4, 'start'],
      [5, 'left-out'],
    ]);
    expect(courses[1].outside).toEqual([]);
  });

  test('herringbone: each string has a flat unit, an upright one and a space, over and over', () => {
    const joint = 4;
    const [length, width] = [200, 98];
    const q = width + joint;
    const laying = layFloor(
      parsed(
        documentOf({
          units: [{ id: 'a', name: 'Block', length, width, thickness: 60 }],
          bond: { kind: 'herringbone', unit: 'a', joint },
          placement: { origin: [2000, 1500], turn: 0 },
        }),
      ),
    );
    const middle = coursesOf(laying)[12];
    const { ticks } = middle.runs[0];
    expect(middle.runs).toHaveLength(1);
    const sizes = ticks.map(([from, to]) => Math.round(to - from));
    const flat = sizes.indexOf(length);
    expect(sizes.slice(flat, flat + 4)).toEqual([length, width, length, width]);
    // Flat: two modules; upright: one; then one for the upright of the course before: a period of four.
    expect(ticks[flat + 2][0] - ticks[flat][0]).toBeCloseTo(4 * q, 6);
  });

  test('a round floor: strings end on the true circle', () => {
    const quarter = Math.SQRT2 - 1;
    const radius = 2300;
    const courses = coursesOf(
      layFloor(
        parsed(
          documentOf({
            ground: {
              perimeter: [
                [radius, 0, quarter],
                [0, radius, quarter],
                [-radius, 0, quarter],
                [0, -radius, quarter],
              ],
              keepOuts: [],
            },
            placement: { origin: [11, 7], turn: 31 },
          }),
        ),
      ),
    );
    expect(courses.length).toBeGreaterThan(5);
    for (const { from, to } of courses) {
      expect(Math.hypot(...from)).toBeCloseTo(radius, 6);
      expect(Math.hypot(...to)).toBeCloseTo(radius, 6);
    }
  });
});

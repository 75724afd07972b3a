import { describe, expect, test } from 'vitest';
import type { Point } from '@/geometry/point';
import { layFloor } from '@/paving/laying';
import type { Vertex } from '@/paving/layout-document';
import { bestDatums, secondPairs, sightBetween } from '@/paving/set-out/datums';
import { cornerTurns, setOutMarks, type Mark } from '@/paving/set-out/marks';
import { layingCourses } from '@/paving/set-out/courses';
import { documentOf, parsed } from '../../../oracle/documents';

const distance = (p: Point, q: Point) => Math.hypot(p[0] - q[0], p[1] - q[1]);

/** The angle between tapes of p and q over a baseline, degrees, by the cosine rule. */
const angle = (d: number, p: number, q: number) =>
  (Math.acos(Math.max(-1, Math.min(1, (p * p + q * q - d * d) / (2 * p * q)))) * 180) / Math.PI;

/** How far the crossing comes to lie from its place with both tapes 2 mm wrong, each either way: circles cut by the law of cosines. */
function worstCrossing(d: number, p: number, q: number): number | null {
  const crossing = (r: number, s: number): Point | null => {
    const x = (r * r - s * s + d * d) / (2 * d);
    const y = r * r - x * x;
    return r < 0 || s < 0 || y < 0 ? null : [x, Math.sqrt(y)];
  };
  const at = crossing(p, q);
  if (!at) return null;
  let worst = 0;
  for (const dp of [-2, 2]) {
    for (const dq of [-2, 2]) {
      const off = crossing(p + dp, q + dq);
      if (!off) return null;
      worst = Math.max(worst, distance(off, at));
    }
  }
  return worst;
}

/** A starry outline: corners at uneven angles and radii, in whole millimetres. The numbers come from a plain generator, the same each time. */
function starry(corners: number, seed: number): Vertex[] {
  let state = seed;
  const next = () => (state = (state * 1103515245 + 12345) % 2147483648) / 2147483648;
  return Array.from({ length: corners }, (_, n): Vertex => {
    const turn = (2 * Math.PI * (n + 0.6 * next())) / corners;
    const radius = 2500 + 2500 * next();
    return [Math.round(radius * 1.6 * Math.cos(turn)), Math.round(radius * Math.sin(turn))];
  });
}

function floor(corners: number, seed: number) {
  const laying = layFloor(
    parsed(documentOf({ ground: { perimeter: starry(corners, seed), keepOuts: [] } })),
  );
  return { ...laying, marks: setOutMarks(laying, layingCourses(laying).courses, []) };
}

/** What a pair makes of the marks, with nothing left out or cut short. */
function weighed(marks: readonly Mark[], a: Point, b: Point) {
  const d = distance(a, b);
  let failing = 0;
  let worst = 0;
  for (const { at } of marks) {
    const [p, q] = [distance(a, at), distance(b, at)];
    if (p === 0 || q === 0) continue;
    const meets = angle(d, p, q);
    const off = meets >= 30 && meets <= 150 ? worstCrossing(d, p, q) : null;
    if (off === null) failing++;
    else worst = Math.max(worst, off);
  }
  return { failing, worst };
}

const FLOORS = [
  [60, 11],
  [60, 12],
  [97, 5],
  [130, 8],
  [200, 3],
] as const;

describe('outlines of many corners', () => {
  test.each(FLOORS)('%d corners: no pair of all is better than the one picked', (corners, seed) => {
    const { ground, marks } = floor(corners, seed);
    const picked = bestDatums(ground, marks, () => []);
    const turns = cornerTurns(ground.rings[0]);
    const places = ground.rings[0].edges.map(({ start }) => start);
    const rank = (n: number, m: number) => {
      const sight = sightBetween(ground, places[n], places[m]);
      return {
        unseen: [n, m].filter((vertex) => Math.abs(turns[vertex]) < 5).length,
        blocked: Number(!sight.inside || sight.crosses.length > 0),
        ...weighed(marks, places[n], places[m]),
      };
    };
    type Rank = ReturnType<typeof rank>;
    const own = rank(picked.datums[0].vertex, picked.datums[1].vertex);
    const beats = (one: Rank) =>
      one.failing - own.failing ||
      one.unseen - own.unseen ||
      one.blocked - own.blocked ||
      // Uncertainties within 0.05 mm are as good.
      (one.worst < own.worst - 0.051 ? -1 : 0);
    const better: [number, number][] = [];
    for (let n = 0; n < places.length; n++) {
      for (let m = n + 1; m < places.length; m++) {
        if (distance(places[n], places[m]) < 300) continue;
        if (beats(rank(n, m)) < 0) better.push([n, m]);
      }
    }
    expect(better).toEqual([]);
    expect(picked.failing).toHaveLength(own.failing);
    expect(picked.worst).toBeCloseTo(own.worst, 6);
  });

  test.each(FLOORS)(
    '%d corners: the second pair takes as many of what is left as any pair does',
    (corners, seed) => {
      const { ground, marks } = floor(corners, seed);
      // From two corners side by side much fails.
      const { failing } = [0, 1, 2]
        .map((n) => {
          const places = ground.rings[0].edges.map(({ start }) => start);
          return {
            failing: marks.flatMap(({ at }, m) => {
              const meets = angle(
                distance(places[n], places[n + 1]),
                distance(places[n], at),
                distance(places[n + 1], at),
              );
              return meets >= 30 && meets <= 150 ? [] : [m];
            }),
          };
        })
        .reduce((most, each) => (each.failing.length > most.failing.length ? each : most));
      const left = failing.map((n) => marks[n]);
      const takes = (a: Point, b: Point) =>
        left.filter(({ at }) => distance(a, at) > 0 && distance(b, at) > 0).length -
        weighed(left, a, b).failing;
      const pairs = secondPairs(ground, marks, failing, 1);
      const [[a, b]] = [...pairs.values()];
      expect(pairs.size).toBe(takes(a.at, b.at));
      const places = ground.rings[0].edges.map(({ start }) => start);
      let most = 0;
      for (let n = 0; n < places.length; n++) {
        for (let m = n + 1; m < places.length; m++) {
          if (distance(places[n], places[m]) >= 300)
            most = Math.max(most, takes(places[n], places[m]));
        }
      }
      expect(pairs.size).toBe(most);
    },
  );

  test('marks that hang on the pair count with the others', () => {
    const { ground, marks } = floor(60, 21);
    // A mark on the line between the two fails: with a hundred of them for each pair but one, that one is picked.
    const between = (a: Point, b: Point): Mark[] =>
      Array.from({ length: 100 }, (_, n) => ({
        name: `T${n}`,
        kind: 'unit' as const,
        what: 'On the line',
        at: [(a[0] + b[0]) / 2, (a[1] + b[1]) / 2] as const,
        corner: null,
      }));
    const { datums } = bestDatums(ground, marks, (a, b) =>
      a.vertex === 7 && b.vertex === 40 ? [] : between(a.at, b.at),
    );
    expect(datums.map(({ vertex }) => vertex)).toEqual([7, 40]);
  });
});

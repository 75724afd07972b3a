import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import type { Point } from '@/geometry/point';
import { layFloor } from '@/paving/laying';
import type { LayoutDocument, Vertex } from '@/paving/layout-document';
import { parseLayoutDocument } from '@/paving/layout-validation';
import { choiceKept } from '@/paving/set-out/datum-choice';
import { setOut } from '@/paving/set-out/set-out';
import { anyDocument, documentOf, parsed } from '../../../oracle/documents';

const setOutOf = (parts: Partial<LayoutDocument>) => setOut(layFloor(parsed(documentOf(parts))));

const L_COURT: Vertex[] = [
  [0, 0],
  [7200, 0],
  [7200, 3100],
  [4300, 3100],
  [4300, 5400],
  [0, 5400],
];

const distance = (p: Point, q: Point) => Math.hypot(p[0] - q[0], p[1] - q[1]);

/** The angle between tapes of p and q over a baseline, degrees, by the cosine rule. */
const angle = (baseline: number, p: number, q: number) =>
  (Math.acos(Math.max(-1, Math.min(1, (p * p + q * q - baseline * baseline) / (2 * p * q)))) *
    180) /
  Math.PI;

describe('the set-out of any floor', () => {
  test('two tapes, two offsets and the side each give the point back', () => {
    fc.assert(
      fc.property(anyDocument({ arcs: true }), (document) => {
        const { datums, points, baseline } = setOut(layFloor(document));
        const [a, b] = datums.map(({ at }) => at);
        expect(baseline.length).toBeCloseTo(distance(a, b), 9);
        const [dx, dy] = [(b[0] - a[0]) / baseline.length, (b[1] - a[1]) / baseline.length];
        for (const { at, along, square, tapes, side } of points) {
          expect(
            distance(at, [a[0] + along * dx - square * dy, a[1] + along * dy + square * dx]),
          ).toBeLessThan(1e-6);
          expect(Math.hypot(along, square)).toBeCloseTo(tapes[0], 6);
          expect(Math.hypot(along - baseline.length, square)).toBeCloseTo(tapes[1], 6);
          if (Math.abs(square) > 0.02) expect(side).toBe(square > 0 ? 'left' : 'right');
        }
      }),
      { numRuns: 60 },
    );
  });

  test('what is said to be taped cleanly is: 30° to 150°, from the datums or a second pair', () => {
    fc.assert(
      fc.property(anyDocument({ arcs: true }), (document) => {
        const { baseline, points } = setOut(layFloor(document));
        for (const { by, tapes, secondPair, doubt, uncertainty, clean } of points) {
          if (by === 'tapes') {
            const meets = angle(baseline.length, ...tapes);
            expect(meets).toBeGreaterThan(30 - 1e-4);
            expect(meets).toBeLessThan(150 + 1e-4);
            expect(doubt).toBe(uncertainty);
          } else expect(clean).toBe(false);
          if (by === 'second-pair') {
            const [p, q] = secondPair!.datums;
            const meets = angle(distance(p.at, q.at), ...secondPair!.tapes);
            expect(meets).toBeGreaterThan(30 - 1e-4);
            expect(meets).toBeLessThan(150 + 1e-4);
          }
        }
      }),
      { numRuns: 60 },
    );
  });

  test('no other two corners leave fewer points badly taped', () => {
    fc.assert(
      fc.property(anyDocument(), (document) => {
        const laying = layFloor(document);
        const { points, advice } = setOut(laying);
        // The first unit hangs on the pair itself; all other points are the same for each.
        const fixed = points.filter(({ kind }) => kind !== 'unit');
        const corners = document.ground.perimeter.map(([x, y]): Point => [x, y]);
        let fewest = Infinity;
        corners.forEach((a, n) => {
          for (const b of corners.slice(n + 1)) {
            if (distance(a, b) < 300) continue;
            const failing = fixed.filter(({ at }) => {
              if (distance(at, a) < 1e-9 || distance(at, b) < 1e-9) return false;
              const meets = angle(distance(a, b), distance(at, a), distance(at, b));
              return !(meets >= 30 - 1e-6 && meets <= 150 + 1e-6);
            });
            fewest = Math.min(fewest, failing.length);
          }
        });
        const badly = points.filter(({ by }) => by === 'second-pair' || by === 'offsets');
        // The four corners of the first unit count too, so that four more may fail than at the best for the others.
        expect(badly.filter(({ kind }) => kind !== 'unit').length).toBeGreaterThanOrEqual(fewest);
        expect(badly.length).toBeLessThanOrEqual(fewest + 4);
        expect(advice.some(({ text }) => text.includes('cannot be taped well'))).toBe(
          badly.length > 0,
        );
      }),
      { numRuns: 40 },
    );
  });

  test('names and ids are all different, the answer is JSON, and the same each time', () => {
    fc.assert(
      fc.property(anyDocument({ arcs: true }), (drawn) => {
        // A document as it is stored has no -0.
        const document = parsed(JSON.parse(JSON.stringify(drawn)));
        const laying = layFloor(document);
        const found = setOut(laying);
        const names = found.points.map(({ name }) => name);
        expect(new Set(names).size).toBe(names.length);
        const ids = found.checks.map(({ id }) => id);
        expect(new Set(ids).size).toBe(ids.length);
        expect(JSON.parse(JSON.stringify(found))).toEqual(found);
        expect(setOut(layFloor(document))).toEqual(found);
        for (const { expected, least, greatest } of found.checks) {
          if (least !== null) expect(expected).toBeGreaterThanOrEqual(least - 0.01);
          if (greatest !== null) expect(expected).toBeLessThanOrEqual(greatest + 0.01);
        }
        for (const { from, to } of found.diagonals) {
          expect(names).toContain(from);
          expect(names).toContain(to);
        }
      }),
      { numRuns: 40 },
    );
  });
});

describe('datums', () => {
  test('of a rectangle with strings along it, two neighbouring corners or opposite ones tape all but the first unit', () => {
    const { points, datums } = setOutOf({ placement: { origin: [300, 300], turn: 0 } });
    const badly = points.filter(({ by }) => by === 'second-pair' || by === 'offsets');
    expect(badly.every(({ kind }) => kind === 'unit')).toBe(true);
    expect(datums.every(({ ring }) => ring === 0)).toBe(true);
  });

  test('those that the document names are taken, and better ones are advised', () => {
    const floor = {
      ground: { perimeter: L_COURT, keepOuts: [] },
      placement: { origin: [300, 300] as [number, number], turn: 0 },
    };
    const picked = setOutOf(floor);
    const chosen = setOutOf({
      ...floor,
      setOut: {
        datums: [
          [0, 2],
          [0, 1],
        ],
      },
    });
    expect(chosen.datums.map(({ name }) => name)).toEqual(['C', 'B']);
    expect(chosen.baseline).toMatchObject({ chosen: true, length: 3100 });
    expect(picked.baseline.chosen).toBe(false);
    const [first] = chosen.advice;
    const names = picked.datums.map(({ name }) => name).join(' and ');
    expect(first.text).toContain(`From ${names}`);
    // Whatever cannot be taped from C and B, the advice says another way for.
    const badly = chosen.points.filter(({ by }) => by === 'second-pair' || by === 'offsets');
    expect(badly.length).toBeGreaterThan(0);
    expect(first.points).toEqual(badly.map(({ name }) => name));
  });

  test('a corner of a keep-out may be one', () => {
    const { datums } = setOutOf({
      ground: {
        perimeter: L_COURT,
        keepOuts: [
          {
            name: 'Post',
            ring: [
              [3000, 2000],
              [3200, 2000],
              [3200, 2200],
            ],
          },
        ],
      },
      setOut: {
        datums: [
          [0, 0],
          [1, 2],
        ],
      },
    });
    expect(datums.map(({ name, at }) => [name, ...at])).toEqual([
      ['A', 0, 0],
      ['K1 c', 3200, 2200],
    ]);
  });

  test('a line over a keep-out or outside the edge is said to be', () => {
    const ground = {
      perimeter: L_COURT,
      keepOuts: [
        {
          name: 'Bed',
          ring: [
            [1000, 200],
            [1400, 200],
            [1400, 3000],
            [1000, 3000],
          ] as Vertex[],
        },
      ],
    };
    const over = setOutOf({
      ground,
      setOut: {
        datums: [
          [0, 0],
          [0, 3],
        ],
      },
    });
    expect(over.baseline).toMatchObject({ inside: true, crosses: ['K1'] });
    // From C to E the straight line passes the notch.
    const outside = setOutOf({
      ground,
      setOut: {
        datums: [
          [0, 2],
          [0, 4],
        ],
      },
    });
    expect(outside.baseline).toMatchObject({ inside: false, crosses: [] });
    const along = setOutOf({
      ground,
      setOut: {
        datums: [
          [0, 0],
          [0, 1],
        ],
      },
    });
    expect(along.baseline).toMatchObject({ inside: true, crosses: [] });
  });

  test.each([
    [
      'a ring that is not there',
      [
        [0, 0],
        [2, 0],
      ],
      'setOut.datums.1.0',
      'ring 2',
    ],
    [
      'a corner that is not there',
      [
        [0, 7],
        [0, 1],
      ],
      'setOut.datums.0.1',
      '0 to 5',
    ],
    [
      'the same corner twice',
      [
        [0, 3],
        [0, 3],
      ],
      'setOut.datums.1',
      'same place',
    ],
    ['half a corner', [[0], [0, 1]], 'setOut.datums.0', '[ring, vertex]'],
    ['one corner', [[0, 1]], 'setOut.datums', 'two corners'],
  ])('%s is refused', (_, datums, path, words) => {
    const result = parseLayoutDocument({
      ...documentOf({ ground: { perimeter: L_COURT, keepOuts: [] } }),
      setOut: { datums },
    });
    if (result.ok) throw new Error('not refused');
    expect(result.problems).toHaveLength(1);
    expect(result.problems[0].path.join('.')).toBe(path);
    expect(result.problems[0].message).toContain(words);
  });

  test('corners too near each other are refused, with the place', () => {
    const perimeter: Vertex[] = [
      [0, 0],
      [100, 0],
      [4000, 0],
      [4000, 3000],
      [0, 3000],
    ];
    const result = parseLayoutDocument({
      ...documentOf({ ground: { perimeter, keepOuts: [] } }),
      setOut: {
        datums: [
          [0, 0],
          [0, 1],
        ],
      },
    });
    expect(result).toMatchObject({ ok: false, problems: [{ at: [100, 0] }] });
  });

  test('a ring drawn clockwise is turned round, and the corners chosen with it', () => {
    const clockwise = [...L_COURT].reverse();
    const document = parsed({
      ...documentOf({ ground: { perimeter: clockwise, keepOuts: [] } }),
      setOut: {
        datums: [
          [0, 1],
          [0, 4],
        ],
      },
    });
    const { datums } = setOut(layFloor(document));
    expect(datums.map(({ at }) => at)).toEqual([clockwise[1], clockwise[4]]);
  });
});

describe('the corners chosen, when the ground changes', () => {
  const before = parsed({
    ...documentOf({
      ground: {
        perimeter: L_COURT,
        keepOuts: [
          {
            name: 'Post',
            ring: [
              [3000, 2000],
              [3200, 2000],
              [3200, 2200],
            ],
          },
          {
            name: 'Bed',
            ring: [
              [1000, 2000],
              [1200, 2000],
              [1200, 2200],
            ],
          },
        ],
      },
    }),
    setOut: {
      datums: [
        [0, 4],
        [2, 1],
      ],
    },
  });
  const kept = (ground: LayoutDocument['ground']) =>
    choiceKept(before, { ...before, ground }).setOut;

  test('a corner moved keeps them', () => {
    const perimeter = before.ground.perimeter.map(([x, y]): Vertex => [x, y === 5400 ? 5600 : y]);
    expect(kept({ ...before.ground, perimeter })).toEqual(before.setOut);
  });
  test('a corner put in before them renumbers them', () => {
    const perimeter = before.ground.perimeter.toSpliced(1, 0, [3000, 0]);
    expect(kept({ ...before.ground, perimeter })?.datums).toEqual([
      [0, 5],
      [2, 1],
    ]);
  });
  test('a keep-out taken away renumbers those after it', () => {
    expect(kept({ ...before.ground, keepOuts: [before.ground.keepOuts[1]] })?.datums).toEqual([
      [0, 4],
      [1, 1],
    ]);
  });
  test('a corner taken away takes the choice with it', () => {
    expect(kept({ ...before.ground, keepOuts: [] })).toBeUndefined();
    const perimeter = before.ground.perimeter.toSpliced(4, 1);
    expect(kept({ ...before.ground, perimeter })).toBeUndefined();
  });
  test('a new choice is left alone', () => {
    const after = {
      ...before,
      ground: { ...before.ground, keepOuts: [] },
      setOut: {
        datums: [
          [0, 0],
          [0, 1],
        ] as [[number, number], [number, number]],
      },
    };
    expect(choiceKept(before, after)).toBe(after);
  });
});

test('a floor on which nothing is laid has its corners and says so', () => {
  const found = setOutOf({
    units: [{ id: 'a', name: 'Slab', length: 5000, width: 5000, thickness: 50 }],
  });
  expect(found.courses).toEqual([]);
  expect(found.firstUnit).toBeNull();
  expect(found.advice[0].text).toContain('No unit is laid');
  expect(found.checks.map(({ kind }) => kind)).toEqual(
    expect.arrayContaining(['edge', 'diagonal', 'square']),
  );
});

test('the first unit is the one at the first datum', () => {
  const { firstUnit, courses } = setOutOf({
    placement: { origin: [300, 300], turn: 0 },
    setOut: {
      datums: [
        [0, 2],
        [0, 3],
      ],
    },
  });
  // From C, the upper right corner, looking along the upper side to the left.
  const [first, second] = courses;
  expect(first.row).toBe(courses.length);
  expect(second.from[1]).toBeLessThan(first.from[1]);
  expect(firstUnit).toMatchObject({
    course: 1,
    place: first.units,
    nearest: 2,
    turnDeg: 0,
  });
});

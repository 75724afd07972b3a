import fc from 'fast-check';
import { levenbergMarquardt } from 'ml-levenberg-marquardt';
import { describe, expect, test } from 'vitest';
import type { Point } from '@/geometry/point';
import { ringArea } from '@/geometry/ring';
import { misreading } from '@/paving/survey/misreading';
import { figuredText } from '@/paving/figured-words';
import { readTapes, surveyOf, surveyPointName, tapeName, usualTapes } from '@/paving/survey/survey';
import { surveyWords } from '@/paving/survey/survey-words';
import { MISTAKE, surveyAnswer } from '@/paving/survey/survey-answer';
import { freshSurvey, lettersTurned, sideBent, tapeSide } from '@/paving/survey/survey-edits';
import { surveyedGround } from '@/paving/survey/survey-ground';
import { tapeError, tapesAdjusted } from '@/paving/survey/tape-adjustment';
import { pointsPlaced, tapesMeet } from '@/paving/survey/tape-placing';
import { everyPair, surveyOfPoints } from '../oracle/tape-nets';

const L_COURT: Point[] = [
  [0, 0],
  [7200, 0],
  [7200, 3100],
  [4300, 3100],
  [4300, 5400],
  [0, 5400],
];

const distance = ([ax, ay]: Point, [bx, by]: Point) => Math.hypot(bx - ax, by - ay);

function expectShape(found: readonly (Point | null)[], true_: readonly Point[], within: number) {
  for (const [a, b] of everyPair(true_.length)) {
    expect(found[a], `point ${a}`).not.toBeNull();
    expect(found[b], `point ${b}`).not.toBeNull();
    const off = distance(found[a]!, found[b]!) - distance(true_[a], true_[b]);
    expect(Math.abs(off), `between ${a} and ${b}`).toBeLessThan(within);
  }
}

describe('right angles and skew', () => {
  test('sides of 3, 4 and 5 make a right angle', () => {
    // FAO, Irrigation water management, Training manual 2 (Brouwer et al. 1985), ch. 4.1: the 3-4-5 method.
    const survey = surveyOfPoints(
      [
        [0, 0],
        [4000, 0],
        [0, 3000],
      ],
      [
        [0, 1],
        [1, 2],
        [2, 0],
      ],
    );
    const { places, spare, agrees } = surveyAnswer(survey);
    const [a, b, c] = places as Point[];
    const square = (b[0] - a[0]) * (c[0] - a[0]) + (b[1] - a[1]) * (c[1] - a[1]);
    expect(Math.abs(square) / (3000 * 4000)).toBeLessThan(1e-12);
    expect({ spare, agrees }).toEqual({ spare: 0, agrees: true });
  });

  test('a rectangle pushed over by s has the diagonals √((w ± s)² + h²), and is found again from them', () => {
    // An identity of Pythagoras: the top side of w × h moved along itself by s.
    const [w, h, s] = [12_000, 9_000, 160];
    const survey = surveyOfPoints(
      [
        [0, 0],
        [w, 0],
        [w, h],
        [0, h],
      ],
      everyPair(4),
    );
    const lengths = [
      w,
      Math.hypot(w + s, h),
      Math.hypot(s, h),
      Math.hypot(s, h),
      Math.hypot(w - s, h),
      w,
    ];
    const read = {
      ...survey,
      // In the order of the pairs: AB, AC, AD, BC, BD, CD.
      tapes: survey.tapes.map((tape, n) => ({ ...tape, length: lengths[n] })),
    };
    const { places, greatest, spare } = surveyAnswer(read);
    expect(greatest).toBeLessThan(1e-6);
    expect(spare).toBe(1);
    expectShape(
      places,
      [
        [0, 0],
        [w, 0],
        [w + s, h],
        [s, h],
      ],
      1e-6,
    );
  });

  test('the angles of any perimeter found by tapes come to (N − 2) · 180°', () => {
    // FAO Training manual, x6707e ch. 3: sum of the angles of a polygon.
    const { places } = surveyAnswer(surveyOf(L_COURT));
    expect(places.every((place) => place === null)).toBe(true);
    const read = surveyOf(L_COURT);
    const full = {
      ...read,
      tapes: read.tapes.map((tape) => ({
        ...tape,
        length: distance(L_COURT[tape.from], L_COURT[tape.to]),
      })),
    };
    const ring = surveyAnswer(full).places as Point[];
    let sum = 0;
    ring.forEach((at, n) => {
      const before = ring[(n + ring.length - 1) % ring.length];
      const after = ring[(n + 1) % ring.length];
      const turn =
        Math.atan2(before[1] - at[1], before[0] - at[0]) -
        Math.atan2(after[1] - at[1], after[0] - at[0]);
      sum += (turn + 4 * Math.PI) % (2 * Math.PI);
    });
    expect((sum * 180) / Math.PI).toBeCloseTo((ring.length - 2) * 180, 8);
  });
});

describe('two tapes', () => {
  test('meet where both lengths are kept, one place either side', () => {
    fc.assert(
      fc.property(
        fc.tuple(fc.integer({ min: -9000, max: 9000 }), fc.integer({ min: 50, max: 9000 })),
        fc.integer({ min: 500, max: 9000 }),
        ([x, y], apart) => {
          const a: Point = [0, 0];
          const b: Point = [apart, 0];
          const p = Math.hypot(x, y);
          const q = Math.hypot(x - apart, y);
          const [left, right] = tapesMeet(a, p, b, q);
          expect(left[0]).toBeCloseTo(x, 5);
          expect(left[1]).toBeCloseTo(y, 3);
          expect(right[1]).toBeCloseTo(-y, 3);
        },
      ),
    );
  });

  test.each([
    [1000, 1500, 3000, 1250],
    [5000, 1500, 3000, 4750],
    [1000, 5000, 3000, -1500],
  ])(
    '%d and %d over %d do not reach each other: the place lacks as much of either',
    (p, q, apart, on) => {
      // Worked by hand: half of what is lacking at each tape.
      expect(tapesMeet([0, 0], p, [apart, 0], q)[0]).toEqual([on, 0]);
    },
  );
});

/** Random rings as stars about the origin, always simple and anticlockwise. */
const ringArbitrary = fc
  .array(
    fc.tuple(
      fc.double({ min: 0.15, max: 0.85, noNaN: true }),
      fc.integer({ min: 1500, max: 9000 }),
    ),
    {
      minLength: 4,
      maxLength: 9,
    },
  )
  .map((spokes) =>
    spokes.map(([share, reach], n): Point => {
      const angle = ((n + share) / spokes.length) * 2 * Math.PI;
      return [reach * Math.cos(angle), reach * Math.sin(angle)];
    }),
  );

const errorsArbitrary = fc.array(fc.integer({ min: -4, max: 4 }), { minLength: 40, maxLength: 40 });

describe('least squares', () => {
  test('agree with Levenberg and Marquardt’s method as a library has it', () => {
    // ml-levenberg-marquardt 5.1.0: another method (damped steps, differences for derivatives), another hand.
    fc.assert(
      fc.property(ringArbitrary, errorsArbitrary, (ring, errors) => {
        const survey = surveyOfPoints(ring, everyPair(ring.length), { errors });
        const tapes = readTapes(survey);
        const answer = surveyAnswer(survey);
        // The library: first point still, the second on the x axis.
        const placesOf = (free: readonly number[]): Point[] => [
          [0, 0],
          [free[0], 0],
          ...Array.from({ length: ring.length - 2 }, (_, n): Point => [
            free[2 * n + 1],
            free[2 * n + 2],
          ]),
        ];
        const [ax, ay] = ring[0];
        const turn = -Math.atan2(ring[1][1] - ay, ring[1][0] - ax);
        const turned = ring.map(([x, y]): Point => [
          Math.cos(turn) * (x - ax) - Math.sin(turn) * (y - ay),
          Math.sin(turn) * (x - ax) + Math.cos(turn) * (y - ay),
        ]);
        const fitted = levenbergMarquardt(
          {
            x: tapes.map((_, n) => n),
            // In standard errors: the library’s own weights are not those of the textbooks.
            y: tapes.map(({ length }) => length / tapeError(length)),
          },
          (free) => {
            const places = placesOf(free);
            return (n) =>
              distance(places[tapes[n].from], places[tapes[n].to]) / tapeError(tapes[n].length);
          },
          {
            initialValues: [turned[1][0], ...turned.slice(2).flat()],
            maxIterations: 200,
            errorTolerance: 1e-14,
            damping: 1e-3,
            gradientDifference: 1e-2,
            centralDifference: true,
          },
        );
        const theirs = placesOf(fitted.parameterValues);
        const squares = (places: readonly (Point | null)[]) =>
          tapes.reduce(
            (sum, { from, to, length }) =>
              sum + ((distance(places[from]!, places[to]!) - length) / tapeError(length)) ** 2,
            0,
          );
        expect(squares(answer.places)).toBeLessThanOrEqual(squares(theirs) + 1e-9);
        // The library stops a little before the least.
        expectShape(answer.places, theirs, 0.05);
      }),
      { numRuns: 25, seed: 7 },
    );
  });

  test('residuals pull evenly at each point, and the shares of redundancy come to the tapes to spare', () => {
    // The normal equations, and the theorem that redundancy numbers add up to it (Baarda 1968; Ghilani, Adjustment Computations).
    fc.assert(
      fc.property(ringArbitrary, errorsArbitrary, (ring, errors) => {
        const survey = surveyOfPoints(ring, everyPair(ring.length), { errors });
        const tapes = readTapes(survey);
        const placing = pointsPlaced(survey.sketch, tapes)!;
        const { places, tapes: found, spare } = tapesAdjusted(ring, tapes, placing.base);
        expect(spare).toBe(tapes.length - (2 * ring.length - 3));
        expect(found.reduce((sum, { share }) => sum + share, 0)).toBeCloseTo(spare, 6);
        ring.forEach((_, point) => {
          let x = 0;
          let y = 0;
          found.forEach(({ residual, computed }, n) => {
            const { from, to, length } = tapes[n];
            if (from !== point && to !== point) return;
            const other = from === point ? to : from;
            const pull = residual / tapeError(length) ** 2 / computed;
            x += pull * (places[point][0] - places[other][0]);
            y += pull * (places[point][1] - places[other][1]);
          });
          expect(Math.hypot(x, y)).toBeLessThan(1e-6);
        });
      }),
      { numRuns: 60 },
    );
  });

  test('what the others say of a tape is what comes out without it', () => {
    const errors = [3, -2, 4, 1, -3, 2, -1, 3, -4, 2, 1, -2, 3, -1, 2];
    const survey = surveyOfPoints(L_COURT, everyPair(6), { errors });
    const whole = surveyAnswer(survey);
    survey.tapes.forEach(({ from, to }, n) => {
      const without = {
        ...survey,
        tapes: survey.tapes.map((tape, m) => (m === n ? { ...tape, left: true } : tape)),
      };
      const { places } = surveyAnswer(without);
      expect(whole.tapes[n]!.others!).toBeCloseTo(distance(places[from]!, places[to]!), 1);
    });
  });
});

describe('shape', () => {
  test('whatever was drawn: a rough sketch, and one point after another', () => {
    fc.assert(
      fc.property(
        ringArbitrary,
        fc.array(fc.integer({ min: -300, max: 300 }), { minLength: 18, maxLength: 18 }),
        (ring, rough) => {
          const sketch = ring.map(([x, y], n): Point => [x + rough[2 * n], y + rough[2 * n + 1]]);
          const pairs = usualTapes(ring.length).map(({ from, to }): [number, number] => [from, to]);
          const { places, agrees } = surveyAnswer(surveyOfPoints(ring, pairs, { sketch }));
          expect(agrees).toBe(true);
          expectShape(places, ring, 0.01);
        },
      ),
      { numRuns: 60 },
    );
  });

  test('an L is found from a round sketch, since its tapes leave no other shape', () => {
    const round = L_COURT.map((_, n): Point => [
      3000 * Math.cos((n / 6) * 2 * Math.PI),
      3000 * Math.sin((n / 6) * 2 * Math.PI),
    ]);
    const { places, others } = surveyAnswer(
      surveyOfPoints(L_COURT, everyPair(6), { sketch: round }),
    );
    expectShape(places, L_COURT, 0.01);
    expect(others).toEqual([]);
  });

  test('where a corner may lie on either side, both shapes are given', () => {
    // C hangs on two tapes alone: over the line from B to D, or under it.
    const ring: Point[] = [
      [0, 0],
      [6000, 0],
      [4500, 2000],
      [0, 4000],
    ];
    const pairs: [number, number][] = [
      [0, 1],
      [1, 2],
      [2, 3],
      [3, 0],
      [1, 3],
    ];
    const { places, others, spare, telling } = surveyAnswer(surveyOfPoints(ring, pairs));
    expectShape(places, ring, 0.01);
    expect(spare).toBe(0);
    expect(others).toHaveLength(1);
    for (const [from, to] of pairs)
      expect(distance(others[0][from], others[0][to])).toBeCloseTo(
        distance(ring[from], ring[to]),
        3,
      );
    // A to C is the only pair that no tape joins, and it is longer in one shape than in the other.
    expect(telling).toEqual({ from: 0, to: 2 });
    expect(distance(others[0][0], others[0][2])).toBeLessThan(distance(ring[0], ring[2]) - 1000);
  });

  test('a corner with one tape is not fixed, and the rest is', () => {
    const pairs: [number, number][] = [
      [0, 1],
      [1, 2],
      [0, 2],
      [2, 3],
    ];
    const { places, error } = surveyAnswer(surveyOfPoints(L_COURT.slice(0, 4), pairs));
    expect(places.map((place) => place !== null)).toEqual([true, true, true, false]);
    expect(error[3]).toBe(Infinity);
    expect(error[0]).toBeLessThan(10);
  });

  test('pegs off the ground serve as well as corners', () => {
    const pegs: Point[] = [
      [-2000, -1500],
      [9000, -1500],
    ];
    const pairs: [number, number][] = [[6, 7]];
    for (let corner = 0; corner < 6; corner++) pairs.push([6, corner], [7, corner]);
    const survey = surveyOfPoints(L_COURT, pairs, { pegs });
    expectShape(surveyAnswer(survey).places, [...L_COURT, ...pegs], 0.01);
    expect(surveyPointName(survey, 6)).toBe('P1');
  });
});

describe('a wrong reading', () => {
  test('is found, with what it should have read, wherever it is', () => {
    // Blunders far beyond chance; at least one tape to spare beyond the one that finds it.
    fc.assert(
      fc.property(
        ringArbitrary.filter((ring) => ring.length >= 5),
        errorsArbitrary,
        fc.nat(),
        fc.constantFrom(-1000, -100, 90, 300, 1000),
        (ring, errors, which, by) => {
          const pairs = everyPair(ring.length);
          const at = which % pairs.length;
          const shared = errors.map((error) => error / 2);
          const survey = surveyOfPoints(ring, pairs, {
            errors: shared.map((error, n) => (n === at ? error + by : error)),
          });
          fc.pre(survey.tapes[at].length! > 1200);
          const { doubts, restAgrees, agrees } = surveyAnswer(survey);
          expect(agrees).toBe(false);
          const found = doubts[0].tapes.indexOf(at);
          expect(found).toBeGreaterThanOrEqual(0);
          expect(restAgrees).toBe(doubts[0].tapes.length === 1);
          const [from, to] = pairs[at];
          expect(doubts[0].should[found]!).toBeGreaterThan(distance(ring[from], ring[to]) - 12);
          expect(doubts[0].should[found]!).toBeLessThan(distance(ring[from], ring[to]) + 12);
        },
      ),
      { numRuns: 40, seed: 11 },
    );
  });

  test('with one tape to spare cannot be told from any other, and that is said', () => {
    const survey = surveyOfPoints(
      [
        [0, 0],
        [6000, 0],
        [6000, 4000],
        [0, 4000],
      ],
      everyPair(4),
      { errors: [0, 60, 0, 0, 0, 0] },
    );
    const { doubts, restAgrees } = surveyAnswer(survey);
    expect([...doubts[0].tapes].sort()).toEqual([0, 1, 2, 3, 4, 5]);
    expect(restAgrees).toBe(false);
  });

  test('among tapes that only check each other is one of these, and a further tape tells which', () => {
    // The usual tapes of the court: C hangs on B, D and A alone. A – C is read with two digits swapped.
    const survey = surveyOf(L_COURT);
    const read = {
      ...survey,
      tapes: survey.tapes.map((tape) => {
        const length = Math.round(distance(L_COURT[tape.from], L_COURT[tape.to]));
        return { ...tape, length: tape.from === 0 && tape.to === 2 ? 7389 : length };
      }),
    };
    const answer = surveyAnswer(read);
    const names = answer.doubts[0].tapes.map((tape) => tapeName(read, read.tapes[tape]));
    expect([...names].sort()).toEqual(['A – C', 'B – C', 'C – D']);
    const said = surveyWords(read, answer, 'metric').words.map((words) =>
      figuredText(words, 'metric'),
    );
    // √(7200² + 3100²) = 7838.9, worked by hand; read as 7389.
    expect(said[0]).toContain(
      'It looks like A\u00a0–\u00a0C: it reads 7\u202f389\u202fmm, and 7\u202f839\u202fmm would agree.',
    );
    expect(said[0]).toContain('Two digits may have changed places.');
    const { from, to } = answer.telling!;
    const told = {
      ...read,
      tapes: [...read.tapes, { from, to, length: distance(L_COURT[from], L_COURT[to]) }],
    };
    const { doubts, restAgrees } = surveyAnswer(told);
    expect(
      doubts.map(({ tapes }) => tapes.map((tape) => tapeName(told, told.tapes[tape]))),
    ).toEqual([['A – C']]);
    expect(restAgrees).toBe(true);
  });

  test('two of them, where the rest can tell: each is named with what the sound tapes say, and no other', () => {
    // Every pair of six corners leaves six tapes to spare. A – B a metre short, C – F burned by 100 mm.
    const errors = everyPair(6).map(([from, to]) =>
      from === 0 && to === 1 ? -1000 : from === 2 && to === 5 ? 100 : 0,
    );
    const survey = surveyOfPoints(L_COURT, everyPair(6), { errors });
    const { doubts, restAgrees } = surveyAnswer(survey);
    expect(restAgrees).toBe(true);
    const found = new Map(
      doubts.map(({ tapes: [tape], should: [should] }) => [
        tapeName(survey, survey.tapes[tape]),
        should!,
      ]),
    );
    expect([...found.keys()].sort()).toEqual(['A – B', 'C – F']);
    expect(found.get('A – B')).toBeCloseTo(7200, 3);
    expect(found.get('C – F')).toBeCloseTo(Math.hypot(7200, 5400 - 3100), 3);
  });

  test('more than the tapes can tell apart: no length is said of any of them', () => {
    // Worked by trial: of the usual tapes of the court, three to check by, two are wrong.
    const wrong = new Map([
      ['A – C', 7389],
      ['B – E', 7120],
    ]);
    const usual = surveyOf(L_COURT);
    const survey = {
      ...usual,
      tapes: usual.tapes.map((tape) => ({
        ...tape,
        length:
          wrong.get(tapeName(usual, tape)) ??
          Math.round(distance(L_COURT[tape.from], L_COURT[tape.to])),
      })),
    };
    const { state, words } = surveyWords(survey, surveyAnswer(survey), 'metric');
    const said = words.map((sentence) => figuredText(sentence, 'metric'));
    expect(state).toBe('doubt');
    expect(said).toHaveLength(1);
    expect(said[0]).toMatch(/^More than one reading is wrong, and the tapes cannot tell/);
    expect(said[0]).toContain('B\u00a0–\u00a0E');
    expect(said[0]).not.toMatch(/mm/);
  });

  test('of the size that reading explains is none', () => {
    const survey = surveyOfPoints(L_COURT, everyPair(6), { errors: [2, -2, 1, -1, 2, -2] });
    const { agrees, tapes } = surveyAnswer(survey);
    expect(agrees).toBe(true);
    expect(Math.max(...tapes.map((tape) => Math.abs(tape!.standardised)))).toBeLessThan(MISTAKE);
  });

  test.each([
    [5213, 5123, 'metric', 'digits swapped'],
    [4312, 4212, 'metric', 'burned tape'],
    [3400, 4402, 'metric', 'miscounted'],
    [7260, 7200, 'metric', 'one digit'],
    [7234, 7151, 'metric', null],
    [7200, 7203, 'metric', null],
    [12.5 * 304.8, 11.5 * 304.8, 'imperial', 'burned tape'],
    [(6 * 12 + 8) * 25.4, (8 * 12 + 6) * 25.4, 'imperial', 'digits swapped'],
  ] as const)('%d for %d, %s: %s', (read, should, display, kind) => {
    // Common practice: how tapes are misread.
    expect(misreading(read, should, 0, display)).toBe(kind);
  });
});

describe('what is said', () => {
  const read = (pairs: readonly [number, number][]) => {
    const survey = surveyOfPoints(L_COURT, pairs);
    const { state, words } = surveyWords(survey, surveyAnswer(survey), 'metric');
    return { state, said: words.map((sentence) => figuredText(sentence, 'metric')) };
  };
  const sides = L_COURT.map((_, n): [number, number] => [n, (n + 1) % 6]);
  const fromA: [number, number][] = [
    [0, 2],
    [0, 3],
    [0, 4],
  ];

  test('of a ground of which only a part is checked is which corners are not', () => {
    // One spare tape, B – D, checks A to D; E hangs on A and D alone and F on A and E.
    expect(read([...sides, ...fromA]).state).toBe('bare');
    const { state, said } = read([...sides, ...fromA, [1, 3]]);
    expect(state).toBe('part');
    expect(said[1]).toBe(
      'Nothing checks E and F: a wrong reading to one of them would not show. Tape one more to each.',
    );
    expect(read([...sides, ...fromA, [1, 3], [1, 4], [1, 5]]).state).toBe('agrees');
  });

  test('a wrong reading to a corner that is not checked does not show: it is one that is named', () => {
    const pairs: [number, number][] = [...sides, ...fromA, [1, 3]];
    const errors = pairs.map(([from, to]) => (from === 0 && to === 4 ? 200 : 0));
    const survey = surveyOfPoints(L_COURT, pairs, { errors });
    const { agrees, unchecked, places } = surveyAnswer(survey);
    expect(agrees).toBe(true);
    const off = distance(places[1]!, places[4]!) - distance(L_COURT[1], L_COURT[4]);
    expect(Math.abs(off)).toBeGreaterThan(50);
    expect(unchecked).toContain(4);
  });
});

describe('letters run clockwise', () => {
  test('come out as they stand once they are turned, and twice turned are as they were', () => {
    // The court lettered clockwise from A, taped on its own letters; the sketch knows nothing of it.
    const clockwise = L_COURT.map((_, n) => L_COURT[(6 - n) % 6]);
    const fresh = freshSurvey(6);
    const survey = {
      ...fresh,
      tapes: everyPair(6).map(([from, to]) => ({
        from,
        to,
        length: distance(clockwise[from], clockwise[to]),
      })),
    };
    const area = (points: readonly (Point | null)[]) => ringArea(points as Point[]);
    const turnOf = (points: readonly (Point | null)[]) => {
      // On which side of the line from A to its neighbour the court steps in: told by the longer of the two first sides.
      const [a, b, , , , f] = points as Point[];
      return distance(a, b) > distance(a, f);
    };
    expect(turnOf(surveyAnswer(survey).places)).toBe(false);
    const turned = surveyAnswer(lettersTurned(survey)).places;
    expectShape(turned, L_COURT, 0.01);
    expect(turnOf(turned)).toBe(true);
    expect(area(turned)).toBeGreaterThan(0);
    expect(lettersTurned(lettersTurned(survey))).toEqual(survey);
  });

  test('arcs go with their sides', () => {
    const survey = sideBent(freshSurvey(5), 0, 0, 300);
    // A – B becomes A – E: the last side.
    expect(lettersTurned(survey).arcs).toEqual([{ ring: 0, edge: 4, rise: 300 }]);
    expect(tapeSide(lettersTurned(survey), lettersTurned(survey).tapes[0])).toEqual({
      ring: 0,
      edge: 4,
    });
  });
});

describe('the ground', () => {
  test('lies where it was drawn, its longest level side level, in tenths of a millimetre', () => {
    const errors = [4, -3, 2, 1, -4, 3, 2, -2, 1, 3, -1, 2, -3, 1, 2];
    const survey = surveyOfPoints(L_COURT, everyPair(6), { errors });
    const ground = surveyedGround(survey, surveyAnswer(survey), {
      perimeter: [...L_COURT.map(([x, y]): [number, number] => [x, y])],
      keepOuts: [],
    })!;
    expect(ground.perimeter).toHaveLength(6);
    expect(ground.perimeter[0][1]).toBe(ground.perimeter[1][1]);
    ground.perimeter.forEach(([x, y], n) => {
      expect(Math.hypot(x - L_COURT[n][0], y - L_COURT[n][1])).toBeLessThan(12);
      expect(Math.round(x * 10) / 10).toBe(x);
    });
  });

  test('takes arcs by their rise: bulge = 2 · rise ÷ chord', () => {
    // The published convention of polyline arcs: bulge = tan(sweep / 4), which is 2 · rise ÷ chord.
    const survey = {
      ...surveyOfPoints(L_COURT, everyPair(6)),
      arcs: [{ ring: 0, edge: 0, rise: -600 }],
    };
    const ground = surveyedGround(survey, surveyAnswer(survey), { perimeter: [], keepOuts: [] })!;
    expect(ground.perimeter[0][2]).toBeCloseTo(-1200 / 7200, 6);
  });

  test('is none while a corner hangs loose', () => {
    const survey = surveyOfPoints(L_COURT.slice(0, 4), [
      [0, 1],
      [1, 2],
      [0, 2],
    ]);
    expect(
      surveyedGround(survey, surveyAnswer(survey), { perimeter: [], keepOuts: [] }),
    ).toBeNull();
  });
});

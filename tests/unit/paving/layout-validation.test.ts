import { describe, expect, test } from 'vitest';
import type { LayoutDocument, Vertex } from '@/paving/layout-document';
import { parseLayoutDocument, type DocumentProblem } from '@/paving/layout-validation';
import { documentOf, parsed, unitOf } from '../../oracle/documents';

function problemsOf(input: unknown): DocumentProblem[] {
  const result = parseLayoutDocument(input);
  return result.ok ? [] : result.problems;
}

function firstProblem(input: unknown): DocumentProblem {
  const [problem] = problemsOf(input);
  if (!problem) throw new Error('the document was accepted');
  return problem;
}

const withPerimeter = (perimeter: Vertex[], keepOuts: Vertex[][] = []) =>
  documentOf({
    ground: {
      perimeter,
      keepOuts: keepOuts.map((ring, n) => ({ name: `Bed ${n + 1}`, ring })),
    },
  });

const square = (x: number, y: number, side: number): Vertex[] => [
  [x, y],
  [x + side, y],
  [x + side, y + side],
  [x, y + side],
];

describe('the shape of each field', () => {
  test.each([
    ['an empty object', {}, 'schema'],
    ['no object at all', 'floor', ''],
    ['another schema', { ...documentOf({}), schema: 'other@2' }, 'schema'],
    ['a display of its own', { ...documentOf({}), display: 'cubits' }, 'display'],
    [
      'a joint that is text',
      { ...documentOf({}), bond: { kind: 'stack', unit: 'a', joint: '3' } },
      'bond.joint',
    ],
    ['a bond of its own', { ...documentOf({}), bond: { kind: 'spiral' } }, 'bond.kind'],
    ['a length of 0', documentOf({ units: [unitOf('a', 0, 100)] }), 'units.0.length'],
    ['a negative width', documentOf({ units: [unitOf('a', 100, -5)] }), 'units.0.width'],
    ['a length over 10 m', documentOf({ units: [unitOf('a', 10_001, 100)] }), 'units.0.length'],
    [
      'a width that is not a number',
      documentOf({ units: [unitOf('a', 100, NaN)] }),
      'units.0.width',
    ],
    ['an endless length', documentOf({ units: [unitOf('a', Infinity, 100)] }), 'units.0.length'],
    ['a negative clearance', documentOf({ clearance: -1 }), 'clearance'],
    [
      'a corner of one number',
      withPerimeter([[0, 0], [1000, 0], [7] as unknown as Vertex]),
      'ground.perimeter.2',
    ],
    [
      'a corner of text',
      withPerimeter([[0, 0], [1000, 0], ['a', 'b'] as unknown as Vertex]),
      'ground.perimeter.2.0',
    ],
    [
      'a corner beyond 100 km',
      withPerimeter([
        [0, 0],
        [1e9, 0],
        [0, 1000],
      ]),
      'ground.perimeter.1.0',
    ],
  ])('%s is refused at its path', (_, input, path) => {
    const problem = firstProblem(input);
    expect(problem.path.join('.')).toBe(path);
    expect(problem.message).not.toMatch(/Invalid|received/);
  });

  test('fields that the schema does not know are left out, and defaults filled in', () => {
    const { lifted, cutting, ...rest } = documentOf({});
    expect(lifted).toEqual([]);
    expect(cutting).toBe('none');
    expect(parsed({ ...rest, wind: 'west' })).toEqual(documentOf({}));
  });
});

describe('rings', () => {
  test('a ring of two corners is refused, unless an arc joins them', () => {
    expect(
      firstProblem(
        withPerimeter([
          [0, 0],
          [1000, 0],
        ]),
      ).path,
    ).toEqual(['ground', 'perimeter']);
    expect(
      problemsOf(
        withPerimeter([
          [-1000, 0, 1],
          [1000, 0, 1],
        ]),
      ),
    ).toEqual([]);
  });

  test('a bow tie is refused with the point where it crosses', () => {
    const problem = firstProblem(
      withPerimeter([
        [0, 0],
        [4000, 4000],
        [4000, 0],
        [0, 2000],
      ]),
    );
    expect(problem.path).toEqual(['ground', 'perimeter']);
    expect(problem.message).toContain('crosses itself');
    // y = x meets y = 2000 − x / 2 at x = 4000 / 3.
    expect(problem.at![0]).toBeCloseTo(4000 / 3, 6);
    expect(problem.at![1]).toBeCloseTo(4000 / 3, 6);
  });

  test('an arc that bulges through the opposite side is refused where it crosses', () => {
    const problem = firstProblem(
      withPerimeter([
        [0, 0, -1],
        [4000, 0],
        [4000, 1000],
        [0, 1000],
      ]),
    );
    expect(problem.message).toContain('crosses itself');
    expect(problem.at![1]).toBeCloseTo(1000, 6);
  });

  test.each<[string, Vertex[], string]>([
    [
      'a corner given twice',
      [
        [0, 0],
        [1000, 0],
        [1000, 0],
        [0, 1000],
      ],
      'repeats the corner',
    ],
    [
      'a ring closed by its first corner',
      [
        [0, 0],
        [1000, 0],
        [0, 1000],
        [0, 0],
      ],
      'closes by itself',
    ],
    [
      'a spike',
      [
        [0, 0],
        [2000, 0],
        [3000, 0],
        [2000, 0.001],
        [2000, 2000],
      ],
      'folds back',
    ],
    [
      'no area',
      [
        [0, 0],
        [1000, 0],
        [2000, 0],
      ],
      'folds back',
    ],
    [
      'a corner on another edge',
      [
        [0, 0],
        [4000, 0],
        [4000, 2000],
        [2000, 0],
        [0, 2000],
      ],
      'touches itself',
    ],
  ])('%s is refused', (_, ring, words) => {
    const problem = firstProblem(withPerimeter(ring));
    expect(problem.message).toContain(words);
    expect(problem.path.slice(0, 2)).toEqual(['ground', 'perimeter']);
    expect(problem.at).toBeDefined();
  });

  test('a clockwise ring is stored anticlockwise from the same corner, its arc still bulging the same way', () => {
    const stored = parsed(
      withPerimeter([
        [0, 0],
        [0, 1000, -0.5],
        [1000, 1000],
        [1000, 0],
      ]),
    );
    expect(stored.ground.perimeter).toEqual([
      [0, 0],
      [1000, 0],
      [1000, 1000, 0.5],
      [0, 1000],
    ]);
  });

  test('a saw-tooth ring of thousands of corners is checked', () => {
    const teeth = Array.from({ length: 4000 }, (_, n): Vertex => [n * 10, n % 2 ? 3000 : 0]);
    const ring: Vertex[] = [...teeth, [39_990, 5000], [0, 5000]];
    expect(problemsOf({ ...withPerimeter(ring), units: [unitOf('a', 1000)] })).toEqual([]);
    const crossed = ring.map((vertex, n): Vertex => (n === 2001 ? [20_035, 3000] : vertex));
    expect(firstProblem(withPerimeter(crossed)).message).toContain('crosses itself');
  });

  test('outlines of too many pieces are refused before anything is worked out', () => {
    const ring = Array.from({ length: 60_000 }, (_, n): Vertex => {
      const angle = (n / 60_000) * 2 * Math.PI;
      return [200_000 * Math.cos(angle), 200_000 * Math.sin(angle)];
    });
    expect(firstProblem(withPerimeter(ring)).message).toContain('50000');
  });
});

describe('keep-outs', () => {
  const court = square(0, 0, 4000);

  test.each<[string, Vertex[][]]>([
    ['inside, apart from each other', [square(500, 500, 500), square(2000, 2000, 900)]],
    ['along the perimeter', [square(0, 1000, 600)]],
    ['along each other', [square(1000, 1000, 500), square(1500, 1000, 500)]],
    ['corner to corner', [square(1000, 1000, 500), square(1500, 1500, 500)]],
  ])('%s are taken', (_, rings) => {
    expect(problemsOf(withPerimeter(court, rings))).toEqual([]);
  });

  test('one that follows an arc of the perimeter is taken', () => {
    const round: Vertex[] = [
      [-3000, 0, 1],
      [3000, 0, 1],
    ];
    const quarter = Math.tan(Math.PI / 8);
    const bed: Vertex[] = [
      [3000, 0, quarter],
      [0, 3000],
      [0, 2000],
      [2000, 0],
    ];
    expect(problemsOf(withPerimeter(round, [bed]))).toEqual([]);
  });

  test.each<[string, Vertex[][], string, number]>([
    ['across the perimeter', [square(3500, 1000, 1000)], 'crosses the perimeter', 0],
    ['outside', [square(5000, 0, 500)], 'outside', 0],
    ['outside and touching', [square(4000, 0, 500)], 'outside', 0],
    ['over each other', [square(500, 500, 1000), square(1000, 1000, 1000)], 'overlaps "Bed 1"', 1],
    [
      'one in the other',
      [square(500, 500, 2000), square(1000, 1000, 300)],
      'one inside the other',
      1,
    ],
    ['the same twice', [square(500, 500, 1000), square(500, 500, 1000)], 'overlaps "Bed 1"', 1],
  ])('%s are refused with the place', (_, rings, words, index) => {
    const problem = firstProblem(withPerimeter(court, rings));
    expect(problem.message).toContain(words);
    expect(problem.path).toEqual(['ground', 'keepOuts', index, 'ring']);
    expect(problem.at).toBeDefined();
  });
});

describe('units and bonds', () => {
  const bond = (parts: Partial<LayoutDocument>) => firstProblem(documentOf(parts));

  test('a unit that the document does not have is named, with those that it has', () => {
    const problem = bond({ bond: { kind: 'stack', unit: 'z', joint: 3 } });
    expect(problem.path).toEqual(['bond', 'unit']);
    expect(problem.message).toContain('"a"');
  });

  test('two units of one id are refused', () => {
    const problem = bond({ units: [unitOf('a', 300), unitOf('a', 450)] });
    expect(problem.path).toEqual(['units', 1, 'id']);
  });

  test.each(['basket', 'herringbone'] as const)('a %s says what its unit would need', (kind) => {
    const problem = bond({
      units: [unitOf('a', 200, 100)],
      bond: { kind, unit: 'a', joint: 3 },
    });
    expect(problem.path).toEqual(['bond', 'unit']);
    // The words of the layout document, under "Bonds".
    expect(problem.message).toContain(
      'a 200 × 100 unit needs a 0 mm joint; for a 3 mm joint use 203 × 100',
    );
    expect(
      problemsOf(
        documentOf({ units: [unitOf('a', 203, 100)], bond: { kind, unit: 'a', joint: 3 } }),
      ),
    ).toEqual([]);
  });

  test('a pinwheel needs two squares, the small one smaller', () => {
    const pinwheel = { kind: 'pinwheel', unit: 'a', small: 'b', joint: 3 } as const;
    const oblong = bond({ units: [unitOf('a', 400), unitOf('b', 200, 100)], bond: pinwheel });
    expect(oblong.path).toEqual(['bond', 'small']);
    const same = bond({ units: [unitOf('a', 400), unitOf('b', 400)], bond: pinwheel });
    expect(same.message).toContain('smaller');
  });

  test('stepping units that touch or overlap are refused, and parted ones taken', () => {
    const stepping = (pitch: [number, number]) =>
      problemsOf(documentOf({ bond: { kind: 'stepping', unit: 'a', pitch, shift: 0.5 } }));
    expect(stepping([450, 600])[0].path).toEqual(['bond', 'pitch']);
    expect(stepping([600, 400])[0].path).toEqual(['bond', 'pitch']);
    expect(stepping([451, 451])).toEqual([]);
    expect(stepping([1000, 300])).toEqual([]);
  });

  const custom = (a: [number, number], b: [number, number], at: [number, number][]) =>
    documentOf({
      bond: { kind: 'custom', a, b, motif: at.map((place) => ({ unit: 'a', at: place, turn: 0 })) },
    });

  test('a custom bond whose units overlap is refused, however its lattice is written', () => {
    expect(problemsOf(custom([450, 0], [0, 450], [[0, 0]]))).toEqual([]);
    expect(firstProblem(custom([449, 0], [0, 450], [[0, 0]])).path).toEqual(['bond', 'motif', 0]);
    // The same lattice by a skewed basis: b + 7a.
    expect(problemsOf(custom([450, 0], [3150, 450], [[0, 0]]))).toEqual([]);
    expect(firstProblem(custom([450, 0], [3150, 449], [[0, 0]])).message).toContain('overlaps');
    expect(
      firstProblem(
        custom(
          [1000, 0],
          [0, 1000],
          [
            [0, 0],
            [5300, 5300],
          ],
        ),
      ).path,
    ).toEqual(['bond', 'motif', 1]);
    expect(
      problemsOf(
        custom(
          [1000, 0],
          [0, 1000],
          [
            [0, 0],
            [5500, 5500],
          ],
        ),
      ),
    ).toEqual([]);
  });

  test('a lattice that stays in one line is refused', () => {
    expect(firstProblem(custom([500, 0], [1000, 0], [[0, 0]])).path).toEqual(['bond', 'b']);
    expect(firstProblem(custom([0, 0], [0, 500], [[0, 0]])).path).toEqual(['bond', 'a']);
  });

  test('a lattice far too fine for its units is refused without searching it', () => {
    expect(firstProblem(custom([0.001, 0], [0, 0.001], [[0, 0]])).path[0]).toBe('bond');
  });
});

describe('floors too large', () => {
  test('more than two million units are refused with how many and what to change', () => {
    const problem = firstProblem({
      ...withPerimeter(square(0, 0, 150_000)),
      units: [unitOf('a', 100)],
      bond: { kind: 'stack', unit: 'a', joint: 0 },
    });
    expect(problem.path).toEqual(['units', 0]);
    // 1,500 × 1,500 units within, and some along the edge.
    expect(problem.message).toContain('2.3 million units');
    expect(problem.message).toMatch(/100 × 100 mm.*m²/);
  });

  test('a ring of 100 km with units of 1 mm is refused at once', () => {
    const problem = firstProblem({
      ...withPerimeter(square(-9e7, -9e7, 1.8e8)),
      units: [unitOf('a', 1)],
      bond: { kind: 'stack', unit: 'a', joint: 0 },
    });
    expect(problem.path).toEqual(['units', 0]);
  });

  test('a pattern that starts too far off for its addresses is refused', () => {
    const problem = firstProblem({
      ...withPerimeter(square(9e7, 9e7, 20)),
      units: [unitOf('a', 0.05)],
      bond: { kind: 'stack', unit: 'a', joint: 0 },
      placement: { origin: [-9e7, -9e7], turn: 0 },
    });
    expect(problem.path).toEqual(['placement', 'origin']);
  });
});

test('a ring that crosses itself twice is told of both places', () => {
  const problems = problemsOf(
    withPerimeter([
      [0, 0],
      [3000, 0],
      [3000, 1000],
      [2000, 1000],
      [2000, -500],
      [1000, -500],
      [1000, 1000],
      [0, 1000],
    ]),
  );
  expect(problems.map(({ at }) => at?.map(Math.round)).sort()).toEqual([
    [1000, 0],
    [2000, 0],
  ]);
  expect(problems.map(({ message }) => message).join()).toMatch(/edge AB meets edge (DE|FG)/);
});

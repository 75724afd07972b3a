import { describe, expect, test } from 'vitest';
import type { Point } from '@/geometry/point';
import { fit } from '@/paving/fit/fit';
import { layFloor } from '@/paving/laying';
import type { LayoutDocument, Vertex } from '@/paving/layout-document';
import { floorReport } from '@/paving/report';
import { documentOf, parsed, unitOf } from '../oracle/documents';

const rectangle = (width: number, depth: number): Point[] => [
  [0, 0],
  [width, 0],
  [width, depth],
  [0, depth],
];

interface Move {
  readonly turn: number;
  readonly by: Point;
  readonly mirrored?: boolean;
  readonly startAt?: number;
}

/** A ring turned about the origin, mirrored and moved, begun at another corner. */
function moved(
  ring: readonly Point[],
  { turn, by, mirrored = false, startAt = 0 }: Move,
): Vertex[] {
  const [cos, sin] = [Math.cos((turn * Math.PI) / 180), Math.sin((turn * Math.PI) / 180)];
  const all = ring.map(([x, y]): Vertex => {
    const u = mirrored ? -x : x;
    return [u * cos - y * sin + by[0], u * sin + y * cos + by[1]];
  });
  return [...all.slice(startAt), ...all.slice(0, startAt)];
}

function exactFloor(parts: Partial<LayoutDocument>, ring: readonly Point[], move: Move) {
  return parsed(
    documentOf({
      ground: { perimeter: moved(ring, move), keepOuts: [] },
      placement: { origin: [0, 0], turn: move.turn },
      ...parts,
    }),
  );
}

/** The report at what the fit found must say the same. */
function agreed(document: LayoutDocument) {
  const found = fit(document);
  for (const choice of [found, ...found.choices]) {
    const report = floorReport(layFloor({ ...document, placement: choice.placement, lifted: [] }));
    expect(report.wholeUnits).toBe(choice.wholeUnits);
    expect(Math.abs(report.play! - choice.play!)).toBeLessThan(0.01);
  }
  return found;
}

describe.each([
  { turn: 0, by: [0, 0] },
  { turn: 90, by: [120, -40] },
  { turn: 17, by: [0, 0] },
  { turn: 17, by: [1e7, -1e7], startAt: 2 },
  { turn: 33.3, by: [0, 0], mirrored: true, startAt: 1 },
  { turn: 45, by: [500, 900], startAt: 3 },
  { turn: -61.27, by: [1e7, 0], mirrored: true },
] as Move[])('turned by $turn°, moved by $by, begun at corner $startAt', (move) => {
  test('ten by ten 300 mm units close in 3,000 mm: the layout document’s own example', () => {
    const bond = { kind: 'stack', unit: 'a', joint: 0 } as const;
    const document = exactFloor(
      { units: [unitOf('a', 300)], bond, clearance: 0 },
      rectangle(3000, 3000),
      move,
    );
    const found = agreed(document);
    expect(found.wholeUnits).toBe(100);
    // In the middle of what the tolerance leaves: nearest to both sides alike.
    expect(Math.abs(found.play!)).toBeLessThan(0.001);
  });

  test('so do they with joints of 3 mm and a clearance of 6 mm, in 9 joints and two clearances more', () => {
    const bond = { kind: 'stack', unit: 'a', joint: 3 } as const;
    const size = 3000 + 9 * 3 + 2 * 6;
    const document = exactFloor(
      { units: [unitOf('a', 300)], bond, clearance: 6 },
      rectangle(size, size),
      move,
    );
    expect(agreed(document).wholeUnits).toBe(100);
    const tight = exactFloor(
      { units: [unitOf('a', 300)], bond, clearance: 6 },
      rectangle(size - 0.05, size),
      move,
    );
    // 0.05 mm too narrow is more than the tolerance at both sides together: a column falls out.
    expect(agreed(tight).wholeUnits).toBe(90);
  });

  test('a running bond by half closes in whole courses, every other one a unit short', () => {
    const bond = { kind: 'running', unit: 'a', joint: 0, shift: 0.5 } as const;
    const document = exactFloor(
      { units: [unitOf('a', 200, 100)], bond, clearance: 0 },
      rectangle(4000, 1000),
      move,
    );
    // Ten courses: five of 20 units, and five of 19 between their half units.
    expect(agreed(document).wholeUnits).toBe(5 * 20 + 5 * 19);
  });
});

describe('squares at 45° in a rectangle of a × b diagonals', () => {
  // Closed forms worked out exactly for this project and tied to A001844 (oeis.org) for a = b, as in
  // diagonals.test.ts: the best start is that with points touching the sides.
  const d = 100 * Math.SQRT2;
  test.each([
    [1, 1],
    [2, 2],
    [2, 5],
    [3, 4],
    [6, 6],
    [7, 3],
    [8, 8],
  ])('%d × %d: 2ab − a − b + 1', (a, b) => {
    const bond = { kind: 'stack', unit: 'a', joint: 0 } as const;
    for (const turn of [45, 45 + 28]) {
      const document = exactFloor(
        { units: [unitOf('a', 100)], bond, clearance: 0 },
        rectangle(a * d, b * d),
        { turn: turn - 45, by: [0, 0] },
      );
      const turned = { ...document, placement: { ...document.placement, turn } };
      expect(agreed(turned).wholeUnits).toBe(2 * a * b - a - b + 1);
    }
  });
});

test('where a court is begun, mirrored or moved makes no difference to count or play', () => {
  const court: Point[] = [
    [0, 0],
    [7200, 0],
    [7200, 3100],
    [4300, 3100],
    [4300, 5400],
    [0, 5400],
  ];
  const bond = { kind: 'chequer', unit: 'a', joint: 3 } as const;
  const moves: Move[] = [
    { turn: 0, by: [0, 0] },
    { turn: 0, by: [0, 0], startAt: 4 },
    { turn: 71, by: [1e7, 1e7] },
    { turn: 0, by: [9000, 0], mirrored: true },
  ];
  const found = moves.map((move) => {
    const document = exactFloor({ units: [unitOf('a', 450)], bond, clearance: 6 }, court, move);
    const turn = move.turn + 45;
    return agreed({ ...document, placement: { ...document.placement, turn } });
  });
  for (const other of found.slice(1)) {
    expect(other.choices.map(({ wholeUnits }) => wholeUnits)).toEqual(
      found[0].choices.map(({ wholeUnits }) => wholeUnits),
    );
    other.choices.forEach(({ play }, n) => {
      expect(Math.abs(play - found[0].choices[n].play)).toBeLessThan(0.01);
    });
  }
});

test('squares in a rectangle turned by t and by −t or 90° − t are mirror images: the same count and play', () => {
  // Plane geometry: the rectangle is its own mirror image, and so is a stack of squares. The best starts
  // of such a floor make one long face that leaves the lattice cell on one side or the other.
  const bond = { kind: 'stack', unit: 'a', joint: 5 } as const;
  const document = exactFloor(
    { units: [unitOf('a', 450)], bond, clearance: 6 },
    rectangle(4800, 3600),
    { turn: 0, by: [0, 0] },
  );
  const at = (turn: number) =>
    fit({ ...document, placement: { origin: [0, 0], turn } }, { choices: false });
  for (let turn = 0.5; turn < 45; turn += 1) {
    const here = at(turn);
    for (const mirrored of [-turn, 90 - turn]) {
      const other = at(mirrored);
      expect(other.wholeUnits, `${turn}° and ${mirrored}°`).toBe(here.wholeUnits);
      expect(Math.abs(other.play! - here.play!)).toBeLessThan(0.01);
    }
  }
});

import { describe, expect, test } from 'vitest';
import { layFloor } from '@/paving/laying';
import { documentOf, parsed, unitOf } from '../oracle/documents';

// Whole unit squares of a lattice inside a circle, from the On-Line Encyclopedia of Integer
// Sequences (oeis.org), each by its number there. A circle is two arcs. The published squares
// count when all four corners are in the closed disc; arcs are flattened inward by up to
// 0.05 mm, so the circles are 0.1 mm larger in radius, as the layout document says. A circle
// knows no direction, so every count holds at any turn about its centre.

const SIDE = 100;
const TURNS = [0, 17, 30, 45, 61.3, 90];

/** Units laid in a circle of that radius in sides, the lattice's corner or a unit's middle at its centre. */
function squaresInCircle(radius: number, centre: 'corner' | 'middle', turn: number, far = 0) {
  const r = radius * SIDE + 0.1;
  const angle = (turn * Math.PI) / 180;
  const shift = centre === 'corner' ? SIDE / 2 : 0;
  const document = parsed(
    documentOf({
      ground: {
        perimeter: [
          [far - r, far, 1],
          [far + r, far, 1],
        ],
        keepOuts: [],
      },
      units: [unitOf('a', SIDE)],
      bond: { kind: 'stack', unit: 'a', joint: 0 },
      placement: {
        origin: [
          far + shift * (Math.cos(angle) - Math.sin(angle)),
          far + shift * (Math.sin(angle) + Math.cos(angle)),
        ],
        turn,
      },
      clearance: 0,
    }),
  );
  return layFloor(document).laid.count;
}

describe.each(TURNS)('turned by %d°', (turn) => {
  test('A119677: whole squares in a circle of radius n about a corner', () => {
    const terms = [0, 0, 4, 16, 32, 60, 88, 120, 164, 216, 276, 332, 392, 476, 556, 648, 732];
    terms.slice(1).forEach((term, n) => {
      expect(squaresInCircle(n + 1, 'corner', turn)).toBe(term);
    });
  });

  test('A136485: whole squares in a circle of diameter n about a corner', () => {
    const terms = [0, 0, 4, 4, 12, 16, 24, 32, 52, 60, 76, 88, 112, 120, 148, 164, 192, 216, 256];
    terms.forEach((term, n) => {
      expect(squaresInCircle((n + 1) / 2, 'corner', turn)).toBe(term);
    });
  });

  test('A373193: whole squares in a circle of radius n about the middle of a square', () => {
    const terms = [1, 5, 21, 37, 61, 89, 129, 177, 221, 277, 341, 401, 489, 561, 657, 749, 845];
    terms.forEach((term, n) => {
      expect(squaresInCircle(n + 1, 'middle', turn)).toBe(term);
    });
  });
});

test('A119677 and A373193 at their 43rd terms, and 10 km from the origin', () => {
  expect(squaresInCircle(43, 'corner', 17)).toBe(5616);
  expect(squaresInCircle(43, 'middle', 17)).toBe(5637);
  expect(squaresInCircle(20, 'corner', 33, 1e7)).toBe(1176);
});

test('A281795: squares that a disc of radius n reaches into are those laid and left out', () => {
  // Its formula there: 4·Σ ceil(√(n² − k²)) over k = 0 … n − 1, a(4) = 60. The circle here is not
  // enlarged, and no square that it only grazes has 1 mm² inside.
  const touched = (n: number) => {
    const r = n * SIDE;
    const document = parsed(
      documentOf({
        ground: {
          perimeter: [
            [-r, 0, 1],
            [r, 0, 1],
          ],
          keepOuts: [],
        },
        units: [unitOf('a', SIDE)],
        bond: { kind: 'stack', unit: 'a', joint: 0 },
        placement: { origin: [SIDE / 2, SIDE / 2], turn: 0 },
        clearance: 0,
      }),
    );
    const { laid, leftOut } = layFloor(document);
    return laid.count + leftOut.count;
  };
  expect(touched(4)).toBe(60);
  for (let n = 1; n <= 12; n++) {
    let sum = 0;
    for (let k = 0; k < n; k++) sum += 4 * Math.ceil(Math.sqrt(n * n - k * k));
    expect(touched(n)).toBe(sum);
  }
});

import { describe, expect, test } from 'vitest';
import { fit } from '@/paving/fit/fit';
import type { Bond } from '@/paving/layout-document';
import { documentOf, parsed, unitOf } from '../oracle/documents';

// Unit squares in circles, from the On-Line Encyclopedia of Integer Sequences (oeis.org), each by
// its number there. A circle is two arcs, 0.1 mm larger in radius than its name, since arcs are
// flattened inward by up to 0.05 mm (layout document, "What is laid").

const SIDE = 100;
const GROWN = 0.1 / SIDE;

function mostInCircle(radius: number, bond: Bond, turn: number): number {
  const r = radius * SIDE + 0.1;
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
      bond,
      placement: { origin: [0, 0], turn },
      clearance: 0,
    }),
  );
  return fit(document, { choices: false }).wholeUnits;
}

const stack: Bond = { kind: 'stack', unit: 'a', joint: 0 };
const running = (shift: number): Bond => ({ kind: 'running', unit: 'a', joint: 0, shift });

// A374505, diameter 0 … 32: the most unit squares in rows of height 1 that may slide freely.
const ROWS_BY_DIAMETER = [
  0, 0, 1, 4, 8, 14, 21, 29, 40, 52, 65, 81, 97, 116, 135, 156, 180, 203, 229, 258, 286, 317, 350,
  383, 419, 455, 495, 536, 575, 620, 664, 711, 761,
];
// A125228 and A372847, radius 1 …: the same with an odd and with an even number of rows about the middle.
const ODD_ROWS = [1, 7, 21, 39, 65, 93, 135, 179, 227, 285, 349, 415, 495, 573, 663, 759];
const EVEN_ROWS = [0, 6, 18, 36, 64, 92, 130, 172, 224, 284, 344, 410, 488, 570, 658, 750];
// A124484, radius 0 …: the best packings known, in any arrangement.
const BEST_KNOWN = [0, 0, 8, 21, 40, 65, 97, 135, 180, 229, 286, 350, 419, 495, 575, 664, 761];
// A119677 and A373193: squares of the grid whole in the circle about a corner, radius 0 …, and about
// the middle of a square, radius 1 ….
const ABOUT_CORNER = [0, 0, 4, 16, 32, 60, 88, 120, 164, 216, 276, 332, 392, 476, 556, 648, 732];
const ABOUT_MIDDLE = [1, 5, 21, 37, 61, 89, 129, 177, 221, 277, 341, 401, 489, 561, 657, 749];

// A136485 and A261849, diameter 1 …: about a corner, and inscribed in a square of n by n squares.
const CORNER_BY_DIAMETER = [
  0, 0, 4, 4, 12, 16, 24, 32, 52, 60, 76, 88, 112, 120, 148, 164, 192, 216, 256, 276, 308, 332, 376,
  392, 440, 476, 524, 556,
];
const INSCRIBED = [
  0, 0, 1, 4, 9, 16, 21, 32, 45, 60, 69, 88, 101, 120, 145, 164, 185, 216, 241, 276, 293, 332, 365,
  392, 437, 476, 509, 556,
];

/** Most squares in rows that slide freely, for any radius, by every height of the rows at which a row gains one. */
function mostInRows(radius: number): number {
  const heights = [0];
  for (let width = 1; width <= 2 * radius; width++) {
    const half = Math.sqrt(radius * radius - (width / 2) ** 2);
    heights.push(half - Math.floor(half), 1 - (half - Math.floor(half)));
  }
  const squares = (height: number) => {
    let sum = 0;
    for (let row = Math.floor(-radius) - 1; row <= radius + 1; row++) {
      const far = Math.max(Math.abs(row + height), Math.abs(row + height + 1));
      // A square that touches the circle counts; 1e-9 is for rounding alone.
      if (far < radius) sum += Math.floor(2 * Math.sqrt(radius * radius - far * far) + 1e-9);
    }
    return sum;
  };
  return Math.max(...heights.map((height) => squares(height % 1)));
}

test('the bound for sliding rows, worked out here for any radius, is the published one', () => {
  ROWS_BY_DIAMETER.forEach((most, diameter) => expect(mostInRows(diameter / 2)).toBe(most));
});

test('up to diameter 20, 0.1 mm more in radius lets no rows take one more square, so the bounds hold for the larger circles', () => {
  for (let diameter = 2; diameter <= 20; diameter++) {
    expect(mostInRows(diameter / 2 + GROWN)).toBe(ROWS_BY_DIAMETER[diameter]);
  }
});

describe.each([
  ['stack', stack, 0],
  ['stack', stack, 30],
  ['running by half', running(0.5), 17],
  ['running by a third', running(1 / 3), 0],
])('%s, turned', (_, bond, turn) => {
  test(`at ${turn}°, no circle holds more than freely sliding rows and the best packing known`, () => {
    for (let diameter = 2; diameter <= 20; diameter++) {
      const most = mostInCircle(diameter / 2, bond, turn);
      expect(most).toBeLessThanOrEqual(ROWS_BY_DIAMETER[diameter]);
      // Its first terms are 0, though a circle of radius 1 has room for a square.
      if (diameter % 2 === 0 && diameter > 2) {
        expect(most).toBeLessThanOrEqual(BEST_KNOWN[diameter / 2]);
      }
    }
  });
});

test('a stack in a circle reaches or beats the grid about a corner and about the middle of a square', () => {
  for (let radius = 1; radius <= 14; radius++) {
    const most = mostInCircle(radius, stack, 17);
    expect(most).toBeGreaterThanOrEqual(ABOUT_CORNER[radius]);
    expect(most).toBeGreaterThanOrEqual(ABOUT_MIDDLE[radius - 1]);
  }
});

test('so it does in a circle of any whole diameter, about a corner and in its own square of n by n', () => {
  for (let diameter = 1; diameter <= 28; diameter++) {
    const most = mostInCircle(diameter / 2, stack, 31);
    expect(most).toBeGreaterThanOrEqual(CORNER_BY_DIAMETER[diameter - 1]);
    expect(most).toBeGreaterThanOrEqual(INSCRIBED[diameter - 1]);
  }
});

test('no placement beats the better of odd and even rows where no other height of the rows does', () => {
  for (let radius = 1; radius <= 10; radius++) {
    const better = Math.max(ODD_ROWS[radius - 1], EVEN_ROWS[radius - 1]);
    if (ROWS_BY_DIAMETER[2 * radius] !== better) continue;
    for (const shift of [0, 0.5]) {
      expect(mostInCircle(radius, running(shift), 45)).toBeLessThanOrEqual(better);
    }
  }
});

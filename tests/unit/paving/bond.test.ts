import { expect, test } from 'vitest';
import { bondPattern, documentUnit } from '@/paving/bond';
import type { Bond, Unit } from '@/paving/layout-document';
import { documentOf, parsed, unitOf } from '../../oracle/documents';

test('every bond of the table covers its cell as its units and joints say, without overlap', () => {
  // Each unit takes (length + joint) × (width + joint) of the cell; a chequer leaves half void.
  const cell = (units: Unit[], bond: Bond) => {
    const document = parsed(documentOf({ units, bond }));
    const { a, b, motif, joint } = bondPattern(document);
    const taken = motif.reduce((sum, entry) => {
      const { length, width } = documentUnit(document, entry.unit);
      return sum + (length + joint) * (width + joint);
    }, 0);
    return taken / (a[0] * b[1] - a[1] * b[0]);
  };
  expect(cell([unitOf('a', 450)], { kind: 'stack', unit: 'a', joint: 3 })).toBeCloseTo(1, 12);
  expect(
    cell([unitOf('a', 600, 200)], { kind: 'running', unit: 'a', joint: 5, shift: 0.3 }),
  ).toBeCloseTo(1, 12);
  expect(cell([unitOf('a', 450)], { kind: 'chequer', unit: 'a', joint: 3 })).toBeCloseTo(0.5, 12);
  expect(cell([unitOf('a', 203, 100)], { kind: 'basket', unit: 'a', joint: 3 })).toBeCloseTo(1, 12);
  expect(cell([unitOf('a', 203, 100)], { kind: 'herringbone', unit: 'a', joint: 3 })).toBeCloseTo(
    1,
    12,
  );
  expect(
    cell([unitOf('a', 400), unitOf('b', 150)], {
      kind: 'pinwheel',
      unit: 'a',
      small: 'b',
      joint: 3,
    }),
  ).toBeCloseTo(1, 12);
});

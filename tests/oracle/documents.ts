import fc from 'fast-check';
import { bondPattern } from '@/paving/bond';
import type { Bond, LayoutDocument, Unit, Vertex } from '@/paving/layout-document';
import { parseLayoutDocument } from '@/paving/layout-validation';

/** Layout documents for tests: valid by construction, of every bond, at any turn. */

export const real = (min: number, max: number) =>
  fc.double({ min, max, noNaN: true, noDefaultInfinity: true });

export function unitOf(id: string, length: number, width = length): Unit {
  return { id, name: `Unit ${id}`, length, width, thickness: 50 };
}

export function documentOf(parts: Partial<LayoutDocument>): LayoutDocument {
  return {
    schema: 'evenlay/layout@1',
    display: 'metric',
    ground: {
      perimeter: [
        [0, 0],
        [4000, 0],
        [4000, 3000],
        [0, 3000],
      ],
      keepOuts: [],
    },
    units: [unitOf('a', 450)],
    bond: { kind: 'stack', unit: 'a', joint: 3 },
    placement: { origin: [0, 0], turn: 0 },
    clearance: 6,
    lifted: [],
    cutting: 'none',
    ...parts,
  };
}

/** The document as it is stored; a document that is refused fails the test with its problems. */
export function parsed(input: unknown): LayoutDocument {
  const result = parseLayoutDocument(input);
  if (!result.ok) throw new Error(JSON.stringify(result.problems));
  return result.document;
}

/** Units and a bond that fit each other. */
export const bondOf: fc.Arbitrary<{ units: Unit[]; bond: Bond }> = fc
  .record({
    length: real(260, 900),
    width: real(260, 600),
    joint: fc.oneof(fc.constant(0), real(0, 25)),
    shift: real(0, 0.99),
    skew: real(-0.8, 0.8),
    turn: real(0, 360),
    kind: fc.constantFrom(
      'stack',
      'running',
      'chequer',
      'stepping',
      'basket',
      'herringbone',
      'pinwheel',
      'custom',
    ),
  })
  .map(({ length, width, joint, shift, skew, turn, kind }) => {
    switch (kind) {
      case 'stack':
      case 'chequer':
        return { units: [unitOf('a', length, width)], bond: { kind, unit: 'a', joint } as Bond };
      case 'running':
        return { units: [unitOf('a', length, width)], bond: { kind, unit: 'a', joint, shift } };
      case 'stepping':
        return {
          units: [unitOf('a', length, width)],
          bond: { kind, unit: 'a', pitch: [length + 5 + joint, width + 20], shift },
        };
      case 'basket':
      case 'herringbone':
        return {
          units: [unitOf('a', width + joint, width / 2)],
          bond: { kind, unit: 'a', joint },
        };
      case 'pinwheel':
        return {
          units: [unitOf('a', length), unitOf('b', length * 0.4)],
          bond: { kind, unit: 'a', small: 'b', joint },
        };
      default: {
        // A large unit and a small one side by side in a skewed cell, each with its own turn.
        const across = Math.hypot(length, width) + 10;
        return {
          units: [unitOf('a', length, width), unitOf('b', width / 2, width / 3)],
          bond: {
            kind: 'custom',
            a: [across + width, 0],
            b: [skew * across, across],
            motif: [
              { unit: 'a', at: [0, 0], turn },
              { unit: 'b', at: [(across + width) / 2, 0], turn: 2 * turn },
            ],
            joint,
          },
        };
      }
    }
  });

/** A ring that its centre sees all of, with `count` corners; `bulges` makes some edges arcs. */
const starRing = (bulges: boolean): fc.Arbitrary<Vertex[]> =>
  fc
    .array(
      fc.record({
        radius: real(1500, 3200),
        swing: real(-0.25, 0.25),
        bulge: fc.oneof(fc.constant(0), real(-0.12, 0.3)),
      }),
      { minLength: 6, maxLength: 11 },
    )
    .map((corners) =>
      corners.map(({ radius, swing, bulge }, n): Vertex => {
        const angle = ((n + swing) / corners.length) * 2 * Math.PI;
        const x = radius * Math.cos(angle);
        const y = radius * Math.sin(angle);
        return bulges && bulge !== 0 ? [x, y, bulge] : [x, y];
      }),
    );

/** A notched court or a comb of bays, its sides at right angles. */
const bayRing: fc.Arbitrary<Vertex[]> = fc
  .array(fc.record({ depth: real(300, 2400), width: real(400, 1500), wall: real(60, 700) }), {
    minLength: 1,
    maxLength: 4,
  })
  .map((bays) => {
    const ring: Vertex[] = [[0, -1500]];
    const back: Vertex[] = [];
    let x = 0;
    for (const { depth, width, wall } of bays) {
      back.push([x, depth], [x + width, depth], [x + width, 0], [x + width + wall, 0]);
      x += width + wall;
    }
    ring.push([x, -1500], ...back.reverse());
    return ring;
  });

const keepOut: fc.Arbitrary<Vertex[]> = fc
  .record({ sides: fc.integer({ min: 3, max: 6 }), radius: real(60, 500), turn: real(0, 6) })
  .map(({ sides, radius, turn }) =>
    Array.from({ length: sides }, (_, n): Vertex => {
      const angle = turn + (n / sides) * 2 * Math.PI;
      return [radius * Math.cos(angle), radius * Math.sin(angle)];
    }),
  );

export interface DocumentChoices {
  readonly arcs?: boolean;
  readonly clearance?: fc.Arbitrary<number>;
}

/** Any floor: a court with bays or an irregular ring, some with a keep-out in the middle. */
export function anyDocument({ arcs = false, clearance }: DocumentChoices = {}) {
  return fc
    .record({
      ring: fc.oneof(
        fc.record({ perimeter: starRing(arcs), hole: fc.option(keepOut) }),
        bayRing.map((perimeter) => ({ perimeter, hole: null })),
      ),
      pattern: bondOf,
      origin: fc.tuple(real(-2000, 2000), real(-2000, 2000)),
      turn: fc.oneof(fc.constantFrom(0, 45, 90, 180), real(-180, 180)),
      clearance: clearance ?? fc.oneof(fc.constant(0), real(0, 70)),
      lifted: fc.array(
        fc.tuple(fc.integer({ min: -4, max: 4 }), fc.integer({ min: -4, max: 4 }), fc.nat(2)),
        { maxLength: 4 },
      ),
    })
    .map(({ ring, pattern, origin, turn, clearance: least, lifted }) =>
      parsed(
        documentOf({
          ground: {
            perimeter: ring.perimeter,
            keepOuts: ring.hole ? [{ name: 'Bed', ring: ring.hole }] : [],
          },
          ...pattern,
          placement: { origin, turn },
          clearance: least,
          lifted,
        }),
      ),
    );
}

/**
 * Floors on a grid of 50 mm: units touch edges, corners and each other exactly, run through
 * the middle by keep-outs that share sides with each other and with the perimeter.
 */
export const gridDocument = fc
  .record({
    columns: fc.integer({ min: 30, max: 70 }),
    rows: fc.integer({ min: 20, max: 50 }),
    notch: fc.tuple(fc.integer({ min: 0, max: 20 }), fc.integer({ min: 0, max: 15 })),
    beds: fc.uniqueArray(fc.nat(8), { maxLength: 5 }),
    bed: fc.tuple(fc.integer({ min: 2, max: 6 }), fc.integer({ min: 2, max: 6 })),
    at: fc.tuple(fc.integer({ min: 0, max: 12 }), fc.integer({ min: 0, max: 2 })),
    length: fc.integer({ min: 4, max: 12 }),
    width: fc.integer({ min: 4, max: 10 }),
    kind: fc.constantFrom('stack', 'running', 'chequer', 'stepping', 'herringbone'),
    origin: fc.tuple(fc.integer({ min: -10, max: 10 }), fc.integer({ min: -10, max: 10 })),
    turn: fc.constantFrom(0, 90, 180, 270),
    clearance: fc.constantFrom(0, 0, 50, 100),
  })
  .map((parts) => {
    const step = 50;
    const { kind, notch, bed, at } = parts;
    const [right, top] = [parts.columns * step, parts.rows * step];
    const corner: Vertex[] =
      notch[0] > 0 && notch[1] > 0
        ? [
            [right, top - notch[1] * step],
            [right - notch[0] * step, top - notch[1] * step],
            [right - notch[0] * step, top],
          ]
        : [[right, top]];
    const keepOuts = parts.beds.map((place) => {
      const x = (at[0] + (place % 3) * bed[0]) * step;
      const y = (at[1] + Math.floor(place / 3) * bed[1]) * step;
      const ring: Vertex[] = [
        [x, y],
        [x + bed[0] * step, y],
        [x + bed[0] * step, y + bed[1] * step],
        [x, y + bed[1] * step],
      ];
      return { name: `Bed ${place}`, ring };
    });
    const [length, width] = [parts.length * step, parts.width * step];
    const bonds: Record<typeof kind, Bond> = {
      stack: { kind: 'stack', unit: 'a', joint: 0 },
      running: { kind: 'running', unit: 'a', joint: 50, shift: 0.5 },
      chequer: { kind: 'chequer', unit: 'a', joint: 0 },
      stepping: { kind: 'stepping', unit: 'a', pitch: [length + 50, width + 100], shift: 0 },
      herringbone: { kind: 'herringbone', unit: 'a', joint: 0 },
    };
    return documentOf({
      ground: { perimeter: [[0, 0], [right, 0], ...corner, [0, top]], keepOuts },
      units: [unitOf('a', kind === 'herringbone' ? 2 * width : length, width)],
      bond: bonds[kind],
      placement: {
        origin: [parts.origin[0] * step, parts.origin[1] * step],
        turn: parts.turn,
      },
      clearance: parts.clearance,
    });
  });

/** The document with its bond written out as a custom one: the same floor, addresses and joint. */
export function asCustom(document: LayoutDocument): LayoutDocument {
  const { a, b, motif, joint } = bondPattern(document);
  return {
    ...document,
    bond: {
      kind: 'custom',
      a: [a[0], a[1]],
      b: [b[0], b[1]],
      motif: motif.map((entry) => ({ ...entry })),
      joint,
    },
  };
}

import { bondPattern, documentUnit } from './bond';
import type { Bond, BondKind, LayoutDocument, Unit } from './layout-document';

/** Changes of bond and unit that carry over what still makes sense. */

/** The bonds in the order they are offered. */
export const BOND_KINDS: readonly BondKind[] = [
  'stack',
  'running',
  'chequer',
  'stepping',
  'basket',
  'herringbone',
  'pinwheel',
  'custom',
];

/** Bonds as they are called on the screen. */
export const BOND_NAMES: Readonly<Record<BondKind, string>> = {
  stack: 'Stack',
  running: 'Running',
  chequer: 'Chequer',
  stepping: 'Stepping',
  basket: 'Basket',
  herringbone: 'Herringbone',
  pinwheel: 'Pinwheel',
  custom: 'Custom',
};

/** A joint wider than this is a void; no bond that needs a joint to fit its unit is offered with one, mm. */
const GREATEST_FITTED_JOINT_MM = 30;
/** The gap that stepping units begin with, mm. */
const STEPPING_GAP_MM = 100;
/** Lengths nearer than this are the same size, mm. */
const SAME_SIZE_MM = 0.01;

/** Id of the unit that the bond is laid with; a custom bond's first. */
export const mainUnitId = (bond: Bond): string =>
  bond.kind === 'custom' ? bond.motif[0].unit : bond.unit;

/** The unit that the bond is named for: of a pinwheel the larger, of a custom bond the first. */
export const mainUnit = (document: LayoutDocument): Unit =>
  documentUnit(document, mainUnitId(document.bond));

/** The joint of a bond, mm; of stepping, the narrower of its gaps. */
export function bondJoint(document: LayoutDocument): number {
  const { bond } = document;
  if (bond.kind === 'custom') return bond.joint ?? 0;
  if (bond.kind !== 'stepping') return bond.joint;
  const unit = documentUnit(document, bond.unit);
  return Math.max(0, Math.min(bond.pitch[0] - unit.length, bond.pitch[1] - unit.width));
}

const isSquare = (unit: Unit) => Math.abs(unit.length - unit.width) <= SAME_SIZE_MM;

/** The joint with which a unit is twice as long as wide, L = 2W + g; null when none in use would do. */
export function twoToOneJoint(unit: Unit): number | null {
  const joint = Math.round((unit.length - 2 * unit.width) * 1e6) / 1e6;
  return joint >= -SAME_SIZE_MM && joint <= GREATEST_FITTED_JOINT_MM ? Math.max(0, joint) : null;
}

export type BondChoice =
  | { readonly ok: true; readonly document: LayoutDocument }
  | { readonly ok: false; readonly message: string };

/** The second, smaller square of a pinwheel: one that the document has, or one of half the size. */
function smallSquare(document: LayoutDocument, large: Unit): { units: Unit[]; small: Unit } {
  const found = document.units.find(
    (unit) => unit.id !== large.id && isSquare(unit) && unit.length < large.length,
  );
  if (found) return { units: [...document.units], small: found };
  const side = Math.round(large.length / 2);
  const taken = new Set(document.units.map((unit) => unit.id));
  const id =
    ['b', 'c', 'd', 'small', 'small-2'].find((candidate) => !taken.has(candidate)) ?? 'small-3';
  const small: Unit = { ...large, id, name: `Square ${side}`, length: side, width: side };
  return { units: [...document.units, small], small };
}

/**
 * The document in another bond, its unit and joint kept. When the unit cannot be laid in that bond the
 * answer says what would do.
 */
export function bondChosen(document: LayoutDocument, kind: BondKind): BondChoice {
  if (document.bond.kind === kind) return { ok: true, document };
  const unit = mainUnit(document);
  const joint = Math.min(bondJoint(document), GREATEST_FITTED_JOINT_MM);
  const withBond = (bond: Bond, units = document.units): BondChoice => ({
    ok: true,
    document: { ...document, units, bond, lifted: [] },
  });
  switch (kind) {
    case 'stack':
    case 'chequer':
      return withBond({ kind, unit: unit.id, joint });
    case 'running':
      return withBond({ kind, unit: unit.id, joint, shift: 0.5 });
    case 'stepping':
      return withBond({
        kind,
        unit: unit.id,
        pitch: [unit.length + STEPPING_GAP_MM, unit.width + STEPPING_GAP_MM],
        shift: 0,
      });
    case 'basket':
    case 'herringbone': {
      const fitted = twoToOneJoint(unit);
      if (fitted === null)
        return {
          ok: false,
          message: 'Needs a unit twice as long as wide, such as 200 × 100 mm or 4 × 8 in.',
        };
      return withBond({ kind, unit: unit.id, joint: fitted });
    }
    case 'pinwheel': {
      if (!isSquare(unit))
        return { ok: false, message: 'Needs a square unit and a smaller square.' };
      const { units, small } = smallSquare(document, unit);
      return withBond({ kind, unit: unit.id, small: small.id, joint }, units);
    }
    case 'custom': {
      const { a, b, motif, joint: gap } = bondPattern(document);
      return withBond({
        kind,
        a: [a[0], a[1]],
        b: [b[0], b[1]],
        motif: motif.map((entry) => ({ ...entry, at: [entry.at[0], entry.at[1]] })),
        joint: gap,
      });
    }
  }
}

/**
 * A side typed alone, with the other side where the bond ties the two: squares stay square in a pinwheel, and a
 * unit stays twice as long as wide, with the joint, in basket and herringbone.
 */
function sidesTogether(
  { bond }: LayoutDocument,
  id: string,
  change: Partial<Omit<Unit, 'id'>>,
): Partial<Omit<Unit, 'id'>> {
  const { length, width } = change;
  if ((length === undefined) === (width === undefined)) return change;
  if (bond.kind === 'pinwheel' && (bond.unit === id || bond.small === id)) {
    const side = (length ?? width)!;
    return { ...change, length: side, width: side };
  }
  if ((bond.kind === 'basket' || bond.kind === 'herringbone') && bond.unit === id) {
    const { joint } = bond;
    if (length === undefined) return { ...change, length: 2 * width! + joint };
    return length > joint ? { ...change, width: (length - joint) / 2 } : change;
  }
  return change;
}

/** A document with another unit. */
export interface UnitChange {
  readonly document: LayoutDocument;
  /** What else had to change with the unit, said to the person; null when nothing had to. */
  readonly said: string | null;
}

/**
 * The document with unit `id` changed. Sides that the bond ties change together. Stepping keeps its gaps; a bond that needs 2 : 1 takes the joint
 * that fits, or gives way to running bond; a pinwheel whose unit is no longer square gives way to stack.
 */
export function unitChanged(
  document: LayoutDocument,
  id: string,
  change: Partial<Omit<Unit, 'id'>>,
): UnitChange {
  const before = documentUnit(document, id);
  const unit = { ...before, ...sidesTogether(document, id, change) };
  const next: LayoutDocument = {
    ...document,
    units: document.units.map((other) => (other.id === id ? unit : other)),
  };
  const { bond } = next;
  const sized = unit.length !== before.length || unit.width !== before.width;
  if (!sized) return { document: next, said: null };

  if (bond.kind === 'stepping' && bond.unit === id) {
    const pitch: [number, number] = [
      bond.pitch[0] + unit.length - before.length,
      bond.pitch[1] + unit.width - before.width,
    ];
    return { document: { ...next, bond: { ...bond, pitch } }, said: null };
  }
  if ((bond.kind === 'basket' || bond.kind === 'herringbone') && bond.unit === id) {
    const joint = twoToOneJoint(unit);
    if (joint === null)
      return {
        document: {
          ...next,
          bond: { kind: 'running', unit: id, joint: bond.joint, shift: 0.5 },
          lifted: [],
        },
        said: `That unit is not twice as long as wide, so the bond is now running bond instead of ${bond.kind}.`,
      };
    if (joint === bond.joint) return { document: next, said: null };
    return {
      document: { ...next, bond: { ...bond, joint } },
      said: `The joint is now ${joint} mm: in ${bond.kind} it must make the unit twice as long as wide.`,
    };
  }
  if (bond.kind === 'pinwheel' && (bond.unit === id || bond.small === id)) {
    const large = documentUnit(next, bond.unit);
    const small = documentUnit(next, bond.small);
    if (!isSquare(large))
      return {
        document: {
          ...next,
          bond: { kind: 'stack', unit: bond.unit, joint: bond.joint },
          lifted: [],
        },
        said: 'A pinwheel needs squares, so the bond is now stack bond.',
      };
    if (!isSquare(small) || small.length >= large.length) {
      const side = Math.round(large.length / 2);
      return {
        document: {
          ...next,
          units: next.units.map((other) =>
            other.id === small.id
              ? { ...other, name: `Square ${side}`, length: side, width: side }
              : other,
          ),
        },
        said: `The smaller square is now ${side} mm: it must be square and smaller than the other.`,
      };
    }
  }
  return { document: next, said: null };
}

/** Ids for units that the table adds, in the order in which they are given. */
const UNIT_IDS = ['a', 'b', 'c', 'd', 'e', 'f', 'g', 'h'] as const;

/** The document with one more unit of half the main one's size, for a second size in a bond of one's own. */
export function unitAdded(document: LayoutDocument): LayoutDocument {
  const main = mainUnit(document);
  const taken = new Set(document.units.map((unit) => unit.id));
  const id =
    UNIT_IDS.find((candidate) => !taken.has(candidate)) ?? `unit-${document.units.length + 1}`;
  const [length, width] = [Math.round(main.length / 2), Math.round(main.width / 2)];
  return {
    ...document,
    units: [...document.units, { ...main, id, name: `Own ${length} × ${width} mm`, length, width }],
  };
}

/**
 * A bond of one's own with one more unit in its repeat: beside the last along the course, the course's step
 * drawn out by the unit and its joint so that there is room for it.
 */
export function motifExtended(document: LayoutDocument): LayoutDocument {
  const { bond } = document;
  if (bond.kind !== 'custom') return document;
  const last = bond.motif[bond.motif.length - 1];
  const unit = documentUnit(document, last.unit);
  const radians = (last.turn * Math.PI) / 180;
  const joint = bond.joint ?? 0;
  const stride = Math.hypot(bond.a[0], bond.a[1]) || 1;
  const along: [number, number] = [bond.a[0] / stride, bond.a[1] / stride];
  // How far the unit, turned as the last one, reaches along the course.
  const reach =
    Math.abs(along[0] * Math.cos(radians) + along[1] * Math.sin(radians)) * unit.length +
    Math.abs(-along[0] * Math.sin(radians) + along[1] * Math.cos(radians)) * unit.width +
    joint;
  const micron = (value: number) => Math.round(value * 1000) / 1000;
  return {
    ...document,
    lifted: [],
    bond: {
      ...bond,
      a: [micron(bond.a[0] + along[0] * reach), micron(bond.a[1] + along[1] * reach)],
      motif: [
        ...bond.motif,
        {
          ...last,
          at: [micron(last.at[0] + along[0] * reach), micron(last.at[1] + along[1] * reach)],
        },
      ],
    },
  };
}

import { bondPattern, documentUnit } from '../bond';
import type { Bond, LayoutDocument } from '../layout-document';
import type { ActualUnit } from './creep-types';

/** Joint along the courses and between them, mm; of `stepping` the gaps. The same where a bond has only one. */
export interface Joints {
  readonly along: number;
  readonly across: number;
}

/**
 * Which joints of a bond can be changed on site. `both`: each for itself; `one`: units interlock, all change
 * together; `across`: stones keep their place along the course; `none`: the steps are the bond's own.
 */
export type JointFreedom = 'both' | 'one' | 'across' | 'none';

/** Which joints of a bond can be changed on site. */
export function jointFreedom({ kind }: Bond): JointFreedom {
  switch (kind) {
    case 'stack':
    case 'running':
    case 'chequer':
      return 'both';
    case 'basket':
    case 'herringbone':
    case 'pinwheel':
      return 'one';
    case 'stepping':
      return 'across';
    case 'custom':
      return 'none';
  }
}

/** Sizes nearer than this are exact, mm: rounding only, so that patterns change evenly with their joints. */
const EXACT_MM = 1e-9;

const sizeOf = (units: readonly Pick<ActualUnit, 'unit' | 'length' | 'width'>[], id: string) => {
  const found = units.find(({ unit }) => unit === id);
  if (!found) throw new Error(`no size of unit "${id}"`);
  return found;
};

/**
 * The joints with these units when the crew changes nothing: the document's own, but that stepping stones
 * are laid by their pitch, so that their gaps take what the stones have grown.
 */
export function keptJoints(document: LayoutDocument, units: readonly ActualUnit[]): Joints {
  const { bond } = document;
  if (bond.kind === 'stepping') {
    const { length, width } = sizeOf(units, bond.unit);
    return { along: bond.pitch[0] - length, across: bond.pitch[1] - width };
  }
  const { joint } = bondPattern(document);
  return { along: joint, across: joint };
}

/** Module of a bond of two-to-one units: wide enough for their width, and half their length, with the joint. */
export const interlockedModule = (length: number, width: number, joint: number): number =>
  Math.max(width + joint, (length + joint) / 2);

/** The narrower of the two joints that such a module leaves. */
export const interlockedJoint = (length: number, width: number, module: number): number =>
  Math.min(module - width, 2 * module - length);

/**
 * The document with its units as they are and these joints, its addresses and its origin kept. Written with the bond's own
 * kind where that can be, else as a bond of one's own with the same units at the same addresses.
 */
export function actualDocument(
  document: LayoutDocument,
  actual: readonly ActualUnit[],
  { along, across }: Joints,
): LayoutDocument {
  const units = document.units.map((unit) => {
    const found = actual.find((each) => each.unit === unit.id);
    return found ? { ...unit, length: found.length, width: found.width } : unit;
  });
  const { bond } = document;
  const base = { ...document, units };
  const pattern = bondPattern(document);
  switch (bond.kind) {
    case 'custom':
      return base;
    case 'stepping': {
      const { length, width } = sizeOf(actual, bond.unit);
      return { ...base, bond: { ...bond, pitch: [length + along, width + across] } };
    }
    case 'pinwheel':
      return { ...base, bond: { ...bond, joint: across } };
    case 'basket':
    case 'herringbone': {
      const { length, width } = sizeOf(actual, bond.unit);
      if (Math.abs(length - 2 * width - across) <= EXACT_MM)
        return { ...base, bond: { ...bond, joint: across } };
      // Steps of the bond's table with the module that these units need, for module 1.
      const planned = documentUnit(document, bond.unit).width + bond.joint;
      const scale = interlockedModule(length, width, across) / planned;
      return { ...base, bond: customBond(pattern, scale, scale, across) };
    }
    default: {
      if (Math.abs(along - across) <= EXACT_MM)
        return { ...base, bond: { ...bond, joint: across } };
      const { length, width } = sizeOf(actual, bond.unit);
      const planned = documentUnit(document, bond.unit);
      const p = (length + along) / (planned.length + bond.joint);
      const q = (width + across) / (planned.width + bond.joint);
      return { ...base, bond: customBond(pattern, p, q, Math.min(along, across)) };
    }
  }
}

/** A pattern as a bond of one's own, stretched along x and y. */
function customBond(
  { a, b, motif }: ReturnType<typeof bondPattern>,
  x: number,
  y: number,
  joint: number,
): Bond {
  return {
    kind: 'custom',
    a: [a[0] * x, a[1] * y],
    b: [b[0] * x, b[1] * y],
    motif: motif.map((entry) => ({ ...entry, at: [entry.at[0] * x, entry.at[1] * y] })),
    joint: Math.max(0, joint),
  };
}

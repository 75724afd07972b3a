import type { Lattice } from '@/geometry/lattice';
import type { Point } from '@/geometry/point';
import type { LayoutDocument, MotifEntry, Unit } from './layout-document';

/** A bond worked out: its lattice and its motif in the pattern's own frame, mm and degrees. */
export interface BondPattern extends Lattice {
  readonly motif: readonly MotifEntry[];
  /** The joint that edge gaps reckon with, mm. */
  readonly joint: number;
}

/** The unit with that id; throws when the document has none, which validation has ruled out. */
export function documentUnit(document: LayoutDocument, id: string): Unit {
  const unit = document.units.find((candidate) => candidate.id === id);
  if (!unit) throw new Error(`no unit "${id}" in the document`);
  return unit;
}

/** Lattice and motif of the document's bond, by the table of bonds in the layout document. */
export function bondPattern(document: LayoutDocument): BondPattern {
  const { bond } = document;
  if (bond.kind === 'custom') {
    return { a: bond.a, b: bond.b, motif: bond.motif, joint: bond.joint ?? 0 };
  }
  const { length, width } = documentUnit(document, bond.unit);
  const one = (at: Point, turn = 0, unit = bond.unit): MotifEntry => ({
    unit,
    at: [at[0], at[1]],
    turn,
  });
  if (bond.kind === 'stepping') {
    const [px, py] = bond.pitch;
    return {
      a: [px, 0],
      b: [bond.shift * px, py],
      motif: [one([0, 0])],
      joint: Math.max(0, px - length, py - width),
    };
  }
  const { joint } = bond;
  const p = length + joint;
  const q = width + joint;
  switch (bond.kind) {
    case 'stack':
      return { a: [p, 0], b: [0, q], motif: [one([0, 0])], joint };
    case 'running':
      return { a: [p, 0], b: [bond.shift * p, q], motif: [one([0, 0])], joint };
    case 'chequer':
      return { a: [2 * p, 0], b: [p, q], motif: [one([0, 0])], joint };
    case 'basket':
      return {
        a: [2 * p, 0],
        b: [p, p],
        motif: [
          one([0, q / 2]),
          one([0, -q / 2]),
          one([p + q / 2, 0], 90),
          one([p - q / 2, 0], 90),
        ],
        joint,
      };
    case 'herringbone':
      return {
        a: [4 * q, 0],
        b: [-q, q],
        motif: [one([q / 2, 0]), one([2 * q, q / 2], 90)],
        joint,
      };
    case 'pinwheel': {
      const s = documentUnit(document, bond.small).length + joint;
      return {
        a: [p, s],
        b: [-s, p],
        motif: [one([0, 0]), one([(p + s) / 2, (s - p) / 2], 0, bond.small)],
        joint,
      };
    }
  }
}

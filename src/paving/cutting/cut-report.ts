import type { Address } from '../layout-document';
import type { Laying } from '../laying';
import { unitTone } from '../tones';
import { cutPieces, type CutPiece, type CutPieces } from './cut-pieces';
import { nesting } from './nesting';
import { unitMiddle } from './piece-edges';
import { pieceShape, type PieceShape } from './piece-shape';
import { sawWay } from './saw-way';

/** What the saw takes away, mm: a wet-cutting diamond blade's usual cut (common practice). */
export const SAW_KERF_MM = 3;

/** A piece in a report, with the whole unit that it is sawn from: pieces of one number come from one unit. */
export interface ReportedPiece extends CutPiece {
  readonly sawnFrom: number;
}

/** What cutting at the edge comes to, but for the pieces themselves. Areas in m², lengths in mm, nothing rounded. */
export interface CutFigures {
  /** How many pieces. */
  readonly count: number;
  /** Pieces smaller than a third of their unit. */
  readonly underThird: number;
  /** Pieces narrower than `NARROW_PIECE_MM`, 10 mm. */
  readonly narrow: number;
  /** Pieces cut into a corner or hollowed. */
  readonly notched: number;
  /** Of all pieces. */
  readonly area: number;
  /** Ground less whole units and pieces: what aggregate takes. */
  readonly fillArea: number;
  /** Whole units that the pieces are sawn from. */
  readonly wholeUnits: number;
  /** The same by unit id: every unit that the bond uses. */
  readonly byUnit: Readonly<Record<string, number>>;
  /** Those of them that are of the second tone; a piece is sawn from a unit of its own tone. */
  readonly bySecondTone: Readonly<Record<string, number>>;
  /** However the pieces are nested, they take no fewer whole units. */
  readonly leastUnits: number;
  /** Of the units sawn, what no piece takes. */
  readonly waste: number;
  /** The way that the saw goes by the nesting, right through what is left of each unit: see `saw-way`. */
  readonly sawLength: number;
  /** Straight or curved cuts of that way; one that makes a side of two pieces is one. */
  readonly cuts: number;
  /** What the saw takes away, mm. */
  readonly kerf: number;
  /** Units left out that could not be worked out; aggregate takes their place. */
  readonly failed: readonly Address[];
}

/** What cutting comes to, piece by piece. */
export interface CutReport extends CutFigures {
  readonly pieces: readonly ReportedPiece[];
}

const MM2_PER_M2 = 1e6;

interface Kind {
  readonly unit: string;
  readonly tone: 0 | 1;
  readonly pieces: number[];
}

/** Pieces by what they are sawn from: units of one id and one tone. */
function kinds({ document, motif }: Laying, pieces: readonly CutPiece[]): Kind[] {
  const found = new Map<string, Kind>();
  pieces.forEach(({ unit: [i, j, k] }, n) => {
    const { unit } = motif[k];
    const tone = unitTone(document, i, j, k);
    const key = `${tone} ${unit.id}`;
    const kind = found.get(key) ?? { unit: unit.id, tone, pieces: [] };
    if (kind.pieces.length === 0) found.set(key, kind);
    kind.pieces.push(n);
  });
  return [...found.values()];
}

/**
 * What it takes to cut a floor at its edge, whatever its document says of cutting. `made` may be handed
 * in when the pieces are worked out already; `kerf` is what the saw takes away, mm.
 */
export function cutReport(
  laying: Laying,
  made: CutPieces = cutPieces(laying),
  kerf: number = SAW_KERF_MM,
): CutReport {
  const { ground, laid, motif } = laying;
  const { pieces, failed } = made;
  const byUnit = new Map(motif.map(({ unit }) => [unit.id, 0]));
  const bySecondTone = new Map<string, number>();
  const sawnFrom = new Int32Array(pieces.length);
  let wholeUnits = 0;
  let leastUnits = 0;
  let sawn = 0;
  let sawLength = 0;
  let cuts = 0;
  for (const kind of kinds(laying, pieces)) {
    const shapes = kind.pieces.map((n): PieceShape => {
      const piece = pieces[n];
      const entry = motif[piece.unit[2]];
      return pieceShape(entry, unitMiddle(laying, piece.unit), piece);
    });
    const nested = nesting(shapes, kerf);
    nested.units.forEach((unit, n) => {
      for (const piece of unit.pieces) sawnFrom[kind.pieces[piece]] = wholeUnits + n;
      const way = sawWay(
        unit.pieces.map((piece) => shapes[piece]),
        unit.places,
        kerf,
      );
      sawLength += way.length;
      cuts += way.cuts;
    });
    wholeUnits += nested.units.length;
    leastUnits += nested.leastUnits;
    byUnit.set(kind.unit, byUnit.get(kind.unit)! + nested.units.length);
    if (kind.tone === 1) bySecondTone.set(kind.unit, nested.units.length);
    sawn += nested.units.length * 4 * shapes[0].half[0] * shapes[0].half[1];
  }
  const area = pieces.reduce((sum, piece) => sum + piece.area, 0);
  let covered = 0;
  for (let n = 0; n < laid.count; n++) {
    const { unit } = motif[laid.k[n]];
    covered += unit.length * unit.width;
  }
  return {
    count: pieces.length,
    underThird: pieces.filter((piece) => piece.underThird).length,
    narrow: pieces.filter(({ narrow }) => narrow).length,
    notched: pieces.filter((piece) => piece.notched).length,
    area,
    fillArea: (ground.area - covered) / MM2_PER_M2 - area,
    wholeUnits,
    byUnit: Object.fromEntries(byUnit),
    bySecondTone: Object.fromEntries(bySecondTone),
    leastUnits,
    waste: sawn / MM2_PER_M2 - area,
    sawLength,
    cuts,
    kerf,
    failed,
    pieces: pieces.map((piece, n) => ({ ...piece, sawnFrom: sawnFrom[n] })),
  };
}

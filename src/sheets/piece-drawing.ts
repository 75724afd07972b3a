import type { Point } from '@/geometry/point';
import type { CutPiece } from '@/paving/cutting/cut-pieces';
import { pieceMiddle, sawnRuns } from '@/paving/cutting/piece-edges';
import type { Laying } from '@/paving/laying';
import { unitTone } from '@/paving/tones';
import type { DrawCommand, PaperBox, PaperPoint, PathRing, Stroke } from './drawing';
import { PENS, boxRing } from './drawing';
import { INK, PAPER, inkMix } from './inks';
import type { PlanView } from './plan-view';
import { paperFromGround } from './plan-view';
import { firstTone } from './unit-drawing';

/** How pieces cut at the edge are drawn; lengths in paper mm. */
export interface PieceStyle {
  readonly stroke: Stroke;
  /** The sawn edges; dashed on a plan. */
  readonly sawn: Stroke;
  /** Without it pieces are plain, as on a picture too small for it. */
  readonly hatch?: { readonly spacing: number; readonly stroke: Stroke };
  /** A dot in pieces under a third of a unit, a cross in those too narrow to lay. */
  readonly marks?: boolean;
}

/** Pieces on a plan: hatched, the sawn edges dashed. */
export const PLAN_PIECES: PieceStyle = {
  stroke: { width: PENS.fine, colour: inkMix(PAPER, INK, 0.75) },
  sawn: { width: PENS.thin, colour: INK, dash: [1.2, 0.8] },
  hatch: { spacing: 1.3, stroke: { width: PENS.fine, colour: inkMix(PAPER, INK, 0.45) } },
  marks: true,
};

/** Half the arm of the cross in a piece too narrow to lay, and the dot in one under a third of a unit, paper mm. */
const CROSS = 0.9;
const DOT = 0.45;
/** A piece narrower than this on the paper, mm, has no dot. */
const DOT_FROM = 1.6;

/** The pieces of a floor cut at its edge: filled, hatched, sawn edges dashed, small ones marked, so that they tell in black and white. */
export function pieceCommands(
  laying: Laying,
  pieces: readonly CutPiece[],
  view: PlanView,
  { stroke, sawn, hatch, marks: marked = false }: PieceStyle,
): readonly DrawCommand[] {
  if (pieces.length === 0) return [];
  const { document, motif } = laying;
  const onPaper = (ring: readonly Point[]) => ring.map((point) => paperFromGround(view, point));
  const groups = new Map<string, PathRing[]>();
  const lines: PathRing[] = [];
  const cuts: PathRing[] = [];
  const marks: DrawCommand[] = [];
  for (const piece of pieces) {
    const [i, j, k] = piece.unit;
    const second = document.tones && unitTone(document, i, j, k) === 1;
    const fill = second ? document.tones!.second : firstTone(motif[k].unit);
    const rings = [piece.polygon, ...(piece.holes ?? [])].map(onPaper);
    const group = groups.get(fill) ?? [];
    if (group.length === 0) groups.set(fill, group);
    group.push(...rings.map((points) => ({ points, closed: true })));
    cuts.push(...sawnRuns(laying, piece).map((run) => ({ points: onPaper(run), closed: false })));
    if (hatch) lines.push(...hatchLines(rings, hatch.spacing));
    if (!marked) continue;
    const [x, y] = paperFromGround(view, pieceMiddle(piece));
    if (piece.narrow) {
      marks.push({
        kind: 'path',
        rings: [
          { points: [[x - CROSS, y - CROSS], [x + CROSS, y + CROSS]], closed: false }, // prettier-ignore
          { points: [[x - CROSS, y + CROSS], [x + CROSS, y - CROSS]], closed: false }, // prettier-ignore
        ],
        stroke: { ...sawn, dash: undefined },
      });
    } else if (piece.underThird && piece.width / view.scale >= DOT_FROM) {
      marks.push({ kind: 'circle', centre: [x, y], radius: DOT, fill: sawn.colour });
    }
  }
  return [
    ...[...groups].map(([fill, rings]): DrawCommand => ({ kind: 'path', rings, fill, stroke })),
    ...(hatch && lines.length > 0
      ? [{ kind: 'path', rings: lines, stroke: hatch.stroke } satisfies DrawCommand]
      : []),
    ...(cuts.length > 0 ? [{ kind: 'path', rings: cuts, stroke: sawn } satisfies DrawCommand] : []),
    ...marks,
  ];
}

/** Lines that rise to the right inside rings, by the even-odd rule, in step over the whole sheet. */
export function hatchLines(rings: readonly (readonly PaperPoint[])[], spacing: number): PathRing[] {
  const step = spacing * Math.SQRT2;
  const crossings = new Map<number, PaperPoint[]>();
  for (const ring of rings) {
    ring.forEach((a, n) => {
      const b = ring[(n + 1) % ring.length];
      const [from, to] = [a[0] + a[1], b[0] + b[1]];
      const [low, high] = from < to ? [from, to] : [to, from];
      for (let line = Math.ceil(low / step); line * step < high; line++) {
        const share = (line * step - from) / (to - from);
        const at: PaperPoint = [a[0] + share * (b[0] - a[0]), a[1] + share * (b[1] - a[1])];
        const known = crossings.get(line);
        if (known) known.push(at);
        else crossings.set(line, [at]);
      }
    });
  }
  return [...crossings.values()].flatMap((points) => {
    const order = points.sort((p, q) => p[0] - q[0]);
    const lines: PathRing[] = [];
    for (let n = 0; n + 1 < order.length; n += 2) {
      lines.push({ points: [order[n], order[n + 1]], closed: false });
    }
    return lines;
  });
}

/** A swatch of a piece for the key, its right edge sawn. */
export const pieceSample =
  (fill: string) =>
  (box: PaperBox): readonly DrawCommand[] => [
    { kind: 'path', rings: [boxRing(box)], fill, stroke: PLAN_PIECES.stroke },
    {
      kind: 'path',
      rings: hatchLines([boxRing(box).points], 1.3),
      stroke: PLAN_PIECES.hatch!.stroke,
    },
    {
      kind: 'line',
      from: [box.right, box.top],
      to: [box.right, box.bottom],
      stroke: PLAN_PIECES.sawn,
    },
  ];

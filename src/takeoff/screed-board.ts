import type { Point } from '@/geometry/point';
import { ringArea } from '@/geometry/ring';
import { groundRing } from '@/paving/ground';
import type { LayoutDocument } from '@/paving/layout-document';
import { documentLevels } from '@/paving/levels';
import { thickestUnit } from './earth-cells';
import { screedLimbs, type ScreedLimb } from './screed-limbs';

/** A part of the floor that is screeded in one way, and the board for it. Lengths in mm. */
export interface ScreedRun {
  /** On the ground, anticlockwise. */
  readonly outline: readonly Point[];
  /** The way that the board is pulled, degrees anticlockwise, [0, 180). */
  readonly pullDeg: number;
  /** From edge to edge, or to the rail at an open side, square to the pull, where it is widest. */
  readonly clearWidth: number;
  /** It is pulled in so many strips side by side, each as wide as `bayWidth`. */
  readonly passes: number;
  readonly bayWidth: number;
  /** Of the lower edge, which goes between what carries the ears. */
  readonly boardLength: number;
  /** From end to end of the ears. */
  readonly earsLength: number;
  /** Rails to set: between strips, and along sides where no edge carries the board. */
  readonly rails: number;
}

/**
 * The boards that draw the bedding off at its level. A board is pulled along the floor; its ears ride on the
 * edge's top or on rails, and its lower edge hangs below them by what the unit takes. Lengths in mm.
 *
 * A floor with inner corners, such as an L, is screeded limb by limb (`screed-limbs`), each along its own sides across its
 * narrowest width. Of the ways to part it that of the fewest passes is taken, then that of the fewest limbs, then that
 * whose largest limb is largest. What is said of one board is of the largest limb.
 */
export interface ScreedBoard extends ScreedRun {
  /** Every limb, the largest first; one for a floor without inner corners. */
  readonly limbs: readonly ScreedRun[];
  /** Lower edge below the ears. */
  readonly depth: number;
  /** `edge`: on the edge's top. `rails`: on rails set to the finish, since the finish is not level or lies too high. */
  readonly rides: 'edge' | 'rails';
  /** Rails to set for all limbs. */
  readonly rails: number;
}

/** A board is cut so much shorter than the clear width, so that it can be worked from side to side, mm; common practice. */
export const BOARD_SHORTER_MM = 300;
/** The longest board that two people pull, mm; common practice. */
const LONGEST_BOARD_MM = 3000;
/** Each ear rests on the edge or rail by so much, mm; common practice. */
const EAR_MM = 100;

/** Width of the outline square to a direction. */
function widthAcross(outline: readonly Point[], [ux, uy]: Point): number {
  const across = outline.map(([x, y]) => x * -uy + y * ux);
  return Math.max(...across) - Math.min(...across);
}

/** Of the directions of the floor's sides, the one across which it is narrowest. */
function narrowestPull(outline: readonly Point[]): {
  readonly along: Point;
  readonly width: number;
} {
  let best: { along: Point; width: number; length: number } | null = null;
  outline.forEach((from, n) => {
    const to = outline[(n + 1) % outline.length];
    const length = Math.hypot(to[0] - from[0], to[1] - from[1]);
    if (length === 0) return;
    const along: Point = [(to[0] - from[0]) / length, (to[1] - from[1]) / length];
    const width = widthAcross(outline, along);
    // Of equal widths that along the longest side: the board then rides on it.
    if (!best || width < best.width - 1 || (width < best.width + 1 && length > best.length))
      best = { along, width, length };
  });
  return best!;
}

/** An open side leans from the pull by less than this where a rail along it carries the board. */
const ALONG_PULL = Math.SQRT1_2;

function screedRun({ outline, open }: ScreedLimb, rides: ScreedBoard['rides']): ScreedRun {
  const { along, width } = narrowestPull(outline);
  const passes = Math.max(1, Math.ceil((width - BOARD_SHORTER_MM) / LONGEST_BOARD_MM));
  const bayWidth = width / passes;
  const degrees = (Math.atan2(along[1], along[0]) * 180) / Math.PI;
  const openAlong = open.filter(([[ax, ay], [bx, by]]) => {
    const length = Math.hypot(bx - ax, by - ay);
    return Math.abs((bx - ax) * along[0] + (by - ay) * along[1]) > ALONG_PULL * length;
  }).length;
  return {
    outline,
    pullDeg: (Math.round(degrees * 1e6) / 1e6 + 360) % 180,
    clearWidth: width,
    passes,
    bayWidth,
    // On a strip hardly wider than what a board is cut short by, half of it is left.
    boardLength: Math.max(bayWidth - BOARD_SHORTER_MM, bayWidth / 2),
    earsLength: bayWidth + 2 * EAR_MM,
    rails: passes - 1 + (rides === 'rails' ? 2 : openAlong),
  };
}

const sum = (values: readonly number[]): number => values.reduce((all, value) => all + value, 0);

/** The screed boards of a floor. */
export function screedBoard(document: LayoutDocument): ScreedBoard {
  const { outline } = groundRing(document.ground.perimeter, 0, null);
  const { finish, fall, proud } = documentLevels(document);
  const thickness = thickestUnit(document);
  const belowEdge = thickness - finish - proud;
  const rides = fall.kind === 'none' && belowEdge > 0 ? 'edge' : 'rails';
  const area = (run: ScreedRun) => ringArea(run.outline);
  const ways = screedLimbs(outline, BOARD_SHORTER_MM).map((limbs) =>
    limbs.map((limb) => screedRun(limb, rides)).sort((one, other) => area(other) - area(one)),
  );
  const passes = (way: readonly ScreedRun[]) => sum(way.map((run) => run.passes));
  const [limbs] = [...ways].sort(
    (one, other) =>
      passes(one) - passes(other) || one.length - other.length || area(other[0]) - area(one[0]),
  );
  return {
    ...limbs[0],
    limbs,
    depth: rides === 'edge' ? belowEdge : thickness - proud,
    rides,
    rails: sum(limbs.map((run) => run.rails)),
  };
}

import type { Laying } from '@/paving/laying';
import { ringInBox } from '@/geometry/box-clip';
import { ringArea } from '@/geometry/ring';
import type { PaperBox } from './drawing';
import { boxHeight, boxInset, boxWidth } from './drawing';
import type { Paper, PaperName } from './paper';
import { paperOf } from './paper';
import type { GroundBounds } from './plan-view';
import { PREFERRED_SCALES } from './scales';
import { footStrip } from './sheet-draft';

/** One sheet's part of a plan too large for one, and the parts that go on from it. */
export interface PlanPart {
  /** Letter of its row from the top, number of its column from the left: `B3`. */
  readonly name: string;
  /** What is its own, up to the match lines. */
  readonly ground: GroundBounds;
  readonly left: string | null;
  readonly right: string | null;
  readonly above: string | null;
  readonly below: string | null;
}

/** A large plan parted: one paper and one scale for all parts. */
export interface PlanParts {
  readonly paper: Paper;
  readonly scale: number;
  /** On the paper: what is shown, with what the neighbours repeat. */
  readonly window: PaperBox;
  /** What neighbours repeat beyond a match line, mm on the ground: whole units stand in it. */
  readonly overlap: number;
  readonly parts: readonly PlanPart[];
}

/** Sides of a unit on paper, mm, and how many sheets each is worth at most. */
const WORTH: readonly (readonly [side: number, sheets: number])[] = [
  [3, 16],
  [2, 60],
];
/** Round the window, for the words beside match lines, mm. */
const WORDS_ROOM = 6;
const MOST_LOOKED_AT = 600;
/** A part with less ground than this in it is left out, mm². */
const LEAST_GROUND_MM2 = 1;

/**
 * The parts that show the units of a floor readably, when the plan at `planScale` does not; null when it
 * does, or when no number of sheets that anybody would carry does.
 */
export function planParts(
  laying: Laying,
  bounds: GroundBounds,
  name: PaperName,
  planScale: number,
): PlanParts | null {
  const side = Math.min(...laying.motif.map(({ unit }) => Math.min(unit.length, unit.width)));
  if (side / planScale >= WORTH[0][0]) return null;
  for (const [readable, most] of WORTH) {
    const scale = [...PREFERRED_SCALES].reverse().find((one) => side / one >= readable);
    if (scale === undefined || scale >= planScale) continue;
    const made = partsAt(laying, bounds, name, scale);
    if (made && made.parts.length <= most) return made;
  }
  return null;
}

function partsAt(
  laying: Laying,
  { least, greatest }: GroundBounds,
  name: PaperName,
  scale: number,
): PlanParts | null {
  const paper = paperOf(name, 'landscape');
  const window = boxInset({ ...paper.frame, bottom: footStrip(paper).top }, WORDS_ROOM);
  const diagonal = Math.max(...laying.motif.map(({ unit }) => Math.hypot(unit.length, unit.width)));
  const overlap = Math.ceil((diagonal + laying.joint) / 10) * 10;
  const own = [boxWidth(window), boxHeight(window)].map((size) => size * scale - 2 * overlap);
  if (Math.min(...own) <= overlap) return null;
  const [columns, rows] = own.map((size, axis) =>
    Math.max(1, Math.ceil((greatest[axis] - least[axis]) / size)),
  );
  if (columns * rows > MOST_LOOKED_AT) return null;
  const start = [columns, rows].map(
    (count, axis) => (least[axis] + greatest[axis]) / 2 - (count * own[axis]) / 2,
  );
  const boundsOf = (column: number, row: number): GroundBounds => {
    const left = start[0] + column * own[0];
    const top = start[1] + (rows - row) * own[1];
    return { least: [left, top - own[1]], greatest: [left + own[0], top] };
  };
  const holds = (column: number, row: number): boolean => {
    if (column < 0 || row < 0 || column >= columns || row >= rows) return false;
    return groundIn(laying, boundsOf(column, row)) > LEAST_GROUND_MM2;
  };
  const called = (column: number, row: number): string | null =>
    holds(column, row) ? `${rowLetter(row)}${column + 1}` : null;
  const places = Array.from({ length: rows }, (_, row) =>
    Array.from({ length: columns }, (__, column) => [column, row] as const),
  ).flat();
  const parts = places.flatMap(([column, row]): PlanPart[] => {
    const own = called(column, row);
    if (own === null) return [];
    return [
      {
        name: own,
        ground: boundsOf(column, row),
        left: called(column - 1, row),
        right: called(column + 1, row),
        above: called(column, row - 1),
        below: called(column, row + 1),
      },
    ];
  });
  return { paper, scale, window, overlap, parts };
}

/** A … Z, then AA, AB …. */
const rowLetter = (row: number): string =>
  (row >= 26 ? rowLetter(Math.floor(row / 26) - 1) : '') + String.fromCharCode(65 + (row % 26));

/** Ground within bounds, mm². */
function groundIn({ ground }: Laying, { least, greatest }: GroundBounds): number {
  return ground.rings.reduce((sum, { outline }, n) => {
    const area = Math.abs(ringArea(ringInBox(outline, { min: least, max: greatest })));
    return sum + (n === 0 ? area : -area);
  }, 0);
}

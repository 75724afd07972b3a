import type { Point } from '@/geometry/point';
import type { Laying } from '@/paving/laying';
import { setOut, type SetOut } from '@/paving/set-out/set-out';
import { runningOffsets } from '@/paving/set-out/tape-cross';

/** Where the first unit goes, measured from the first datum: the same unit on every sheet. */
export interface StartPoint {
  /** Index into the laid units. */
  readonly unit: number;
  /** The corner of that unit nearest to the first datum. */
  readonly corner: Point;
  /** The two datums, as corners are named on the drawings. */
  readonly from: string;
  readonly to: string;
  /** From the first datum towards the second, mm; negative beyond the first. */
  readonly along: number;
  /** Square to the line between them, mm; positive to its left. */
  readonly square: number;
  /** Turn of the courses from that line, degrees anticlockwise, more than −90 and at most 90: a course runs both ways. */
  readonly turnDeg: number;
}

/** Null when no unit is laid. */
export function startPoint(laying: Laying, plan: SetOut = setOut(laying)): StartPoint | null {
  const { firstUnit: first, datums } = plan;
  if (!first) return null;
  const [from, to] = datums;
  const corner = first.corners[first.nearest];
  const [along, square] = runningOffsets(from.at, to.at, corner);
  const { unit, turnDeg } = first;
  return { unit, corner, from: from.name, to: to.name, along, square, turnDeg };
}

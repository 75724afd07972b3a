import { ringInBox, type Box } from '@/geometry/box-clip';
import type { Point } from '@/geometry/point';
import type { Ground } from '../ground';

/** What of the ground lies in a box round one unit: rings as `ringInBox` leaves them. */
export interface GroundWindow {
  readonly box: Box;
  readonly perimeter: readonly Point[];
  readonly keepOuts: readonly (readonly Point[])[];
}

/** Corners that a window may have before it is worth halving the units once more. */
const FEW_CORNERS = 12;

function boxOf(boxes: readonly Box[], items: readonly number[]): Box {
  let [x0, y0, x1, y1] = [Infinity, Infinity, -Infinity, -Infinity];
  for (const item of items) {
    const { min, max } = boxes[item];
    x0 = Math.min(x0, min[0]);
    y0 = Math.min(y0, min[1]);
    x1 = Math.max(x1, max[0]);
    y1 = Math.max(y1, max[1]);
  }
  return { min: [x0, y0], max: [x1, y1] };
}

const seenThrough = (box: Box, { perimeter, keepOuts }: GroundWindow): GroundWindow => ({
  box,
  perimeter: ringInBox(perimeter, box),
  keepOuts: keepOuts.map((ring) => ringInBox(ring, box)).filter((ring) => ring.length > 0),
});

/**
 * Shows each box its part of the ground. Boxes are halved again and again, the ground with them, so
 * that no box is held against chords far from it: work grows with boxes and chords, not their product.
 */
export function eachGroundWindow(
  ground: Ground,
  boxes: readonly Box[],
  visit: (item: number, window: GroundWindow) => void,
): void {
  const split = (items: number[], around: GroundWindow) => {
    if (items.length === 0) return;
    const box = boxOf(boxes, items);
    const seen = seenThrough(box, around);
    const corners = seen.keepOuts.reduce((sum, ring) => sum + ring.length, seen.perimeter.length);
    if (items.length === 1 || corners <= FEW_CORNERS) {
      for (const item of items) visit(item, seenThrough(boxes[item], seen));
      return;
    }
    const axis = box.max[0] - box.min[0] > box.max[1] - box.min[1] ? 0 : 1;
    const middle = (item: number) => boxes[item].min[axis] + boxes[item].max[axis];
    items.sort((one, other) => middle(one) - middle(other));
    const half = items.length >> 1;
    split(items.slice(0, half), seen);
    split(items.slice(half), seen);
  };
  const [perimeter, ...keepOuts] = ground.rings.map(({ outline }) => outline);
  split(
    boxes.map((_, item) => item),
    { box: ground.box, perimeter, keepOuts },
  );
}

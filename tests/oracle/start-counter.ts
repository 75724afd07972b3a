import type { Point } from '@/geometry/point';
import type { LayoutDocument } from '@/paving/layout-document';
import { unitCount } from '@/paving/fit/count';
import { cellPoint, fitFrame, frameFromGround } from '@/paving/fit/fit-frame';

/**
 * Makes a function that counts the whole units with the pattern starting at a point of the ground,
 * mm, at a valid document's turn and without laying them.
 */
export function startCounter(document: LayoutDocument): (origin: Point) => number {
  const frame = fitFrame(document);
  return (origin) => unitCount(frame, ...cellPoint(frame, frameFromGround(frame, origin)));
}

import type { Point } from '@/geometry/point';
import type { LayoutDocument } from '../layout-document';
import { frameMost } from './cell-fit';
import { cellFace } from './face';
import { fitFrame } from './fit-frame';

/** The most whole units of any start, and the starts about one that has them. */
export interface BestFace {
  readonly most: number;
  /**
   * Outline of those starts, anticlockwise, in the rectangle of the shift map, mm, arcs as chords; it may
   * run out of the rectangle by a lattice step. Null where no unit can be laid or the starts make an endless band.
   */
  readonly outline: readonly Point[] | null;
}

/** The face of the shift map where most units are whole, to its true edge however thin it is. */
export function bestFace(document: LayoutDocument): BestFace {
  const frame = fitFrame(document);
  const { pieces, most } = frameMost(frame);
  return {
    most: most.count,
    outline: most.count > 0 ? cellFace(pieces, frame, most.u, most.v) : null,
  };
}

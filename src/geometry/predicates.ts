import { orient2d } from 'robust-predicates';
import type { Point } from './point';

/**
 * Which way a → b → c turns, decided exactly: positive for a left turn (anticlockwise, y up),
 * negative for a right turn, 0 when the three are in one line. The size is about twice the
 * triangle's area. The library under it takes y to grow down, hence the sign here; this is the
 * only place that knows.
 */
export function orientation(a: Point, b: Point, c: Point): number {
  return -orient2d(a[0], a[1], b[0], b[1], c[0], c[1]);
}

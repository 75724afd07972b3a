import type { Point } from './point';

/** Cosine and sine of an angle in degrees; exact at whole right angles, so that squares stay square. */
export function rotation(turnDeg: number): Point {
  const turn = ((turnDeg % 360) + 360) % 360;
  if (turn === 0) return [1, 0];
  if (turn === 90) return [0, 1];
  if (turn === 180) return [-1, 0];
  if (turn === 270) return [0, -1];
  const radians = (turn * Math.PI) / 180;
  return [Math.cos(radians), Math.sin(radians)];
}

/** `point` turned about the origin by the angle whose cosine and sine are `turn`. */
export function pointTurned([x, y]: Point, [cos, sin]: Point): Point {
  return [x * cos - y * sin, x * sin + y * cos];
}

import type { Point } from './point';
import { ARC_SAGITTA_MM } from './tolerance';

/** Arcs whose middle lies within this of their chord, mm, are straight edges. */
const STRAIGHT_SAGITTA_MM = 1e-6;
/** However small its radius, an arc takes at least eight chords to the full turn. */
const GREATEST_STEP_RAD = Math.PI / 4;

/** Which side of the chords the arc must keep to: `inscribed` chords join points of the arc, `tangent` ones touch it from outside. */
export type ArcChords = 'inscribed' | 'tangent';

interface ArcMeasure {
  readonly sweep: number;
  readonly chord: number;
  readonly radius: number;
}

function arcMeasure(start: Point, end: Point, bulge: number): ArcMeasure {
  const chord = Math.hypot(end[0] - start[0], end[1] - start[1]);
  const sweep = 4 * Math.atan(bulge);
  return { sweep, chord, radius: chord / (2 * Math.abs(Math.sin(sweep / 2))) };
}

/** True when the edge from `start` to `end` is drawn as one straight chord. */
export function arcIsStraight(start: Point, end: Point, bulge: number): boolean {
  const sagitta = (Math.abs(bulge) * Math.hypot(end[0] - start[0], end[1] - start[1])) / 2;
  return !(sagitta > STRAIGHT_SAGITTA_MM);
}

/** Length along the edge from `start` to `end`, mm; bulge = tan(sweep / 4), 0 for a straight edge. */
export function arcLength(start: Point, end: Point, bulge: number): number {
  const { sweep, chord, radius } = arcMeasure(start, end, bulge);
  return arcIsStraight(start, end, bulge) ? chord : radius * Math.abs(sweep);
}

/** Signed area between the arc and its chord, mm²: positive when the arc runs anticlockwise. */
export function arcSegmentArea(start: Point, end: Point, bulge: number): number {
  if (arcIsStraight(start, end, bulge)) return 0;
  const { sweep, radius } = arcMeasure(start, end, bulge);
  return (radius * radius * (sweep - Math.sin(sweep))) / 2;
}

/** How many equal steps of sweep keep the chords within the sagitta. */
export function arcSteps(start: Point, end: Point, bulge: number, chords: ArcChords): number {
  if (arcIsStraight(start, end, bulge)) return 1;
  const { sweep, radius } = arcMeasure(start, end, bulge);
  const cosine =
    chords === 'inscribed' ? 1 - ARC_SAGITTA_MM / radius : radius / (radius + ARC_SAGITTA_MM);
  const step = Math.min(2 * Math.acos(Math.max(cosine, -1)), GREATEST_STEP_RAD);
  return Math.max(1, Math.ceil(Math.abs(sweep) / step - 1e-9));
}

/**
 * The edge from `start` to `end` as a chain of points, both ends kept exactly. Inscribed chords
 * have their points on the arc; tangent chords touch it in their middles (and at both ends), so
 * that the whole arc lies on the inner side of the chain. They part by at most `ARC_SAGITTA_MM`.
 */
export function arcPoints(start: Point, end: Point, bulge: number, chords: ArcChords): Point[] {
  if (arcIsStraight(start, end, bulge)) return [start, end];
  const { sweep, chord, radius } = arcMeasure(start, end, bulge);
  const steps = arcSteps(start, end, bulge, chords);
  const heading = Math.atan2(end[1] - start[1], end[0] - start[0]) - sweep / 2;
  const step = sweep / steps;
  const scale = chord / Math.sin(sweep / 2);
  const at = (swept: number): Point => {
    const reach = scale * Math.sin(swept / 2);
    const along = heading + swept / 2;
    return [start[0] + reach * Math.cos(along), start[1] + reach * Math.sin(along)];
  };
  const points: Point[] = [start];
  if (chords === 'inscribed') {
    for (let n = 1; n < steps; n++) points.push(at(n * step));
  } else {
    const overshoot = radius * Math.tan(Math.abs(step) / 2);
    for (let n = 0; n < steps; n++) {
      const [x, y] = at(n * step);
      const along = heading + n * step;
      points.push([x + overshoot * Math.cos(along), y + overshoot * Math.sin(along)]);
    }
  }
  points.push(end);
  return points;
}

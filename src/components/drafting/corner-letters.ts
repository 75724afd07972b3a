import type { Point } from '@/geometry/point';
import { cornerName } from '@/paving/edge-names';
import { vertexPoint } from '@/paving/ground-edits';
import { dot, FONT, screen, type Ink } from './overlay-ink';

/** Many corners nearer to one another than this are not lettered, px. */
const CROWDED_PX = 26;
const CROWDED_CORNERS = 12;

/** Where the letters of the perimeter's corners stand on the screen: outside it, also where it is re-entrant. */
export function letterPlaces(ink: Ink): readonly Point[] {
  const ring = ink.document.ground.perimeter;
  const unit = (from: Point, to: Point): Point => {
    const length = Math.hypot(to[0] - from[0], to[1] - from[1]) || 1;
    return [(to[0] - from[0]) / length, (to[1] - from[1]) / length];
  };
  const at = ring.map((vertex) => screen(ink, vertexPoint(vertex)));
  const crowded = at.some((p, n) => {
    const next = at[(n + 1) % at.length];
    return Math.hypot(p[0] - next[0], p[1] - next[1]) < CROWDED_PX;
  });
  if (ring.length > CROWDED_CORNERS && crowded) return [];
  return at.map((p, n) => {
    const u = unit(at[(n + at.length - 1) % at.length], p);
    const v = unit(p, at[(n + 1) % at.length]);
    // The sum of the two outward normals points out of the corner.
    const out: Point = [-u[1] - v[1], u[0] + v[0]];
    const length = Math.hypot(...out) || 1;
    return [p[0] + (out[0] / length) * 16, p[1] + (out[1] / length) * 16];
  });
}

export function paintLetters(ink: Ink) {
  const { ctx, colours } = ink;
  letterPlaces(ink).forEach((centre, n) => {
    dot(ctx, centre, 8.5, colours.stone50);
    ctx.strokeStyle = colours.graphite;
    ctx.lineWidth = 1;
    ctx.stroke();
    ctx.fillStyle = colours.graphite;
    ctx.font = `600 10.5px ${FONT}`;
    ctx.textAlign = 'center';
    ctx.textBaseline = 'middle';
    ctx.fillText(cornerName(0, n), centre[0], centre[1] + 0.5);
  });
}

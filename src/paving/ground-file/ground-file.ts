import { pointsBox } from '@/geometry/convex-part';
import type { Point } from '@/geometry/point';
import { ringHolds } from '@/geometry/ring';
import { roundedMm } from '../cell-list';
import { groundRing } from '../ground';
import { vertexBulge, vertexOf, vertexPoint } from '../ground-edits';
import type { KeepOut, LayoutDocument, Vertex } from '../layout-document';
import { ringAnticlockwise, vertexRingArea } from '../ring-validation';
import { dxfFile } from './dxf-file';
import { geojsonFile } from './geojson-file';
import type { GroundFile, GroundFileOptions, Outline } from './outline';
import { pointsFile } from './points-file';

/** What kind of file it is, by its name or else by how it begins. */
export function groundFileKind(name: string, text: string): 'dxf' | 'geojson' | 'points' {
  const ending = name.toLowerCase().split('.').pop() ?? '';
  if (ending === 'dxf') return 'dxf';
  if (ending === 'geojson' || ending === 'json') return 'geojson';
  if (/^\s*(999[\s\S]{0,200}?)?0\r?\n\s*SECTION/.test(text)) return 'dxf';
  return /^\s*[{[]/.test(text) ? 'geojson' : 'points';
}

/** Corners nearer than this are one, mm: drawings close rings on a corner of their own. */
const SAME_MM = 0.5;

/** An outline without corners that lie on the next one. */
function outlineTidied({ name, ring }: Outline): Outline {
  const kept = ring.filter(([x, y], n) => {
    const [nextX, nextY] = ring[(n + 1) % ring.length];
    return Math.hypot(nextX - x, nextY - y) >= SAME_MM;
  });
  return { name, ring: kept };
}

const holdsGround = ({ ring }: Outline): boolean =>
  ring.length >= 3 || (ring.length === 2 && ring.some(([, , bulge]) => bulge));

/** The outlines of a file, largest first. */
export function groundFile(name: string, text: string, options: GroundFileOptions): GroundFile {
  const kind = groundFileKind(name, text);
  const found =
    kind === 'dxf'
      ? dxfFile(text, options)
      : kind === 'geojson'
        ? geojsonFile(text)
        : pointsFile(text, options);
  if (!found.ok) return found;
  const size = ({ ring }: Outline) => Math.abs(vertexRingArea(ring));
  const outlines = found.outlines
    .map(outlineTidied)
    .filter(holdsGround)
    .sort((one, other) => size(other) - size(one));
  if (outlines.length === 0)
    return {
      ok: false,
      messages: [
        'Every outline in this file shrinks to a point or a line. The unit may be wrong: a bare number may be in metres or feet.',
      ],
    };
  return { ...found, outlines };
}

/** The points of an outline, arcs flattened, mm. */
export const outlineChords = ({ ring }: Outline): readonly Point[] =>
  groundRing(ringAnticlockwise(ring), 0, null).outline;

/** Outlines that lie in another: what may be its keep-outs. */
export const outlinesWithin = (outlines: readonly Outline[], edge: Outline): readonly Outline[] => {
  const within = outlineChords(edge);
  return outlines.filter(
    (outline) =>
      outline !== edge && outlineChords(outline).every((point) => ringHolds(within, point)),
  );
};

/** A ground of an outline and its keep-outs, moved so that it begins at nought across and up. */
export function outlineGround(
  edge: Outline,
  keepOuts: readonly Outline[],
): LayoutDocument['ground'] {
  const [left, low] = pointsBox(edge.ring.map(vertexPoint)).min;
  const moved = (ring: readonly Vertex[]): Vertex[] =>
    ringAnticlockwise(
      ring.map((vertex) =>
        vertexOf([roundedMm(vertex[0] - left), roundedMm(vertex[1] - low)], vertexBulge(vertex)),
      ),
    );
  return {
    perimeter: moved(edge.ring),
    keepOuts: keepOuts.map(({ name, ring }, n): KeepOut => ({
      name: name.trim().slice(0, 80) || `Keep-out ${n + 1}`,
      ring: moved(ring),
    })),
  };
}

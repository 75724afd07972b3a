import DxfParser from 'dxf-parser';
import { MM_PER_BARE, roundedMm } from '../cell-list';
import { formatCount } from '../count';
import { vertexOf } from '../ground-edits';
import type { Vertex } from '../layout-document';
import { MM_PER_FOOT, MM_PER_INCH } from '../length';
import { chained, endsMeet, type Strand } from './chained';
import type { GroundFile, GroundFileOptions, Outline } from './outline';

/**
 * Outlines in a DXF drawing: closed polylines with their bulges, circles, and lines, arcs and open
 * polylines of one layer that meet end to end. Group codes and $INSUNITS as in the published DXF reference.
 */

/** $INSUNITS that grounds are drawn in: what one is, mm. */
const UNITS: Readonly<Record<number, readonly [string, number]>> = {
  1: ['inches', MM_PER_INCH],
  2: ['feet', MM_PER_FOOT],
  4: ['millimetres', 1],
  5: ['centimetres', 10],
  6: ['metres', 1000],
  10: ['yards', 3 * MM_PER_FOOT],
  14: ['decimetres', 100],
};

interface DxfPoint {
  readonly x: number;
  readonly y: number;
  readonly bulge?: number;
}
interface DxfEntity {
  readonly type: string;
  readonly layer?: string;
  readonly vertices?: readonly DxfPoint[];
  readonly shape?: boolean;
  readonly center?: DxfPoint;
  readonly radius?: number;
  readonly startAngle?: number;
  readonly endAngle?: number;
  readonly extrusionDirectionZ?: number;
}

/** Kinds of entities that hold no edge: passed over without a word. */
const NO_EDGE = ['TEXT', 'MTEXT', 'DIMENSION', 'POINT', 'ATTDEF', 'VIEWPORT', 'HATCH'];

const drawnVertex = ({ x, y, bulge = 0 }: DxfPoint, scale: number): Vertex =>
  vertexOf([roundedMm(x * scale), roundedMm(y * scale)], bulge);

/** An arc as a strand of one edge; angles in radians, anticlockwise from start to end. */
function arcStrand(
  { center, radius = 0, startAngle = 0, endAngle = 0 }: DxfEntity,
  scale: number,
): Strand | null {
  const sweep = (endAngle - startAngle + 4 * Math.PI) % (2 * Math.PI);
  if (!center || radius <= 0 || sweep === 0) return null;
  const at = (angle: number): DxfPoint => ({
    x: center.x + radius * Math.cos(angle),
    y: center.y + radius * Math.sin(angle),
  });
  return [
    drawnVertex({ ...at(startAngle), bulge: Math.tan(sweep / 4) }, scale),
    drawnVertex(at(endAngle), scale),
  ];
}

/** A circle as two half arcs. */
function circleRing({ center, radius = 0 }: DxfEntity, scale: number): Vertex[] | null {
  if (!center || radius <= 0) return null;
  return [
    drawnVertex({ x: center.x - radius, y: center.y, bulge: 1 }, scale),
    drawnVertex({ x: center.x + radius, y: center.y, bulge: 1 }, scale),
  ];
}

export function dxfFile(text: string, { bare }: GroundFileOptions): GroundFile {
  const refused = (message: string): GroundFile => ({ ok: false, messages: [message] });
  if (text.startsWith('AutoCAD Binary DXF'))
    return refused('This is a binary DXF. Save the drawing as a DXF in text (ASCII).');
  let drawing;
  try {
    drawing = new DxfParser().parseSync(text);
  } catch {
    return refused('This DXF cannot be read. It may be cut off; save the drawing as a DXF again.');
  }
  const entities = (drawing?.entities ?? []) as readonly DxfEntity[];
  if (entities.length === 0) return refused('There is nothing drawn in this file.');
  const stated = UNITS[Number(drawing?.header?.$INSUNITS ?? 0)];
  const scale = stated?.[1] ?? MM_PER_BARE[bare];

  const outlines: Outline[] = [];
  const strands = new Map<string, Strand[]>();
  const strand = (layer: string, vertices: Strand) => {
    const own = strands.get(layer) ?? [];
    own.push(vertices);
    strands.set(layer, own);
  };
  let others = 0;
  for (const entity of entities) {
    const layer = entity.layer ?? '';
    const { type, vertices = [] } = entity;
    // Drawn in a mirrored plane: rare, and not to be guessed at.
    if ((entity.extrusionDirectionZ ?? 1) < 0) others++;
    else if (type === 'LWPOLYLINE' || type === 'POLYLINE') {
      const ring = vertices.map((vertex) => drawnVertex(vertex, scale));
      if (entity.shape && ring.length >= 2) outlines.push({ name: layer, ring });
      else if (ring.length >= 4 && endsMeet(ring[0], ring[ring.length - 1]))
        outlines.push({ name: layer, ring: ring.slice(0, -1) });
      else if (ring.length >= 2) strand(layer, ring);
    } else if (type === 'LINE' && vertices.length === 2) {
      strand(
        layer,
        vertices.map((vertex) => drawnVertex(vertex, scale)),
      );
    } else if (type === 'ARC') {
      const arc = arcStrand(entity, scale);
      if (arc) strand(layer, arc);
    } else if (type === 'CIRCLE') {
      const ring = circleRing(entity, scale);
      if (ring) outlines.push({ name: layer, ring });
    } else if (!NO_EDGE.includes(type)) others++;
  }
  let loose = 0;
  for (const [layer, own] of strands) {
    const { rings, left } = chained(own);
    outlines.push(...rings.map((ring) => ({ name: layer, ring })));
    loose += left;
  }
  if (outlines.length === 0)
    return refused(
      'No line in this drawing closes on itself. Draw the edge as one closed polyline, or join its ends, and save it again.',
    );
  return {
    ok: true,
    outlines,
    stated: stated?.[0] ?? null,
    notes: [
      ...(loose > 0
        ? [
            loose === 1
              ? 'One line does not close on itself and is left out.'
              : `${formatCount(loose)} lines do not close on themselves and are left out.`,
          ]
        : []),
      ...(others > 0
        ? [
            `${others === 1 ? 'One thing' : `${formatCount(others)} things`} in the drawing (blocks, curves of other kinds) cannot be read as an edge.`,
          ]
        : []),
    ],
  };
}

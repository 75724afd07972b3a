import proj4 from 'proj4';
import { z } from 'zod';
import { pointsBox } from '@/geometry/convex-part';
import type { Point } from '@/geometry/point';
import { formatCount } from '../count';
import type { Vertex } from '../layout-document';
import { roundedMm } from '../cell-list';
import type { GroundFile, Outline } from './outline';

/**
 * GeoJSON (RFC 7946): longitude and latitude on WGS 84, laid on the plane by a transverse Mercator about the
 * middle of what is there, at true scale: over a kilometre from it lengths are right to 0.01 mm in a metre. A
 * sphere would be out by up to 3 mm in a metre.
 */

const position = z.array(z.number()).min(2);
const geometrySchema = z.discriminatedUnion('type', [
  z.object({ type: z.literal('Polygon'), coordinates: z.array(z.array(position)) }),
  z.object({ type: z.literal('MultiPolygon'), coordinates: z.array(z.array(z.array(position))) }),
  z.object({ type: z.literal('LineString'), coordinates: z.array(position) }),
  z.object({ type: z.literal('MultiLineString'), coordinates: z.array(z.array(position)) }),
]);
const featureSchema = z.object({
  type: z.literal('Feature'),
  geometry: z.unknown(),
  properties: z.record(z.string(), z.unknown()).nullish(),
});

type Position = readonly number[];
interface Line {
  readonly name: string;
  readonly positions: readonly Position[];
}

/** Grounds are small: what is wider is no floor, degrees. */
const GREATEST_DEGREES = 0.5;

function linesOf(value: unknown, name = ''): Line[] {
  const feature = featureSchema.safeParse(value);
  if (feature.success) {
    const { properties, geometry } = feature.data;
    const own = properties?.name ?? properties?.Name ?? properties?.id ?? '';
    return linesOf(geometry, typeof own === 'string' ? own : String(own));
  }
  const many = z
    .object({ features: z.array(z.unknown()) })
    .or(z.object({ geometries: z.array(z.unknown()) }))
    .safeParse(value);
  if (many.success) {
    const members = 'features' in many.data ? many.data.features : many.data.geometries;
    return members.flatMap((member) => linesOf(member, name));
  }
  const geometry = geometrySchema.safeParse(value);
  if (!geometry.success) return [];
  const { type, coordinates } = geometry.data;
  const rings =
    type === 'MultiPolygon'
      ? coordinates.flat()
      : type === 'LineString'
        ? [coordinates]
        : coordinates;
  return rings.map((positions) => ({ name, positions }));
}

export function geojsonFile(text: string): GroundFile {
  const refused = (message: string): GroundFile => ({ ok: false, messages: [message] });
  let value: unknown;
  try {
    value = JSON.parse(text);
  } catch {
    return refused('This is not JSON that can be read. It may be cut off.');
  }
  const lines = linesOf(value);
  const closed = lines.filter(({ positions }) => {
    const [first, last] = [positions[0], positions[positions.length - 1]];
    return positions.length >= 4 && first[0] === last[0] && first[1] === last[1];
  });
  if (closed.length === 0)
    return refused(
      lines.length === 0
        ? 'There is no outline in this file. It needs a polygon, or a line that ends where it begins.'
        : 'No line in this file ends where it begins, so none is an edge.',
    );
  const all = closed.flatMap(({ positions }) => positions);
  const {
    min: [west, south],
    max: [east, north],
  } = pointsBox(all.map(([longitude, latitude]): Point => [longitude, latitude]));
  if (south < -90 || north > 90 || west < -180 || east > 180)
    return refused(
      'GeoJSON is in degrees of longitude and latitude, and these numbers are not. Export the drawing as DXF or as a list of points instead.',
    );
  if (east - west > GREATEST_DEGREES || north - south > GREATEST_DEGREES)
    return refused(
      'What this file shows is many kilometres wide. Keep the outline of the floor alone.',
    );
  const plane = proj4(
    `+proj=tmerc +lat_0=${(south + north) / 2} +lon_0=${(west + east) / 2} +k=1 +x_0=0 +y_0=0 +ellps=WGS84 +units=m`,
  );
  const outlines = closed.map(({ name, positions }): Outline => ({
    name,
    ring: positions.slice(0, -1).map(([longitude, latitude]): Vertex => {
      const [x, y] = plane.forward([longitude, latitude]);
      return [roundedMm(x * 1000), roundedMm(y * 1000)];
    }),
  }));
  const open = lines.length - closed.length;
  return {
    ok: true,
    outlines,
    stated: 'degrees of longitude and latitude',
    notes: [
      'North is up. A position read off a map or a phone may be metres out: check a side with a tape.',
      ...(open > 0
        ? [
            open === 1
              ? 'One line does not close on itself and is left out.'
              : `${formatCount(open)} lines do not close on themselves and are left out.`,
          ]
        : []),
    ],
  };
}

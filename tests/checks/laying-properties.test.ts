import fc from 'fast-check';
import GeometryFactory from 'jsts/org/locationtech/jts/geom/GeometryFactory.js';
import Coordinate from 'jsts/org/locationtech/jts/geom/Coordinate.js';
import SnapIfNeededOverlayOp from 'jsts/org/locationtech/jts/operation/overlay/snap/SnapIfNeededOverlayOp.js';
import { expect, test } from 'vitest';
import { layFloor, unitAt, unitCorners } from '@/paving/laying';
import type { LayoutDocument, Vertex } from '@/paving/layout-document';
import { floorReport, type Report } from '@/paving/report';
import type { Point } from '@/geometry/point';
import { rectangleOverlap } from '@/geometry/rectangle';
import { oracleGround } from '../oracle/brute-force';
import { fillRegion } from '../oracle/fill-region';
import { anyDocument, asCustom, parsed, real } from '../oracle/documents';

/** Units whose distance to a limit is under 1e-6 mm could fall either way after rounding. */
function nothingOnTheEdge(document: LayoutDocument): boolean {
  const count = (clearance: number) => {
    const laying = layFloor({ ...document, clearance });
    return `${laying.laid.count} ${laying.leftOut.count}`;
  };
  const here = count(document.clearance);
  const nearby = [document.clearance + 1e-6, Math.max(0, document.clearance - 1e-6)];
  return nearby.every((clearance) => count(clearance) === here);
}

function near(one: number | null, other: number | null, scale: number): void {
  if (one === null || other === null) expect(one).toBe(other);
  else expect(Math.abs(one - other)).toBeLessThanOrEqual(1e-6 * Math.max(scale, Math.abs(one)));
}

/** Counts the same, lengths and areas to 1e-6; edges in the order that `edgeOf` gives. */
function sameReport(one: Report, other: Report, edgeOf: (n: number) => number): void {
  expect(other.wholeUnits).toBe(one.wholeUnits);
  expect(other.byUnit).toEqual(one.byUnit);
  expect(other.leftOut).toBe(one.leftOut);
  expect(other.lifted).toBe(one.lifted);
  near(one.groundArea, other.groundArea, 1);
  near(one.coveredArea, other.coveredArea, 1);
  near(one.fillArea, other.fillArea, 1);
  near(one.leastGap, other.leastGap, 1);
  near(one.play, other.play, 1);
  expect(other.edges).toHaveLength(one.edges.length);
  one.edges.forEach((edge, n) => {
    const twin = other.edges[edgeOf(n)];
    expect(twin.ring).toBe(edge.ring);
    expect(twin.facing).toBe(edge.facing);
    near(edge.length, twin.length, 1);
    near(edge.least, twin.least, 1000);
    near(edge.greatest, twin.greatest, 1000);
    near(edge.mean, twin.mean, 1000);
  });
}

const reportOf = (document: LayoutDocument) => floorReport(layFloor(document));

/** Edges of all rings in the order of the document, with ring r's edges sent where `place` says. */
function edgeMap(document: LayoutDocument, place: (n: number, count: number) => number) {
  const rings = [document.ground.perimeter, ...document.ground.keepOuts.map(({ ring }) => ring)];
  const to: number[] = [];
  for (const ring of rings) {
    const base = to.length;
    ring.forEach((_, n) => to.push(base + place(n, ring.length)));
  }
  return (n: number) => to[n];
}

function withRings(
  document: LayoutDocument,
  change: (ring: readonly Vertex[]) => Vertex[],
): LayoutDocument {
  return {
    ...document,
    ground: {
      perimeter: change(document.ground.perimeter),
      keepOuts: document.ground.keepOuts.map((keepOut) => ({
        ...keepOut,
        ring: change(keepOut.ring),
      })),
    },
  };
}

const runs = { numRuns: 40 };

test('a floor moved and turned as a whole, even to 10 km away, has the same report', () => {
  const moves = fc.record({
    by: fc.tuple(real(-1e7, 1e7), real(-1e7, 1e7)),
    turn: real(-180, 180),
  });
  fc.assert(
    fc.property(anyDocument({ arcs: true }), moves, (document, { by, turn }) => {
      fc.pre(nothingOnTheEdge(document));
      const [cos, sin] = [Math.cos((turn * Math.PI) / 180), Math.sin((turn * Math.PI) / 180)];
      const move = ([x, y]: Point): [number, number] => [
        x * cos - y * sin + by[0],
        x * sin + y * cos + by[1],
      ];
      const moved = withRings(document, (ring) =>
        ring.map((vertex): Vertex => {
          const [x, y] = move([vertex[0], vertex[1]]);
          return vertex.length === 3 ? [x, y, vertex[2]] : [x, y];
        }),
      );
      const { origin, turn: own } = document.placement;
      const placement = { origin: move(origin), turn: own + turn };
      sameReport(reportOf(document), reportOf(parsed({ ...moved, placement })), (n) => n);
    }),
    runs,
  );
});

test('a floor seen in a mirror has the same report, its edges in reverse', () => {
  fc.assert(
    fc.property(anyDocument({ arcs: true }), (document) => {
      fc.pre(nothingOnTheEdge(document));
      const custom = asCustom(document);
      const flip = ([x, y]: Point): [number, number] => [x, -y];
      const mirrored = withRings(custom, (ring) =>
        ring.map((vertex): Vertex =>
          vertex.length === 3 ? [vertex[0], -vertex[1], -vertex[2]] : [vertex[0], -vertex[1]],
        ),
      );
      const { bond } = custom;
      if (bond.kind !== 'custom') throw new Error('the bond was to be written out');
      const twin = parsed({
        ...mirrored,
        bond: {
          ...bond,
          a: flip(bond.a),
          b: flip(bond.b),
          motif: bond.motif.map(({ unit, at, turn }) => ({ unit, at: flip(at), turn: -turn })),
        },
        placement: {
          origin: flip(document.placement.origin),
          turn: -document.placement.turn,
        },
      });
      sameReport(
        reportOf(document),
        reportOf(twin),
        edgeMap(document, (n, count) => count - 1 - n),
      );
    }),
    runs,
  );
});

test('a ring drawn from another corner, or the other way round, gives the same report', () => {
  fc.assert(
    fc.property(anyDocument({ arcs: true }), fc.nat(20), (document, from) => {
      fc.pre(nothingOnTheEdge(document));
      const report = reportOf(document);
      const restarted = withRings(document, (ring) => {
        const start = from % ring.length;
        return [...ring.slice(start), ...ring.slice(0, start)];
      });
      sameReport(
        report,
        reportOf(parsed(restarted)),
        edgeMap(document, (n, count) => (n - (from % count) + count) % count),
      );
      const reversed = withRings(document, (ring) =>
        ring.map((_, n): Vertex => {
          const corner = ring[ring.length - 1 - n];
          const before = ring[(2 * ring.length - 2 - n) % ring.length];
          return before.length === 3 ? [corner[0], corner[1], -before[2]] : [corner[0], corner[1]];
        }),
      );
      // Turned anticlockwise again the last corner comes first, the rest follow in their order.
      sameReport(
        report,
        reportOf(parsed(reversed)),
        edgeMap(document, (n, count) => (n + 1) % count),
      );
    }),
    runs,
  );
});

test('the ground is the laid units and the fill region together', () => {
  fc.assert(
    fc.property(anyDocument({ arcs: true }), (document) => {
      const laying = layFloor(document);
      const report = floorReport(laying);
      const fill = fillRegion(laying);
      if (!fill.ok) throw new Error(fill.reason);
      // Corners snapped to the micrometre move each side by at most that.
      const sides = laying.ground.edges.reduce((sum, { length }) => sum + length, 0);
      const perimeters = laying.laid.count * 4 * 900 + sides;
      expect(Math.abs(fill.area - report.fillArea * 1e6)).toBeLessThan(0.001 * perimeters);
      expect(report.groundArea - report.coveredArea).toBeCloseTo(report.fillArea, 9);
    }),
    { numRuns: 25 },
  );
});

test('no two laid units overlap, and none leaves the ground, by JSTS', () => {
  const factory = new GeometryFactory();
  fc.assert(
    fc.property(anyDocument(), (document) => {
      const { laid, motif } = layFloor(document);
      const { ground } = oracleGround(document);
      const placed = Array.from({ length: laid.count }, (_, n) => ({
        centre: [laid.x[n], laid.y[n]] as const,
        ...motif[laid.k[n]],
      }));
      placed.forEach((one, n) => {
        for (const other of placed.slice(n + 1)) {
          expect(rectangleOverlap(one, other)).toBeLessThanOrEqual(0.01);
        }
        const corners = unitCorners(one, one.centre[0], one.centre[1]);
        const ring = [...corners, corners[0]].map(([x, y]) => new Coordinate(x, y));
        const polygon = factory.createPolygon(factory.createLinearRing(ring));
        const { length, width } = one.unit;
        expect(SnapIfNeededOverlayOp.difference(polygon, ground).getArea()).toBeLessThanOrEqual(
          0.01 * 2 * (length + width),
        );
      });
    }),
    { numRuns: 20 },
  );
});

test('the unit under its own middle is found with its address and status', () => {
  fc.assert(
    fc.property(anyDocument(), (document) => {
      const laying = layFloor(document);
      for (const status of ['laid', 'leftOut', 'lifted'] as const) {
        const set = laying[status];
        for (let n = 0; n < set.count; n++) {
          expect(unitAt(laying, [set.x[n], set.y[n]])).toEqual({
            address: [set.i[n], set.j[n], set.k[n]],
            status,
          });
        }
      }
      expect(unitAt(laying, [1e6, 1e6])).toBeNull();
    }),
    { numRuns: 25 },
  );
});

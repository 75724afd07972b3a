import { readFileSync } from 'node:fs';
import fc from 'fast-check';
import { expect, test } from 'vitest';
import type { Point } from '@/geometry/point';
import { pointTurned, rotation } from '@/geometry/rotation';
import {
  cutPieces,
  LEAST_MEAN_THICKNESS_MM,
  LEAST_SAWN_WIDTH_MM,
} from '@/paving/cutting/cut-pieces';
import { cutReport } from '@/paving/cutting/cut-report';
import { layFloor, unitCorners } from '@/paving/laying';
import type { LayoutDocument } from '@/paving/layout-document';
import { parseLayoutDocument } from '@/paving/layout-validation';
import { ringArea } from '@/geometry/ring';
import DistanceOp from 'jsts/org/locationtech/jts/operation/distance/DistanceOp.js';
import { jstsPolygon, oracleInset, oracleParts, type OraclePart } from '../oracle/cut-oracle';
import { oracleGround } from '../oracle/brute-force';
import { anyDocument, gridDocument, parsed, real } from '../oracle/documents';

// The oracle buffers the ground inward and cuts each unit with JSTS (a port of JTS); it shares no
// geometry with the core. Pieces are on a grid of a micrometre, so an area may be off by a
// micrometre along its outline; round a corner or an arc by the sagitta of 0.05 mm besides.

const LEAST_AREA_MM2 = 1;

function piecesAgree(document: LayoutDocument, arcs: boolean): void {
  const laying = layFloor(document);
  const { pieces, failed } = cutPieces(laying);
  expect(failed).toEqual([]);
  const inset = oracleInset(document);
  const { leftOut, motif } = laying;
  const lifted = new Set(document.lifted.map(String));
  const byUnit = new Map<string, typeof pieces>();
  for (const piece of pieces) {
    byUnit.set(piece.unit.join(), [...(byUnit.get(piece.unit.join()) ?? []), piece]);
  }
  const round = arcs || document.clearance > 0;
  for (let n = 0; n < leftOut.count; n++) {
    const address = `${leftOut.i[n]},${leftOut.j[n]},${leftOut.k[n]}`;
    const ours = byUnit.get(address) ?? [];
    if (lifted.has(address)) {
      expect(ours).toEqual([]);
      continue;
    }
    const entry = motif[leftOut.k[n]];
    const slack = (area: number) =>
      (round ? 0.06 : 0.002) * 2 * (entry.unit.length + entry.unit.width) + 1e-6 * area;
    const parts = oracleParts(inset, unitCorners(entry, leftOut.x[n], leftOut.y[n]));
    const sorted = [...ours].sort((one, other) => other.area - one.area);
    const doubtful = (part: OraclePart) =>
      Math.abs(part.thickness - LEAST_MEAN_THICKNESS_MM) < 0.1 ||
      Math.abs(part.area - LEAST_AREA_MM2) < slack(part.area) ||
      Math.abs(part.width - LEAST_SAWN_WIDTH_MM) < (round ? 0.12 : 0.01);
    const large = (part: OraclePart) =>
      part.area > LEAST_AREA_MM2 &&
      part.width >= LEAST_SAWN_WIDTH_MM &&
      part.thickness >= LEAST_MEAN_THICKNESS_MM;
    const sure = parts.filter((part) => large(part) && !doubtful(part));
    const most = parts.filter((part) => large(part) || doubtful(part));
    // Two parts joined by less than the sagitta may be one or two.
    if (!round) {
      expect(sorted.length).toBeGreaterThanOrEqual(sure.length);
      expect(sorted.length).toBeLessThanOrEqual(most.length);
    }
    if (sure.length === most.length && sorted.length === sure.length) {
      sure.forEach((part, m) => {
        expect(Math.abs(sorted[m].area * 1e6 - part.area)).toBeLessThan(slack(part.area));
        // A cusp between two arcs, or an arc and a side, ends where they part by the sagitta.
        const cusp = round ? 0.12 + 2 * Math.sqrt(2 * 0.06 * document.clearance) : 0.01;
        expect(Math.abs(sorted[m].width - part.width)).toBeLessThan(cusp);
      });
    } else {
      const sum = (list: readonly { area: number }[]) =>
        list.reduce((total, { area }) => total + area, 0);
      const ourSum = sum(sorted) * 1e6;
      expect(ourSum).toBeGreaterThan(sum(sure) - slack(ourSum) - 10);
      expect(ourSum).toBeLessThan(sum(parts) + slack(ourSum));
    }
  }
}

/** JSTS buffers by no distance near nought. */
const clearance = fc.oneof(fc.constant(0), real(0.5, 70));
const runs = (numRuns: number) => ({ numRuns, seed: 20_261_201 });

test('whatever the floor, each unit at the edge is cut as JSTS cuts it', () => {
  fc.assert(
    fc.property(anyDocument({ clearance }), (document) => piecesAgree(document, false)),
    runs(60),
  );
});

test('without a clearance, to the micrometre', () => {
  fc.assert(
    fc.property(anyDocument({ clearance: fc.constant(0) }), (document) =>
      piecesAgree(document, false),
    ),
    runs(60),
  );
});

test('with arcs in the perimeter, as on the finely flattened arc', () => {
  fc.assert(
    fc.property(anyDocument({ arcs: true, clearance }), (document) => piecesAgree(document, true)),
    runs(30),
  );
});

test('where units touch edges and corners exactly, and keep-outs share sides', () => {
  fc.assert(
    fc.property(gridDocument, (document) => {
      fc.pre(parseLayoutDocument(document).ok);
      piecesAgree(parsed(document), false);
    }),
    runs(60),
  );
});

test.each([
  'round-terrace-with-round-bed',
  'concave-arc-in-one-side',
  'comb-of-narrow-bays',
  'keep-out-along-the-perimeter',
  'two-keep-outs-touching-along-an-edge',
  'custom-two-sizes-skewed-lattice',
  'far-from-the-origin',
])('%s, at several clearances', (name) => {
  const file = new URL(`../golden/${name}/layout.json`, import.meta.url);
  const document = parsed(JSON.parse(readFileSync(file, 'utf8')));
  for (const clearance of [0, 3, 25, 80]) piecesAgree({ ...document, clearance }, true);
});

test('whole units, pieces and fill make up the ground; no piece leaves its unit or comes nearer than the clearance', () => {
  fc.assert(
    fc.property(anyDocument({ clearance }), (document) => {
      const laying = layFloor(document);
      const cut = cutReport(laying);
      const { ground, rings } = oracleGround(document);
      const { lattice, origin, motif, laid } = laying;
      let sum = 0;
      for (let n = 0; n < laid.count; n++) {
        const { unit } = motif[laid.k[n]];
        sum += unit.length * unit.width;
      }
      for (const { unit, polygon, holes = [] } of cut.pieces) {
        sum += ringArea(polygon);
        for (const hole of holes) sum += ringArea(hole);
        const entry = motif[unit[2]];
        const at = pointTurned(entry.at, rotation(document.placement.turn));
        const [hx, hy] = [entry.unit.length / 2, entry.unit.width / 2];
        for (const [x, y] of [polygon, ...holes].flat()) {
          const dx = x - origin[0] - unit[0] * lattice.a[0] - unit[1] * lattice.b[0] - at[0];
          const dy = y - origin[1] - unit[0] * lattice.a[1] - unit[1] * lattice.b[1] - at[1];
          const [u, v] = pointTurned([dx, dy], rotation(-entry.turnDeg));
          expect(Math.abs(u)).toBeLessThan(hx + 0.002);
          expect(Math.abs(v)).toBeLessThan(hy + 0.002);
        }
        const outline = (ring: readonly Point[]) => jstsPolygon(ring).getBoundary();
        const nearest = Math.min(
          ...[polygon, ...holes].flatMap((own) =>
            rings.map((ring) => DistanceOp.distance(outline(ring), outline(own))),
          ),
        );
        expect(nearest).toBeGreaterThan(document.clearance - 0.002);
      }
      expect(Math.abs(ground.getArea() - sum - cut.fillArea * 1e6)).toBeLessThan(0.1);
      // A whole unit may reach over an edge by 0.01 mm.
      expect(cut.fillArea).toBeGreaterThan(-1e-4);
    }),
    runs(30),
  );
});

test('a floor turned, moved and mirrored is cut into the same pieces', () => {
  fc.assert(
    fc.property(
      anyDocument({ clearance }),
      fc.double({ min: 0, max: 360, noNaN: true }),
      (document, degrees) => {
        const turn = rotation(degrees);
        const moved = ([x, y]: readonly number[]): [number, number] => {
          const [u, v] = pointTurned([x, y], turn);
          return [u + 12_345, v - 6789];
        };
        const ring = (vertices: LayoutDocument['ground']['perimeter']) =>
          vertices.map((vertex) => moved(vertex));
        const twin = parsed({
          ...document,
          ground: {
            perimeter: ring(document.ground.perimeter),
            keepOuts: document.ground.keepOuts.map((keepOut) => ({
              ...keepOut,
              ring: ring(keepOut.ring),
            })),
          },
          placement: {
            origin: moved(document.placement.origin),
            turn: document.placement.turn + degrees,
          },
        });
        const [one, other] = [document, twin].map((floor) => cutReport(layFloor(floor)));
        fc.pre(layFloor(document).leftOut.count === layFloor(twin).leftOut.count);
        // The grid falls elsewhere: a sliver at its limit may fall the other way.
        expect(Math.abs(one.count - other.count)).toBeLessThanOrEqual(1);
        expect(Math.abs(one.area - other.area) * 1e6).toBeLessThan(
          0.02 * one.count * 100 + 2000 * Math.abs(one.count - other.count) + 1,
        );
      },
    ),
    runs(30),
  );
});

import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { envelopeTop, planeEnvelope } from '@/geometry/plane-envelope';
import { frameMost, frameStart } from '@/paving/fit/cell-fit';
import { cellPieces, type CellPieces } from '@/paving/fit/cell-pieces';
import { unitCount } from '@/paving/fit/count';
import { fitFrame, type FitFrame } from '@/paving/fit/fit-frame';
import { depthMoved } from '@/paving/fit/most';
import { nearPieces } from '@/paving/fit/near-pieces';
import { pieceGap, pieceGapsRoom, pieceHasUnit, pointSlack } from '@/paving/fit/slack';
import { KEPT_OFF, stripCount, stripRoom, type OriginBox } from '@/paving/fit/strip-bound';
import { anyDocument } from '../../../oracle/documents';

// Each bound is held against what it bounds, counted and measured at origins anywhere in the box. That
// none is below the truth is what they are for: no source is needed. The counts come from the rows
// (`unitCount`), which know nothing of pieces; the slack from every piece there is (`pointSlack`).

/** The cell's very sides are left out: what lies along them is on one of the two. */
const share = fc.double({ min: 0.001, max: 0.999, noNaN: true });
/** A box as shares of the cell: where, and how large, small ones as often as large. */
const boxOf = fc.tuple(
  share,
  share,
  fc.double({ min: -4, max: -0.3, noNaN: true }),
  fc.double({ min: -4, max: -0.3, noNaN: true }),
);
const origins = fc.array(fc.tuple(share, share), { minLength: 12, maxLength: 12 });

function cellBox(
  { pitch, rise }: FitFrame,
  [x, y, w, d]: readonly [number, number, number, number],
): OriginBox {
  const width = pitch * 10 ** w;
  const depth = rise * 10 ** d;
  const ax = x * (pitch - width);
  const ay = y * (rise - depth);
  return { ax, ay, bx: ax + width, by: ay + depth };
}

interface Case {
  readonly frame: FitFrame;
  readonly near: CellPieces;
  readonly every: Int32Array;
  readonly box: OriginBox;
  readonly u: number;
  readonly v: number;
  readonly h: number;
  readonly distance: Float64Array;
  readonly slackAt: (u: number, v: number) => number;
}

function caseOf(
  document: Parameters<typeof fitFrame>[0],
  shares: readonly [number, number, number, number],
  outlines: boolean,
): Case {
  const frame = fitFrame(document);
  const reach = frame.pitch * 1.001;
  const pieces = cellPieces(frame);
  const near = nearPieces(pieces, frame.pitch, frame.rise, frame.shift, reach, outlines);
  const every = Int32Array.from({ length: near.count }, (_, n) => n);
  const box = cellBox(frame, shares);
  const u = box.ax + 0.487 * (box.bx - box.ax);
  const v = box.ay + 0.487 * (box.by - box.ay);
  const h = Math.hypot(Math.max(u - box.ax, box.bx - u), Math.max(v - box.ay, box.by - v));
  const room = pieceGapsRoom(near.count);
  for (const n of every) pieceGap(near, n, u, v, room, n);
  const distance = room.distance.slice();
  const order = new Int32Array(near.count);
  return {
    frame,
    near,
    every,
    box,
    u,
    v,
    h,
    distance,
    slackAt: (x, y) => pointSlack(near, every, 0, near.count, x, y, reach, room, order),
  };
}

/** True where moving by three millionths of a millimetre, what the regions are drawn in by and rounding, changes no count. */
const steady = (frame: FitFrame, u: number, v: number) => {
  const here = unitCount(frame, u, v);
  return [
    [3e-6, 0],
    [-3e-6, 0],
    [0, 3e-6],
    [0, -3e-6],
  ].every(([du, dv]) => unitCount(frame, u + du, v + dv) === here);
};

describe('strips', () => {
  test('allow no fewer units than an origin of the box with the slack has, where units to themselves are kept off', () => {
    let told = 0;
    fc.assert(
      fc.property(
        anyDocument({ arcs: true }),
        boxOf,
        origins,
        fc.double({ min: -3, max: 1.7, noNaN: true }),
        (document, shares, places, power) => {
          const { frame, near, every, box, u, v, h, distance, slackAt } = caseOf(
            document,
            shares,
            false,
          );
          if (!steady(frame, u, v)) return;
          const slack = 10 ** power;
          const depth = unitCount(frame, u, v);
          // A piece is kept off when one of its units has no other piece as near as could matter.
          const keptOff = (at: number) => {
            for (let a = near.unitStart[at]; a < near.unitStart[at + 1]; a++) {
              const alone = every.every(
                (n) => n === at || distance[n] > slack + h || !pieceHasUnit(near, n, near.units[a]),
              );
              if (alone) return KEPT_OFF.held;
            }
            return KEPT_OFF.none;
          };
          const bound = stripCount(
            near,
            every,
            0,
            near.count,
            box,
            u,
            v,
            depth,
            slack,
            distance,
            h,
            false,
            keptOff,
            stripRoom(near),
          );
          for (const [s, t] of places) {
            const x = box.ax + s * (box.bx - box.ax);
            const y = box.ay + t * (box.by - box.ay);
            if (!steady(frame, x, y) || slackAt(x, y) <= slack) continue;
            told++;
            expect(unitCount(frame, x, y)).toBeLessThanOrEqual(bound);
          }
        },
      ),
      { seed: 11, numRuns: 400 },
    );
    expect(told).toBeGreaterThan(300);
  }, 120_000);

  test('allow the most units wherever an origin of the box has them and keeps off every piece', () => {
    let told = 0;
    fc.assert(
      fc.property(
        anyDocument({ arcs: true }),
        fc.tuple(
          fc.double({ min: -3, max: -0.3, noNaN: true }),
          fc.double({ min: -3, max: -0.3, noNaN: true }),
        ),
        share,
        share,
        fc.double({ min: 0.01, max: 0.99, noNaN: true }),
        (document, [w, d], atX, atY, part) => {
          const frame = fitFrame(document);
          const { pieces, most } = frameMost(frame);
          if (most.count === 0) return;
          const start = frameStart(frame, pieces, most);
          // A box about the best start, which has all of its slack.
          const width = frame.pitch * 10 ** w;
          const depthOf = frame.rise * 10 ** d;
          const ax = start.u - atX * width;
          const ay = start.v - atY * depthOf;
          const box = { ax, ay, bx: ax + width, by: ay + depthOf };
          if (ax < 0 || ay < 0 || box.bx > frame.pitch || box.by > frame.rise) return;
          const near = nearPieces(
            pieces,
            frame.pitch,
            frame.rise,
            frame.shift,
            frame.pitch * 1.001,
            true,
          );
          const every = Int32Array.from({ length: near.count }, (_, n) => n);
          const u = ax + 0.487 * width;
          const v = ay + 0.487 * depthOf;
          if (!steady(frame, u, v)) return;
          const h = Math.hypot(0.513 * width, 0.513 * depthOf);
          const room = pieceGapsRoom(near.count);
          for (const n of every) pieceGap(near, n, u, v, room, n);
          const bound = stripCount(
            near,
            every,
            0,
            near.count,
            box,
            u,
            v,
            unitCount(frame, u, v),
            part * start.slack,
            room.distance,
            h,
            true,
            () => KEPT_OFF.both,
            stripRoom(near),
          );
          told++;
          expect(bound).toBeGreaterThanOrEqual(most.count);
        },
      ),
      { seed: 12, numRuns: 300 },
    );
    expect(told).toBeGreaterThan(100);
  }, 120_000);
});

test('lines joined across the cell’s sides tell the same slack and the same count as pieces left apart', () => {
  let told = 0;
  fc.assert(
    fc.property(anyDocument({ arcs: true }), origins, (document, places) => {
      const frame = fitFrame(document);
      const { pitch, rise, shift } = frame;
      const pieces = cellPieces(frame);
      const { most } = frameMost(frame);
      const reach = pitch * 0.6;
      const near = nearPieces(pieces, pitch, rise, shift, reach);
      const lines = nearPieces(pieces, pitch, rise, shift, reach, true);
      const every = Int32Array.from({ length: near.count }, (_, n) => n);
      const joined = Int32Array.from({ length: lines.count }, (_, n) => n);
      const own = Int32Array.from({ length: pieces.count }, (_, n) => n);
      const room = pieceGapsRoom(Math.max(near.count, lines.count));
      expect(lines.count).toBeLessThanOrEqual(near.count);
      for (const [s, t] of places) {
        const u = s * pitch;
        const v = t * rise;
        if (!steady(frame, u, v)) continue;
        told++;
        const count = unitCount(frame, u, v);
        for (const [these, list] of [
          [pieces, own],
          [near, every],
          [lines, joined],
        ] as const)
          expect(depthMoved(these, list, 0, list.length, most.u, most.v, u, v, most.count)).toBe(
            count,
          );
        // The nearest of all pieces is as far by each: an origin of the cell, and its repeats pieces one by one.
        const nearest = (these: CellPieces) => {
          let least = reach;
          for (let n = 0; n < these.count; n++) {
            pieceGap(these, n, u, v, room, 0);
            least = Math.min(least, room.distance[0]);
          }
          return least;
        };
        let apart = reach;
        for (let j = -2; j <= 2; j++) {
          for (let i = -3; i <= 3; i++) {
            for (let n = 0; n < pieces.count; n++) {
              pieceGap(pieces, n, u - i * pitch - j * shift, v - j * rise, room, 0);
              apart = Math.min(apart, room.distance[0]);
            }
          }
        }
        expect(nearest(near)).toBeCloseTo(apart, 6);
        expect(nearest(lines)).toBeCloseTo(apart, 6);
      }
    }),
    { seed: 13, numRuns: 60 },
  );
  expect(told).toBeGreaterThan(400);
}, 120_000);

test('no point of a box is farther from the pieces that it does not reach than the planes about its middle say', () => {
  let told = 0;
  fc.assert(
    fc.property(anyDocument({ arcs: true }), boxOf, origins, (document, shares, places) => {
      const { near, every, box, u, v, h } = caseOf(document, shares, true);
      const room = pieceGapsRoom(near.count);
      for (const n of every) pieceGap(near, n, u, v, room, n);
      const used = [...every]
        .filter((n) => room.distance[n] > h)
        .sort((m, n) => room.distance[m] - room.distance[n])
        .slice(0, 6);
      if (used.length === 0) return;
      const planes = planeEnvelope(6);
      for (const n of used) {
        const d = room.distance[n];
        const along = (u - near.x0[n]) * near.ux[n] + (v - near.y0[n]) * near.uy[n];
        const straight = near.radius[n] === 0 && along >= h && along <= near.length[n] - h;
        planes.d[planes.count] = d + (straight ? 0 : (h * h) / (2 * (d - h)));
        planes.gx[planes.count] = room.awayX[n];
        planes.gy[planes.count++] = room.awayY[n];
      }
      const top = envelopeTop(planes, box.ax - u, box.ay - v, box.bx - u, box.by - v);
      const one = pieceGapsRoom(1);
      for (const [s, t] of places) {
        const x = box.ax + s * (box.bx - box.ax);
        const y = box.ay + t * (box.by - box.ay);
        const least = Math.min(
          ...used.map((n) => {
            pieceGap(near, n, x, y, one, 0);
            return one.distance[0];
          }),
        );
        told++;
        expect(least).toBeLessThanOrEqual(top + 1e-6);
      }
    }),
    { seed: 14, numRuns: 200 },
  );
  expect(told).toBeGreaterThan(1000);
}, 60_000);

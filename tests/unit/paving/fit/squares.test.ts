import fc from 'fast-check';
import { expect, test } from 'vitest';
import { cellPieces } from '@/paving/fit/cell-pieces';
import { clearStrips } from '@/paving/fit/clear-strip';
import { unitCount } from '@/paving/fit/count';
import { fitFrame, type FitFrame } from '@/paving/fit/fit-frame';
import { choiceOffered, knownChoices, newsSlack } from '@/paving/fit/known-choices';
import { frameMost } from '@/paving/fit/cell-fit';
import { SPLIT } from '@/paving/fit/most';
import { nearPieces } from '@/paving/fit/near-pieces';
import { originSquares } from '@/paving/fit/origin-squares';
import { pieceFinder, pieceGrid } from '@/paving/fit/piece-grid';
import { pieceGap, pieceGapsRoom, pointSlack } from '@/paving/fit/slack';
import { squareIsNews } from '@/paving/fit/square-search';
import { anyDocument } from '../../../oracle/documents';

// What is said of all origins of a square is held against counts and slacks at origins anywhere in it. That none is
// beyond what was said is what squares are for: no source is needed. The counts come from the rows (`unitCount`),
// which know nothing of pieces; the slack from every piece there is (`pointSlack`).

const share = fc.double({ min: 0.001, max: 0.999, noNaN: true });
const origins = fc.array(fc.tuple(share, share), { minLength: 40, maxLength: 40 });

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

function cellOf(document: Parameters<typeof fitFrame>[0]) {
  const frame = fitFrame(document);
  const { pieces, most } = frameMost(frame);
  const reach = frame.pitch * 1.001;
  const near = nearPieces(pieces, frame.pitch, frame.rise, frame.shift, reach);
  const every = Int32Array.from({ length: near.count }, (_, n) => n);
  const room = pieceGapsRoom(near.count);
  const order = new Int32Array(near.count);
  const slackAt = (u: number, v: number) =>
    pointSlack(near, every, 0, near.count, u, v, reach, room, order);
  return { frame, most, reach, near, slackAt };
}

test('squares bound the count, the slack and what is news of every origin in them', () => {
  let told = 0;
  let bounded = 0;
  let dismissed = 0;
  fc.assert(
    fc.property(
      anyDocument({ arcs: true }),
      fc.integer({ min: 1, max: 4000 }),
      origins,
      fc.double({ min: -1, max: 1, noNaN: true }),
      (document, number, places, spread) => {
        const { frame, most, reach, near, slackAt } = cellOf(document);
        const { pitch, rise } = frame;
        const squares = originSquares(near, pitch, rise, reach, most, number);
        const { columns, rows, width, height, far, depth, gains, slack } = squares;
        const known = knownChoices(0, most.count);
        choiceOffered(known, Math.ceil(0.97 * most.count), 3 * far * 4 ** spread, 0, 0);
        choiceOffered(known, most.count, far * 4 ** spread, 0, 0);
        for (const [s, t] of places) {
          const [u, v] = [s * pitch, t * rise];
          const column = Math.min(columns - 1, Math.floor(u / width));
          const row = Math.min(rows - 1, Math.floor(v / height));
          const at = row * columns + column;
          const [refU, refV] = [(column + SPLIT) * width, (row + SPLIT) * height];
          if (!steady(frame, u, v) || !steady(frame, refU, refV)) continue;
          told++;
          const count = unitCount(frame, u, v);
          const own = slackAt(u, v);
          expect(depth[at]).toBe(unitCount(frame, refU, refV));
          expect(Math.hypot(u - refU, v - refV)).toBeLessThanOrEqual(far + 1e-9);
          expect(count).toBeLessThanOrEqual(depth[at] + gains[at]);
          expect(own).toBeLessThanOrEqual(slack[at] + 1e-9);
          if (own > far) expect(count).toBeLessThanOrEqual(depth[at]);
          if (slack[at] < reach) bounded++;
          if (squareIsNews(squares, at, known)) continue;
          dismissed++;
          expect(own).toBeLessThanOrEqual(newsSlack(known, count));
        }
      },
    ),
    { seed: 31, numRuns: 150 },
  );
  expect(told).toBeGreaterThan(3000);
  expect(bounded).toBeGreaterThan(1000);
  expect(dismissed).toBeGreaterThan(500);
}, 180_000);

test('an origin in a clear strip has no more slack than it is off the piece', () => {
  let told = 0;
  fc.assert(
    fc.property(
      anyDocument({ arcs: true }),
      fc.array(fc.tuple(fc.nat(), share, share), { minLength: 150, maxLength: 150 }),
      (document, places) => {
        const { frame, reach, near, slackAt } = cellOf(document);
        if (near.count === 0) return;
        const { from, to } = clearStrips(near, reach);
        for (const [pick, s, t] of places) {
          const n = pick % near.count;
          if (!(to[n] > from[n])) continue;
          // As often near the piece as far off it.
          const off = reach * t ** 3;
          const along = from[n] + s * (to[n] - from[n]);
          const u = near.x0[n] + along * near.ux[n] - off * near.uy[n];
          const v = near.y0[n] + along * near.uy[n] + off * near.ux[n];
          if (u < 0 || v < 0 || u > frame.pitch || v > frame.rise) continue;
          told++;
          expect(slackAt(u, v)).toBeLessThanOrEqual(off + 1e-6);
        }
      },
    ),
    { seed: 32, numRuns: 250 },
  );
  expect(told).toBeGreaterThan(1000);
}, 180_000);

test('pieces are found by place wherever a point of them is', () => {
  let told = 0;
  fc.assert(
    fc.property(anyDocument({ arcs: true }), origins, share, (document, places, size) => {
      const { pitch, rise, shift, ...frame } = fitFrame(document);
      const reach = pitch / 2;
      const near = nearPieces(
        cellPieces({ pitch, rise, shift, ...frame }),
        pitch,
        rise,
        shift,
        reach,
      );
      const grid = pieceGrid(near, -reach, -reach, pitch + reach, rise + reach, 12, 9);
      const about = pieceFinder(near, grid);
      const room = pieceGapsRoom(1);
      for (const [s, t] of places) {
        const [u, v] = [s * pitch, t * rise];
        const within = size * reach;
        const list = [...about(u - within, v - within, u + within, v + within)];
        const found = new Set(list);
        expect(found.size).toBe(list.length);
        for (let n = 0; n < near.count; n++) {
          pieceGap(near, n, u, v, room, 0);
          if (room.distance[0] > within) continue;
          told++;
          expect(found.has(n)).toBe(true);
        }
      }
    }),
    { seed: 33, numRuns: 60 },
  );
  expect(told).toBeGreaterThan(1000);
}, 120_000);

import fc from 'fast-check';
import { expect, test } from 'vitest';
import { frameMost } from '@/paving/fit/cell-fit';
import { cellPieces } from '@/paving/fit/cell-pieces';
import { unitCount } from '@/paving/fit/count';
import { fit, type FitResult } from '@/paving/fit/fit';
import { cellPoint, fitFrame, frameFromGround } from '@/paving/fit/fit-frame';
import { depthMoved } from '@/paving/fit/most';
import { shiftMap, shiftMapPlace } from '@/paving/fit/shift-map';
import { documentGround, type Ground } from '@/paving/ground';
import { layFloor } from '@/paving/laying';
import type { LayoutDocument } from '@/paving/layout-document';
import { leastGapAt } from '@/paving/least-gap';
import { bondPattern } from '@/paving/bond';
import { oracleFloor } from '../oracle/brute-force';
import { anyDocument } from '../oracle/documents';
import { startCounter } from '../oracle/start-counter';

// A second, slow way to the fit: floors laid from very many starts, each the laying's own decision,
// and the best of them looked about in more closely. The laying itself is judged by JSTS in
// laying-oracle.test.ts, and the fit's answers are again, here.

interface Sample {
  readonly count: number;
  readonly play: number;
  readonly origin: [number, number];
}

function sampled(document: LayoutDocument, ground: Ground, origin: [number, number]): Sample {
  const placement = { ...document.placement, origin };
  const laying = layFloor({ ...document, placement, lifted: [] }, ground);
  const gap = leastGapAt(laying)?.gap;
  return {
    count: laying.laid.count,
    play: gap === undefined ? -Infinity : gap - document.clearance,
    origin,
  };
}

/** A grid of starts over the lattice's own cell, then ever closer about the few best by count and by play. */
function searched(document: LayoutDocument, across: number): Sample[] {
  const ground = documentGround(document);
  const { a, b } = bondPattern(document);
  const turn = (document.placement.turn * Math.PI) / 180;
  const at = (s: number, t: number): [number, number] => {
    const x = s * a[0] + t * b[0];
    const y = s * a[1] + t * b[1];
    return [x * Math.cos(turn) - y * Math.sin(turn), x * Math.sin(turn) + y * Math.cos(turn)];
  };
  const samples: Sample[] = [];
  for (let i = 0; i < across; i++) {
    for (let j = 0; j < across; j++) {
      samples.push(sampled(document, ground, at((i + 0.5) / across, (j + 0.5) / across)));
    }
  }
  let reach = Math.max(Math.hypot(...a), Math.hypot(...b)) / across;
  const better = (one: Sample, other: Sample) => other.count - one.count || other.play - one.play;
  for (let round = 0; round < 8; round++) {
    const leaders = [...samples].sort(better).slice(0, 3);
    for (const { origin } of leaders) {
      for (let angle = 0; angle < 6; angle++) {
        const away = angle + round;
        samples.push(
          sampled(document, ground, [
            origin[0] + reach * Math.cos(away),
            origin[1] + reach * Math.sin(away),
          ]),
        );
      }
    }
    reach *= 0.55;
  }
  return samples;
}

/** The fit gives play to within 0.004 mm; with no clearance to speak of, corners round off another 0.0042 mm. */
const PLAY_SLACK_MM = 0.01;

function neverWorse(document: LayoutDocument, found: FitResult, samples: readonly Sample[]) {
  for (const { count, play, origin } of samples) {
    expect(count, `start ${origin}`).toBeLessThanOrEqual(found.wholeUnits);
    if (count < 0.85 * found.wholeUnits || count === 0) continue;
    const known = found.choices
      .filter(({ wholeUnits }) => wholeUnits >= count)
      .reduce((most, choice) => Math.max(most, choice.play), -Infinity);
    // A choice is listed when it has more than 0.01 mm more than those before it.
    expect(play, `${count} units from ${origin}`).toBeLessThanOrEqual(known + 0.01 + PLAY_SLACK_MM);
    if (count === found.wholeUnits) expect(play).toBeLessThanOrEqual(found.play! + PLAY_SLACK_MM);
  }
}

test('no start of hundreds has more units than the fit, nor more play with as many', () => {
  fc.assert(
    fc.property(anyDocument({ arcs: true }), (document) => {
      neverWorse(document, fit(document), searched(document, 9));
    }),
    { numRuns: 200, seed: 20_240 },
  );
}, 240_000);

test('on a few floors, no start of thousands has', () => {
  fc.assert(
    fc.property(anyDocument(), (document) => {
      neverWorse(document, fit(document), searched(document, 40));
    }),
    { numRuns: 8, seed: 77 },
  );
}, 240_000);

test('JSTS counts as many units where the fit says the floor must start', () => {
  fc.assert(
    fc.property(anyDocument(), (document) => {
      const found = fit(document);
      for (const { wholeUnits, placement } of found.choices) {
        const oracle = oracleFloor({ ...document, placement, lifted: [] });
        const doubtful = [...oracle.undecided].filter(
          (address) => !oracle.laid.has(address),
        ).length;
        expect(oracle.laid.size).toBeLessThanOrEqual(wholeUnits + doubtful);
        expect(oracle.laid.size).toBeGreaterThanOrEqual(wholeUnits - oracle.undecided.size);
      }
    }),
    { numRuns: 25, seed: 4 },
  );
}, 120_000);

test('at a thousand starts the count is the same by the laying, by the rows and by the folded pieces', () => {
  let checked = 0;
  fc.assert(
    fc.property(
      anyDocument({ arcs: true }),
      fc.array(
        fc.tuple(
          fc.double({ min: -2000, max: 2000, noNaN: true }),
          fc.double({ min: -2000, max: 2000, noNaN: true }),
        ),
        {
          minLength: 25,
          maxLength: 25,
        },
      ),
      (document, origins) => {
        const frame = fitFrame(document);
        const pieces = cellPieces(frame);
        const all = Int32Array.from({ length: pieces.count }, (_, n) => n);
        const { most } = frameMost(frame);
        const count = startCounter(document);
        for (const origin of origins) {
          const laid = ([x, y]: readonly number[]) => {
            const placement = { ...document.placement, origin: [x, y] as [number, number] };
            return layFloor({ ...document, placement, lifted: [] }).laid.count;
          };
          // The fit draws each unit's region in by up to two millionths of a millimetre
          // (FIT_MARGIN_MM): starts so near to losing or gaining a unit count either way.
          const here = laid(origin);
          const steady = [
            [3e-6, 0],
            [-3e-6, 0],
            [0, 3e-6],
            [0, -3e-6],
          ].every(([dx, dy]) => laid([origin[0] + dx, origin[1] + dy]) === here);
          if (!steady) continue;
          checked++;
          expect(count(origin)).toBe(here);
          const [u, v] = frameFromGround(frame, origin);
          expect(unitCount(frame, u, v)).toBe(here);
          const cell = cellPoint(frame, [u, v]);
          expect(
            depthMoved(pieces, all, 0, all.length, most.u, most.v, cell[0], cell[1], most.count),
          ).toBe(here);
        }
      },
    ),
    { numRuns: 44, seed: 9 },
  );
  expect(checked).toBeGreaterThan(1000);
}, 120_000);

test('in the middle of a thousand squares of the shift map the laying counts what the map shows', () => {
  let checked = 0;
  fc.assert(
    fc.property(
      anyDocument({ arcs: true }),
      fc.array(fc.nat(), { minLength: 25, maxLength: 25 }),
      (document, squares) => {
        const map = shiftMap(document, 48);
        const ground = documentGround(document);
        const [dx, dy] = map.direction;
        for (const any of squares) {
          const square = any % map.counts.length;
          const u = (((square % map.width) + 0.5) / map.width) * map.pitch;
          const v = ((Math.floor(square / map.width) + 0.5) / map.height) * map.rise;
          const laid = (du: number, dv: number) => {
            const [x, y] = [u + du, v + dv];
            const origin: [number, number] = [
              map.from[0] + x * dx - y * dy,
              map.from[1] + x * dy + y * dx,
            ];
            return sampled(document, ground, origin).count;
          };
          // As above: so near to losing or gaining a unit either count will do.
          const here = laid(0, 0);
          if (laid(3e-6, 0) !== here || laid(-3e-6, 0) !== here) continue;
          if (laid(0, 3e-6) !== here || laid(0, -3e-6) !== here) continue;
          checked++;
          expect(map.counts[square]).toBe(here);
          const place = shiftMapPlace(map, [
            map.from[0] + u * dx - v * dy,
            map.from[1] + u * dy + v * dx,
          ]);
          expect(Math.hypot(place[0] - u, place[1] - v)).toBeLessThan(1e-6);
        }
      },
    ),
    { numRuns: 44, seed: 12, endOnFailure: true },
  );
  expect(checked).toBeGreaterThan(1000);
}, 120_000);

import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  arcRadius,
  arcRise,
  chordLength,
  edgeDirectionDeg,
  edgeDirectionSet,
  edgeLength,
  edgeLengthSet,
  edgeMiddle,
  edgeMoved,
  edgeRiseSet,
  vertexBulge,
  vertexInserted,
  vertexRemoved,
  type Ring,
} from '@/paving/ground-edits';
import { documentEdgeName } from '@/paving/edge-names';
import { COURT_CHEQUER } from '@/server/demo-layouts';

const COURT: Ring = [
  [0, 0],
  [7200, 0],
  [7200, 3100],
  [4300, 3100],
  [4300, 5400],
  [0, 5400],
];

describe('edges typed afterwards', () => {
  it('keeps the corners of a court of right angles right, whichever side is typed', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 0, max: 5 }),
        fc.integer({ min: 500, max: 20_000 }),
        (edge, mm) => {
          const ring = edgeLengthSet(COURT, edge, mm);
          expect(chordLength(ring, edge)).toBeCloseTo(mm, 6);
          ring.forEach((_, n) => {
            const turn = edgeDirectionDeg(ring, (n + 1) % 6) - edgeDirectionDeg(ring, n);
            expect(Math.abs(Math.round(turn / 90) * 90 - turn)).toBeLessThan(1e-6);
          });
        },
      ),
    );
  });

  it('turns an edge about its start and keeps its length', () => {
    const ring = edgeDirectionSet(COURT, 0, 30);
    expect(edgeDirectionDeg(ring, 0)).toBeCloseTo(30, 9);
    expect(chordLength(ring, 0)).toBeCloseTo(7200, 6);
    expect(ring[0]).toEqual(COURT[0]);
  });

  it('moves a whole side and stretches its neighbours only', () => {
    const ring = edgeMoved(COURT, 1, [100, 0]);
    expect(chordLength(ring, 0)).toBe(7300);
    expect(chordLength(ring, 2)).toBe(3000);
    expect(ring.slice(3)).toEqual(COURT.slice(3));
  });
});

describe('arcs', () => {
  // A half circle: bulge 1, length π/2 of its chord, radius half of it (elementary geometry).
  it('makes a half circle of a rise of half the chord, and a side of none', () => {
    const ring = edgeRiseSet(COURT, 0, 3600);
    expect(vertexBulge(ring[0])).toBeCloseTo(1, 12);
    expect(arcRadius(ring, 0)).toBeCloseTo(3600, 9);
    expect(edgeLength(ring, 0)).toBeCloseTo(3600 * Math.PI, 6);
    expect(edgeMiddle(ring, 0)[1]).toBeCloseTo(-3600, 9);
    expect(edgeRiseSet(ring, 0, 0)[0]).toEqual([0, 0]);
  });

  it('puts a corner on an arc and leaves two arcs of the same circle', () => {
    fc.assert(
      fc.property(fc.double({ min: 5, max: 3500, noNaN: true }), (rise) => {
        const ring = edgeRiseSet(COURT, 0, rise);
        const halved = vertexInserted(ring, 0, edgeMiddle(ring, 0));
        expect(arcRadius(halved, 0)).toBeCloseTo(arcRadius(ring, 0), 4);
        expect(arcRadius(halved, 1)).toBeCloseTo(arcRadius(ring, 0), 4);
        expect(edgeLength(halved, 0) + edgeLength(halved, 1)).toBeCloseTo(edgeLength(ring, 0), 4);
        expect(arcRise(ring, 0)).toBeCloseTo(rise, 9);
      }),
    );
  });
});

it('takes no corner from a ring of three', () => {
  const triangle: Ring = [
    [0, 0],
    [1000, 0],
    [0, 1000],
  ];
  expect(vertexRemoved(triangle, 1)).toBeNull();
  expect(vertexRemoved(COURT, 3)).toHaveLength(5);
});

it('names edges by their corners, and a keep-out’s by its order', () => {
  expect(documentEdgeName(COURT_CHEQUER, 0, 0)).toBe('AB');
  expect(documentEdgeName(COURT_CHEQUER, 0, 5)).toBe('FA');
  expect(documentEdgeName(COURT_CHEQUER, 1, 3)).toBe('K1 da');
});

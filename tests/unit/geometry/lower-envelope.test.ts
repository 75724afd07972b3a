import fc from 'fast-check';
import { expect, test } from 'vitest';
import { envelopePieces, lowerEnvelope } from '@/geometry/lower-envelope';
import { real } from '../../oracle/documents';

const piece = fc
  .tuple(real(0, 900), real(1, 400), real(0, 300), real(0, 300))
  .map(([from, length, t0, t1]) => ({ s0: from, s1: from + length, t0, t1 }));

test('at every place the lowest piece there has it, crossings and all', () => {
  fc.assert(
    fc.property(fc.array(piece, { maxLength: 30 }), (all) => {
      const pieces = envelopePieces();
      all.forEach(({ s0, s1, t0, t1 }, n) => {
        pieces.s0.push(s0);
        pieces.s1.push(s1);
        pieces.t0.push(t0);
        pieces.t1.push(t1);
        pieces.owner.push(n);
      });
      const stretches: [number, number, number][] = [];
      lowerEnvelope(
        pieces,
        (one, other) => one < other,
        (owner, from, to) => stretches.push([owner, from, to]),
      );
      stretches.slice(1).forEach(([, from], n) => {
        expect(from).toBeGreaterThanOrEqual(stretches[n][2]);
      });
      for (let s = 0.37; s < 1300; s += 1.7) {
        const heights = all.map(({ s0, s1, t0, t1 }) =>
          s > s0 && s < s1 ? t0 + ((s - s0) / (s1 - s0)) * (t1 - t0) : Infinity,
        );
        const least = Math.min(...heights);
        const holder = stretches.find(([, from, to]) => s > from && s < to);
        if (least === Infinity) expect(holder).toBeUndefined();
        else expect(heights[holder![0]]).toBeLessThanOrEqual(least + 1e-5);
      }
    }),
  );
});

test('of two level pieces the one that comes first has the stretch, in whatever order they came', () => {
  for (const owners of [
    [4, 9],
    [9, 4],
  ]) {
    const pieces = envelopePieces();
    for (const owner of owners) {
      pieces.s0.push(0);
      pieces.s1.push(100);
      pieces.t0.push(5 + (owner === 9 ? -1e-9 : 0));
      pieces.t1.push(5);
      pieces.owner.push(owner);
    }
    const holders: number[] = [];
    lowerEnvelope(
      pieces,
      (one, other) => one < other,
      (n) => holders.push(pieces.owner[n]),
    );
    expect(new Set(holders)).toEqual(new Set([4]));
  }
});

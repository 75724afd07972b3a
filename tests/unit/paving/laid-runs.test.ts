import fc from 'fast-check';
import { expect, test } from 'vitest';
import { documentGround } from '@/paving/ground';
import { laidRuns } from '@/paving/laid-runs';
import { layFloor } from '@/paving/laying';
import { leastGapAt, leastGapOfRuns } from '@/paving/least-gap';
import { anyDocument } from '../../oracle/documents';

// What follows holds of any floor, by the meaning of the words: no source is needed.

test('runs of whole units hold the units that the laying lays, as many and as near to the boundary', () => {
  fc.assert(
    fc.property(anyDocument(), fc.double({ min: 0.01, max: 400, noNaN: true }), (any, band) => {
      const document = { ...any, lifted: [] };
      const laying = layFloor(document);
      const runs = laidRuns(document, documentGround(document));
      expect(runs.count).toBe(laying.laid.count);
      expect(leastGapOfRuns(runs, band)).toBe(leastGapAt(laying)?.gap ?? null);
    }),
    { seed: 20, numRuns: 150 },
  );
});

import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { layFloor } from '@/paving/laying';
import { formatLength, parseLength } from '@/paving/length';
import { setOut } from '@/paving/set-out/set-out';
import {
  allowedWords,
  readingRemedy,
  readingVerdict,
  verdictWords,
} from '@/paving/site/reading-verdict';
import { COURT_CHEQUER } from '@/server/demo-layouts';

// ICPI, Construction Tolerances and Recommendations for Interlocking Concrete Pavements (one sheet): joint width
// 1/16 in (2 mm) to 3/16 in (5 mm), surface ±3/8 in (10 mm) in 10 ft (3 m).
const joint = { kind: 'joint', expected: 3, least: 2, greatest: 5 } as const;
const surface = { kind: 'flatness', expected: 0, least: null, greatest: 10 } as const;

describe('a reading against its check', () => {
  test.each([
    [2, true],
    [3, true],
    [5, true],
    [5.2, false],
    [1.8, false],
  ])('a joint of %d mm is within: %s', (measured, within) => {
    expect(readingVerdict(joint, measured).within).toBe(within);
  });

  test('the same limits in inches, as the sheet gives them beside, are met by a tape in inches', () => {
    const inches = (sixteenths: number) => (sixteenths * 25.4) / 16;
    expect([0, 1, 2, 3, 4].map((n) => readingVerdict(joint, inches(n)).within)).toEqual([
      false,
      true,
      true,
      true,
      false,
    ]);
    expect([5, 6, 7].map((n) => readingVerdict(surface, inches(n)).within)).toEqual([
      true,
      true,
      false,
    ]);
  });

  test('in inches, a reading of just the limit that is printed meets it, and the next sixteenth does not', () => {
    fc.assert(
      fc.property(fc.double({ min: 20, max: 20_000, noNaN: true }), (limit) => {
        const typed = (words: string) => {
          const parsed = parseLength(words, 'imperial');
          if (!parsed.ok) throw new Error(words);
          return parsed.mm;
        };
        const at = typed(formatLength(limit, 'imperial'));
        const check = { expected: limit - 5, least: null, greatest: limit };
        expect(readingVerdict(check, at).within).toBe(true);
        expect(readingVerdict(check, at + 25.4 / 16).within).toBe(false);
      }),
    );
  });

  test('says by how much it is off and past its limit, in either display system', () => {
    const verdict = readingVerdict(joint, 8);
    expect(verdict).toEqual({ within: false, off: 5, past: 3 });
    expect(verdictWords(verdict, 'metric')).toBe(
      'Not within: 5\u202fmm over what is drawn, 3\u202fmm past what will do.',
    );
    // 5 mm = 3/16 in and 3 mm = 1/8 in to the nearest sixteenth.
    expect(verdictWords(verdict, 'imperial')).toBe(
      'Not within: 3/16" over what is drawn, 1/8" past what will do.',
    );
    expect(verdictWords(readingVerdict(joint, 3), 'metric')).toBe('Within: just as drawn.');
    expect(verdictWords(readingVerdict(joint, 2), 'metric')).toBe(
      'Within: 1\u202fmm under what is drawn.',
    );
  });

  test('what no sixteenth shows is not said as 0 inches', () => {
    const edge = { expected: 6400, least: 6391, greatest: 6409 };
    // 20 ft 11 15/16 in is 6399.2125 mm, as the edge itself is printed in inches (1 in = 25.4 mm exactly, NIST SP 811).
    const read = readingVerdict(edge, (20 * 12 + 11 + 15 / 16) * 25.4);
    expect(verdictWords(read, 'imperial')).toBe('Within: just as drawn.');
    expect(verdictWords(read, 'metric')).toBe('Within: 0.8\u202fmm under what is drawn.');
    expect(verdictWords({ within: false, off: 9.6, past: 0.6 }, 'imperial')).toBe(
      'Not within: 3/8" over what is drawn, just past what will do.',
    );
  });

  test('without a limit on a side there is none to break there', () => {
    expect(readingVerdict({ expected: 40, least: 6, greatest: null }, 4000).within).toBe(true);
    expect(readingVerdict({ expected: 40, least: 6, greatest: null }, 5).within).toBe(false);
    expect(allowedWords({ least: 6, greatest: null }, 'metric')).toBe('at least 6\u202fmm');
    expect(allowedWords({ least: null, greatest: 10 }, 'metric')).toBe('at most 10\u202fmm');
    expect(allowedWords({ least: null, greatest: null }, 'metric')).toBeNull();
  });

  test('on every check of a floor, what is drawn is within, and what is not within has something to do', () => {
    const { checks } = setOut(layFloor(COURT_CHEQUER));
    expect(checks.length).toBeGreaterThan(10);
    for (const check of checks) {
      const drawn = readingVerdict(check, check.expected);
      expect(drawn.within, check.id).toBe(true);
      expect(readingRemedy(check, drawn), check.id).toBeNull();
      for (const measured of [
        ...(check.least === null ? [] : [check.least - 1]),
        ...(check.greatest === null ? [] : [check.greatest + 1]),
      ]) {
        const verdict = readingVerdict(check, measured);
        expect(verdict.within, check.id).toBe(false);
        expect(readingRemedy(check, verdict), check.id).toMatch(/\w+.*\.$/);
      }
    }
  });
});

import { expect, test } from 'vitest';
import { choicesShown } from '@/components/drafting/fit/choices-shown';
import type { FitChoice } from '@/paving/fit/fit';

const choice = (wholeUnits: number, play: number): FitChoice => ({
  wholeUnits,
  play,
  leastGap: play,
  placement: { origin: [0, 0], turn: 0 },
});

test('a short trade-off is shown whole, but for choices that would look the same', () => {
  const [a, b, c] = [choice(10, 0.12), choice(9, 0.18), choice(8, 5)];
  expect(choicesShown([a, b, c], 6)).toEqual([a, c]);
  expect(choicesShown([], 6)).toEqual([]);
});

test('of a long one the first, the last and others between are shown, each with the most units for its play', () => {
  // 200 choices, from 0.1 mm to more than 30 mm of play.
  const choices = Array.from({ length: 200 }, (_, n) => choice(20_000 - n, 0.1 * 1.03 ** n));
  const shown = choicesShown(choices, 6);
  expect(shown).toHaveLength(6);
  expect(shown[0]).toBe(choices[0]);
  expect(shown[5]).toBe(choices[199]);
  for (let n = 1; n < 6; n++) {
    expect(shown[n].play).toBeGreaterThan(shown[n - 1].play);
    expect(shown[n].wholeUnits).toBeLessThan(shown[n - 1].wholeUnits);
  }
  // A crew that wants a few millimetres finds them: the steps do not leave out whole decades.
  expect(shown.some(({ play }) => play > 2 && play < 8)).toBe(true);
});

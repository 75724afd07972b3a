import { expect, test } from 'vitest';
import { stepsRun, stepsWithRests, type Steps } from '@/server/steps';

function* long(turns: number): Steps<number> {
  let sum = 0;
  for (let n = 0; n < turns; n++) {
    for (let m = 0; m < 200_000; m++) sum += Math.sin(m);
    yield;
  }
  return sum;
}

test('work in steps comes to the same with rests and without, and others have their turn in the rests', async () => {
  let turns = 0;
  let over = false;
  const other = () => {
    turns += 1;
    if (!over) setImmediate(other);
  };
  setImmediate(other);
  const rested = await stepsWithRests(long(60));
  over = true;
  expect(rested).toBe(stepsRun(long(60)));
  expect(turns).toBeGreaterThan(1);
});

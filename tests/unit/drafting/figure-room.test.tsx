import { expect, test } from 'vitest';
import { figureRoom, type Box } from '@/components/drafting/figure-room';

test('a figure has room just where it stands on nothing that is taken', () => {
  const room = figureRoom();
  const taken: Box[] = [
    { at: [100, 100], half: [30, 9] },
    { at: [500, 40], half: [200, 9] },
    { at: [-20, -20], half: [9, 9] },
  ];
  taken.forEach(room.take);
  for (let x = -60; x <= 800; x += 7)
    for (let y = -60; y <= 200; y += 7) {
      const box: Box = { at: [x, y], half: [22, 9] };
      const clear = taken.every(
        ({ at, half }) => Math.abs(at[0] - x) >= half[0] + 22 || Math.abs(at[1] - y) >= half[1] + 9,
      );
      expect(room.free(box), `${x} ${y}`).toBe(clear);
    }
});

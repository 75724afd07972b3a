import { expect, it } from 'vitest';
import { orderBars } from '@/components/guide/order-picture';

it('the guide’s bars are of voids, margin, bedding, base and spoil, the greatest right across', () => {
  const bars = orderBars();
  const names = bars.map(({ name }) => name.split(':')[0]);
  expect(names).toEqual([
    'Voids of the pattern',
    'Margin along the edges',
    'Bedding',
    'Base',
    'Spoil to cart away',
  ]);
  expect(Math.max(...bars.map(({ loose }) => loose))).toBe(100);
  for (const { inPlace, loose, words } of bars) {
    expect(inPlace).toBeLessThan(loose);
    expect(words).toMatch(/loose/);
  }
});

import { expect, test } from 'vitest';
import { fitPicture } from '@/components/guide/fit-pictures';
import { layFloor } from '@/paving/laying';
import { floorReport } from '@/paving/report';

test('the floors beside the guide’s shift map lay what is said of them', () => {
  const { choices } = fitPicture();
  expect(choices).toHaveLength(2);
  for (const { choice, document } of choices) {
    const report = floorReport(layFloor(document));
    expect(report.wholeUnits).toBe(choice.wholeUnits);
    expect(report.play).toBeCloseTo(choice.play, 6);
  }
  expect(choices[1].choice.play).toBeGreaterThan(choices[0].choice.play);
});

test('the region of one unit’s middle is drawn as closed rings: one inside the edge, one about the keep-out', () => {
  const { region } = fitPicture();
  const paths = [...region.matchAll(/ d="([^"]*)"/g)].map(([, d]) => d);
  const rings = paths[1].split('Z').filter(Boolean);
  expect(rings).toHaveLength(2);
  for (const ring of rings) {
    const places = ring
      .split(/[MLA]/)
      .filter(Boolean)
      .map((part) => part.trim().split(' ').slice(-2).map(Number));
    const [first, last] = [places[0], places[places.length - 1]];
    expect(Math.hypot(last[0] - first[0], last[1] - first[1])).toBeLessThan(0.2);
  }
});

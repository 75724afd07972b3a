import { describe, expect, it } from 'vitest';
import {
  differenceHeading,
  differenceSentence,
  figureRows,
} from '@/components/compare/difference-words';
import { floorComparison } from '@/paving/comparison';
import type { LayoutDocument } from '@/paving/layout-document';
import { layFloor } from '@/paving/laying';

/** Ten by ten slabs of 300 mm with no joint in 3 m by 3 m: counted by hand. */
const TEN_BY_TEN: LayoutDocument = {
  schema: 'evenlay/layout@1',
  display: 'metric',
  ground: { perimeter: [[0, 0], [3000, 0], [3000, 3000], [0, 3000]], keepOuts: [] }, // prettier-ignore
  units: [{ id: 'a', name: 'Slab 300', length: 300, width: 300, thickness: 40 }],
  bond: { kind: 'stack', unit: 'a', joint: 0 },
  placement: { origin: [150, 150], turn: 0 },
  clearance: 0,
  lifted: [],
  cutting: 'none',
};

const compared = (a: LayoutDocument, b: LayoutDocument) => {
  const comparison = floorComparison(layFloor(a), layFloor(b));
  return {
    heading: differenceHeading(a, b, comparison),
    sentence: differenceSentence(
      { name: 'version 1', document: a },
      { name: 'version 2', document: b },
      comparison.figures,
      comparison,
      'metric',
    ).replace(/\u202f/g, ' '),
    rows: figureRows(a, b, comparison.figures, 'metric').map(({ name, a, b, change }) =>
      [name, a, b, change].map((text) => text.replace(/\u202f/g, ' ')),
    ),
  };
};

describe('what is said of two floors', () => {
  it('says that the same floor is the same', () => {
    const { heading, sentence, rows } = compared(TEN_BY_TEN, TEN_BY_TEN);
    expect(heading).toBe('The same floor twice');
    expect(sentence).toBe('Every unit of version 2 lies where it lies in version 1.');
    expect(rows.every(([, , , change]) => change === '')).toBe(true);
  });

  it('says what cutting the edge takes, from the same start', () => {
    // Shifted by half a slab both ways: nine by nine whole, nine halves along each side and a quarter in each corner.
    const whole = { ...TEN_BY_TEN, placement: { origin: [300, 300] as [number, number], turn: 0 } };
    const { heading, sentence, rows } = compared(whole, { ...whole, cutting: 'edge' });
    expect(heading).toBe('The same floor, whole and cut');
    expect(sentence).toMatch(/^Every unit of version 2 lies where it lies in version 1; version 2 cuts 40 pieces at the edge and throws \d\.\d\d m² away\.$/); // prettier-ignore
    expect(rows).toContainEqual(['Pieces cut at the edge', '0', '40', '+40']);
    expect(rows.find(([name]) => name === 'Fill')).toEqual([
      'Fill',
      '1.71 m²',
      '0.00 m²',
      '−1.71 m²',
    ]);
    const back = compared({ ...whole, cutting: 'edge' }, whole);
    expect(back.sentence).toContain('version 2 cuts nothing at the edge');
  });

  it('counts what a shift by half a slab costs: nine rows of ten fit', () => {
    // Shifted along x by 150 mm, nine whole slabs of 300 mm fit in the 2 850 mm left: 90 of 100, 0.9 m² more bare.
    const shifted = { ...TEN_BY_TEN, placement: { origin: [300, 150] as const, turn: 0 } };
    const { heading, sentence, rows } = compared(TEN_BY_TEN, shifted as never);
    expect(heading).toBe('Two ways to start the same pattern');
    expect(sentence).toBe(
      'Version 2 has 10 fewer whole units than version 1 and leaves 0.90 m² more for fill.',
    );
    expect(rows).toContainEqual(['Whole units', '100', '90', '−10']);
    expect(rows).toContainEqual(['Fill', '0.00 m²', '0.90 m²', '+0.90 m²']);
    expect(rows).toContainEqual(['Ground', '9.00 m²', '9.00 m²', '']);
  });

  it('says how far a floor moved when nothing else is to be told', () => {
    const roomy = { ...TEN_BY_TEN, ground: { perimeter: [[0, 0], [3100, 0], [3100, 3000], [0, 3000]], keepOuts: [] } }; // prettier-ignore
    const moved = { ...roomy, placement: { origin: [190, 150], turn: 0 } };
    expect(compared(roomy as never, moved as never).sentence).toBe(
      'Version 2 has as many whole units as version 1 and has units lying up to 40 mm elsewhere.',
    );
  });

  it('names another unit and another bond, and another ground', () => {
    const halves: LayoutDocument = {
      ...TEN_BY_TEN,
      units: [{ id: 'a', name: 'Block', length: 200, width: 100, thickness: 40 }],
      bond: { kind: 'running', unit: 'a', joint: 0, shift: 0.5 },
    };
    const said = compared(TEN_BY_TEN, halves);
    expect(said.heading).toBe('Two units on the same ground');
    expect(said.sentence).toContain('takes units of 200 × 100 mm instead of 300 × 300 mm');
    expect(said.sentence).toContain('changes the bond from stack to running');
    const wider: LayoutDocument = {
      ...TEN_BY_TEN,
      ground: { perimeter: [[0, 0], [3600, 0], [3600, 3000], [0, 3000]], keepOuts: [] }, // prettier-ignore
    };
    const ground = compared(TEN_BY_TEN, wider);
    expect(ground.heading).toBe('Two floors on different ground');
    expect(ground.sentence).toBe(
      'The ground is not the same. Version 2 has 20 more whole units than version 1.',
    );
  });
});

import { describe, expect, test } from 'vitest';
import { figured, figuredText, type FiguredWords } from '@/paving/figured-words';
import { layFloor } from '@/paving/laying';
import { parseLength, type Display } from '@/paving/length';
import { setOut } from '@/paving/set-out/set-out';
import { documentOf, parsed } from '../../oracle/documents';

const FLOOR = {
  ground: {
    perimeter: [
      [0, 0],
      [12_000, 0],
      [12_000, 9000],
      [0, 9000],
    ] as [number, number][],
    keepOuts: [
      {
        name: 'Round bed',
        ring: [
          [5500, 4000, 1],
          [6500, 4000, 1],
        ] as [number, number, number][],
      },
    ],
  },
};

/** Every sentence of a set-out, as a reader of that tape gets it. */
function sentences(drawnIn: Display, readIn: Display) {
  const found = setOut(layFloor(parsed(documentOf({ ...FLOOR, display: drawnIn }))));
  const text = (words: FiguredWords) => figuredText(words, readIn);
  return {
    checks: found.checks.map(({ id, what }) => [id, text(what)] as const),
    points: found.points.map(({ name, what }) => [name, text(what)] as const),
    advice: found.advice.map((advice) => text(advice.text)),
  };
}

describe('sentences with lengths', () => {
  test('no millimetre is left in a set-out read in feet and inches, nor an inch in one read in millimetres', () => {
    for (const drawnIn of ['metric', 'imperial'] as const) {
      const feet = sentences(drawnIn, 'imperial');
      for (const words of [...feet.checks.flat(), ...feet.points.flat(), ...feet.advice])
        expect(words).not.toMatch(/mm\b/);
      const millimetres = sentences(drawnIn, 'metric');
      for (const words of [
        ...millimetres.checks.flat(),
        ...millimetres.points.flat(),
        ...millimetres.advice,
      ])
        expect(words).not.toMatch(/\d["']/);
    }
  });

  /** NIST SP 811, B.8: the inch is 25.4 mm. Sixteenths of an inch are the finest that is printed: half of one is 0.8 mm. */
  test('a 3-4-5 of a floor drawn in millimetres reads the same lengths on a tape in inches', () => {
    const own = new Map(sentences('metric', 'metric').checks).get('square-A')!;
    const inches = new Map(sentences('metric', 'imperial').checks).get('square-A')!;
    const [three, four] = [...own.matchAll(/([\d\u202f]+)\u202fmm/g)].map(([, mm]) =>
      Number(mm.replace(/\u202f/g, '')),
    );
    const said = [...inches.matchAll(/(\d+' [\d /]+")/g)].map(([, length]) =>
      parseLength(length, 'imperial'),
    );
    expect([three, four]).toEqual([6000, 8000]);
    expect(said).toHaveLength(2);
    said.forEach((length, n) => {
      expect(length.ok && Math.abs(length.mm - [three, four][n])).toBeLessThanOrEqual(25.4 / 32);
    });
  });

  /** ICPI, Construction Tolerances for Interlocking Concrete Pavements: under a 10 ft (3 m) straightedge. */
  test('the straightedge is the round one of either tape', () => {
    for (const drawnIn of ['metric', 'imperial'] as const) {
      const of = (readIn: Display) => new Map(sentences(drawnIn, readIn).checks).get('flatness')!;
      expect(of('imperial')).toContain("a 10' straightedge");
      expect(of('metric')).toContain('a 3\u202f000\u202fmm straightedge');
    }
  });

  test('words without lengths, and parts that are numbers, are said as they are', () => {
    expect(figuredText('Width of any joint', 'metric')).toBe('Width of any joint');
    expect(figuredText(figured`${3} of ${'them'}, ${{ mm: 25.4 }} each`, 'imperial')).toBe(
      '3 of them, 1" each',
    );
  });
});

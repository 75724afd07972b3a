import { describe, expect, it } from 'vitest';
import { floorPicture, sheetPicture, wholeUnits } from '@/components/guide/guide-pictures';
import { levelPicturesOf, SLOPING_COURT } from '@/components/guide/level-pictures';
import { BARE_GROUND, BOND_PATCHES, COURT, startedAt } from '@/components/guide/sample-floors';
import { setOutPictureOf } from '@/components/guide/set-out-pictures';
import { parseLayoutDocument } from '@/paving/layout-validation';

describe('the guide’s pictures', () => {
  it('are of floors that can be laid, one for each kind of bond but one’s own', () => {
    const kinds = BOND_PATCHES.map(([, document]) => document.bond.kind);
    expect(new Set(kinds).size).toBe(7);
    for (const [name, document] of BOND_PATCHES) {
      expect(parseLayoutDocument(document), name).toMatchObject({ ok: true });
      expect(wholeUnits(document), name).toBeGreaterThan(8);
    }
  });

  it('show bare ground without a unit, and a better start with more units than the first', () => {
    expect(wholeUnits(BARE_GROUND)).toBe(0);
    expect(wholeUnits(startedAt(234, 234))).toBeGreaterThan(wholeUnits(startedAt(0, 0)));
  });

  it('figure the ground and give gaps where the text speaks of them', () => {
    expect(floorPicture(BARE_GROUND, 'ground')).not.toContain('gap ');
    expect(floorPicture(COURT, 'gaps')).toContain('gap ');
    expect(sheetPicture(COURT)).toContain('Issued for set-out');
  });

  it('show the edge’s point in the words of the set-out, and a worse crossing as a wider one', () => {
    const { floorWords, crossings, stringWords } = setOutPictureOf(COURT);
    expect(floorWords).toMatch(/The tapes meet at \d+°/);
    expect(crossings).toHaveLength(2);
    const [good, bad] = crossings.map(({ words }) => Number(/within ([\d.]+)/.exec(words)![1]));
    // At a right angle 2 mm on each tape is 2.83 mm; nothing is fixed better.
    expect(good).toBeGreaterThanOrEqual(2.8);
    expect(bad).toBeGreaterThan(good);
    expect(stringWords).toMatch(/\d+ units/);
  });

  it('show earth dug and low ground made up, with a key to all that is on the map', () => {
    expect(parseLayoutDocument(SLOPING_COURT)).toMatchObject({ ok: true });
    const { key, map, section, screed, cut } = levelPicturesOf(SLOPING_COURT);
    expect(key.map(({ text }) => text.split(',')[0])).toEqual([
      'Earth to dig',
      'Low ground to make up with base',
      'Where nothing is dug or made up',
      'The ground as it is',
      'A spot and its level',
      'The floor falls this way',
      'A peg and the level of the finish',
    ]);
    expect(cut).toMatch(/^\d/);
    expect(map).toContain('A −94');
    expect(section).toContain('Geotextile');
    expect(screed).toContain('below the ears');
  });
});

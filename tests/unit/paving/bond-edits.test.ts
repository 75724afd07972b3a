import { describe, expect, it } from 'vitest';
import {
  BOND_KINDS,
  bondChosen,
  mainUnit,
  motifExtended,
  twoToOneJoint,
  unitAdded,
  unitChanged,
} from '@/paving/bond-edits';
import type { LayoutDocument } from '@/paving/layout-document';
import { parseLayoutDocument } from '@/paving/layout-validation';
import { STARTER_CATALOGUE } from '@/paving/starter-catalogue';
import { COURT_CHEQUER } from '@/server/demo-layouts';

const withUnit = (index: number): LayoutDocument => {
  const { system: _system, ...sizes } = STARTER_CATALOGUE[index];
  return {
    ...COURT_CHEQUER,
    units: [{ id: 'a', ...sizes }],
    bond: { kind: 'stack', unit: 'a', joint: 3 },
  };
};

it('offers every bond that the catalogue’s units can be laid in, and each one offered can be laid', () => {
  STARTER_CATALOGUE.forEach((_, index) => {
    for (const kind of BOND_KINDS) {
      const choice = bondChosen(withUnit(index), kind);
      if (!choice.ok) expect(choice.message).toMatch(/^Needs/);
      else
        expect(parseLayoutDocument(choice.document), `${index} ${kind}`).toMatchObject({
          ok: true,
        });
    }
  });
});

describe('a unit changed under its bond', () => {
  const herringbone = bondChosen(withUnit(0), 'herringbone');
  const pinwheel = bondChosen(COURT_CHEQUER, 'pinwheel');
  if (!herringbone.ok || !pinwheel.ok) throw new Error('both can be chosen');

  it('stays twice as long as wide in herringbone when one side is typed', () => {
    const { document } = unitChanged(herringbone.document, 'a', { length: 250 });
    expect(document.bond.kind).toBe('herringbone');
    expect(mainUnit(document)).toMatchObject({ length: 250, width: 125 });
    expect(parseLayoutDocument(document).ok).toBe(true);
  });

  it('takes the joint that fits when both sides are given, and gives way when none does', () => {
    const fitted = unitChanged(herringbone.document, 'a', { length: 215, width: 102.5 });
    expect(fitted.document.bond).toMatchObject({ kind: 'herringbone', joint: 10 });
    expect(fitted.said).toContain('10 mm');
    const square = unitChanged(herringbone.document, 'a', { length: 450, width: 450 });
    expect(square.document.bond.kind).toBe('running');
    expect(square.said).toContain('running bond');
  });

  it('keeps both squares of a pinwheel square, at any size smaller than the other', () => {
    const small = pinwheel.document.units[1];
    const { document, said } = unitChanged(pinwheel.document, small.id, { length: 100 });
    expect(said).toBeNull();
    expect(document.units[1]).toMatchObject({ length: 100, width: 100 });
    expect(parseLayoutDocument(document).ok).toBe(true);
  });

  it('keeps the gaps between stepping units', () => {
    const stepping = bondChosen(COURT_CHEQUER, 'stepping');
    if (!stepping.ok || stepping.document.bond.kind !== 'stepping') throw new Error('stepping');
    const before = stepping.document.bond;
    const { document } = unitChanged(stepping.document, before.unit, { length: 600 });
    expect(document.bond).toMatchObject({ pitch: [before.pitch[0] + 150, before.pitch[1]] });
  });
});

it('makes room for one more unit, and for a second size, in a bond of one’s own', () => {
  for (const kind of BOND_KINDS) {
    const chosen = bondChosen(withUnit(0), kind);
    if (!chosen.ok) continue;
    const own = bondChosen(chosen.document, 'custom');
    if (!own.ok) throw new Error(own.message);
    const added = unitAdded(own.document);
    expect(added.units).toHaveLength(own.document.units.length + 1);
    if (['stack', 'running', 'chequer', 'stepping'].includes(kind))
      expect(parseLayoutDocument(motifExtended(added)), kind).toMatchObject({ ok: true });
  }
});

it('knows the joint that makes a unit two to one', () => {
  const unit = { id: 'a', name: 'x', thickness: 60 };
  expect(twoToOneJoint({ ...unit, length: 200, width: 100 })).toBe(0);
  // The layout document’s own example: 203 × 100 with a 3 mm joint.
  expect(twoToOneJoint({ ...unit, length: 203, width: 100 })).toBe(3);
  expect(twoToOneJoint({ ...unit, length: 450, width: 450 })).toBeNull();
});

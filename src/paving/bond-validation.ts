import { latticeCell, latticeReduced } from '@/geometry/lattice';
import { rectangleOverlap, type PlacedRectangle } from '@/geometry/rectangle';
import { pointTurned, rotation } from '@/geometry/rotation';
import { LENGTH_TOLERANCE_MM } from '@/geometry/tolerance';
import { bondPattern, documentUnit, type BondPattern } from './bond';
import { shownMm, shownPlace, type DocumentProblem } from './document-problem';
import type { LayoutDocument, Unit } from './layout-document';

/** Two lattice vectors whose angle has a sine below this are parallel. */
const LEAST_SINE = 1e-9;
/** Pairs of neighbours looked at before a lattice is judged too fine for its units. */
const GREATEST_NEIGHBOURS = 200_000;

function unitNames({ bond }: LayoutDocument): { id: string; path: (string | number)[] }[] {
  if (bond.kind === 'custom') {
    return bond.motif.map(({ unit }, n) => ({ id: unit, path: ['bond', 'motif', n, 'unit'] }));
  }
  const names = [{ id: bond.unit, path: ['bond', 'unit'] as (string | number)[] }];
  if (bond.kind === 'pinwheel') names.push({ id: bond.small, path: ['bond', 'small'] });
  return names;
}

function unitIdProblems(document: LayoutDocument): DocumentProblem[] {
  const problems: DocumentProblem[] = [];
  const ids = new Set<string>();
  document.units.forEach(({ id }, n) => {
    if (ids.has(id)) {
      problems.push({
        path: ['units', n, 'id'],
        message: `"${id}" is the id of an earlier unit; give each unit its own`,
      });
    }
    ids.add(id);
  });
  for (const { id, path } of unitNames(document)) {
    if (!ids.has(id)) {
      const known = [...ids].map((name) => `"${name}"`).join(', ');
      problems.push({ path, message: `there is no unit "${id}"; the document has ${known}` });
    }
  }
  return problems;
}

const sizeOf = (unit: { length: number; width: number }) =>
  `${shownMm(unit.length)} × ${shownMm(unit.width)}`;

/** Baskets and herringbones need units twice as long as wide, with the joint. */
function twoToOneProblem(
  { length, width }: Unit,
  joint: number,
  kind: string,
): DocumentProblem | null {
  if (Math.abs(length - 2 * width - joint) <= LENGTH_TOLERANCE_MM) return null;
  const size = sizeOf({ length, width });
  const own = length - 2 * width;
  const needs =
    own > -LENGTH_TOLERANCE_MM
      ? `a ${size} unit needs a ${shownMm(Math.max(0, own))} mm joint`
      : `a ${size} unit is less than twice as long as it is wide, and no joint makes up for that`;
  const fits = sizeOf({ length: 2 * width + joint, width });
  return {
    path: ['bond', 'unit'],
    message: `does not make a ${kind}: ${needs}; for a ${shownMm(joint)} mm joint use ${fits}`,
  };
}

function pinwheelProblems(unit: Unit, small: Unit): DocumentProblem[] {
  const problems: DocumentProblem[] = [];
  for (const [each, path] of [
    [unit, ['bond', 'unit']],
    [small, ['bond', 'small']],
  ] as const) {
    if (Math.abs(each.length - each.width) > LENGTH_TOLERANCE_MM) {
      const square = shownMm(each.width);
      problems.push({
        path: [...path],
        message: `a pinwheel needs square units, and this one is ${sizeOf(each)}; use ${square} × ${square}`,
      });
    }
  }
  if (problems.length === 0 && small.length >= unit.length - LENGTH_TOLERANCE_MM) {
    problems.push({
      path: ['bond', 'small'],
      message: `must be smaller than the pinwheel's larger unit; use one under ${shownMm(unit.length)} × ${shownMm(unit.length)}`,
    });
  }
  return problems;
}

function bondRuleProblems(document: LayoutDocument): DocumentProblem[] {
  const { bond } = document;
  if (bond.kind === 'basket' || bond.kind === 'herringbone') {
    const problem = twoToOneProblem(documentUnit(document, bond.unit), bond.joint, bond.kind);
    return problem ? [problem] : [];
  }
  if (bond.kind === 'pinwheel') {
    return pinwheelProblems(documentUnit(document, bond.unit), documentUnit(document, bond.small));
  }
  return [];
}

/**
 * Two units of the pattern nearer than `leastGap`, mm (below 0: overlapping by more than that),
 * or null. Each unit is held against the others and against its own repeats at every lattice
 * vector near enough to matter, in the lattice's shortest basis, however skewed it was given.
 */
function patternClash(document: LayoutDocument, pattern: BondPattern, leastGap: number) {
  const { a, b } = latticeReduced(pattern);
  const cell = latticeCell({ a, b });
  const rectangles = pattern.motif.map((entry) => {
    const { length, width } = documentUnit(document, entry.unit);
    const turn = rotation(entry.turn);
    return {
      entry,
      reach: Math.hypot(length, width) / 2,
      rectangle: {
        centre: entry.at,
        halfLength: pointTurned([length / 2, 0], turn),
        halfWidth: pointTurned([0, width / 2], turn),
      } as PlacedRectangle,
    };
  });
  const lengthA = Math.hypot(a[0], a[1]);
  const rowHeight = cell / lengthA;
  let looked = 0;
  for (let k = 0; k < rectangles.length; k++) {
    for (let l = k; l < rectangles.length; l++) {
      const one = rectangles[k];
      const other = rectangles[l];
      const reach = one.reach + other.reach + leastGap;
      const dx = other.entry.at[0] - one.entry.at[0];
      const dy = other.entry.at[1] - one.entry.at[1];
      const across = (a[0] * dy - a[1] * dx) / lengthA;
      const along = (a[0] * dx + a[1] * dy) / lengthA;
      const step = (a[0] * b[0] + a[1] * b[1]) / lengthA;
      // A unit meets its own repeats in pairs: half of them are enough.
      const itself = k === l;
      const last = Math.floor((reach - across) / rowHeight);
      for (let n = itself ? 0 : Math.ceil((-reach - across) / rowHeight); n <= last; n++) {
        const offset = along + n * step;
        const end = Math.floor((reach - offset) / lengthA);
        const begin = itself && n === 0 ? 1 : Math.ceil((-reach - offset) / lengthA);
        for (let m = begin; m <= end; m++) {
          if (++looked > GREATEST_NEIGHBOURS) return { k, l, gap: null, at: one.entry.at };
          const x = m * a[0] + n * b[0];
          const y = m * a[1] + n * b[1];
          const centre = [other.entry.at[0] + x, other.entry.at[1] + y] as const;
          const gap = -rectangleOverlap(one.rectangle, { ...other.rectangle, centre });
          if (gap < leastGap) return { k, l, gap, at: centre };
        }
      }
    }
  }
  return null;
}

function latticeProblem({ a, b }: BondPattern): DocumentProblem | null {
  const sine = Math.abs(latticeCell({ a, b })) / (Math.hypot(...a) * Math.hypot(...b));
  if (sine > LEAST_SINE) return null;
  const none = a.every((value) => value === 0) ? 'a' : b.every((value) => value === 0) ? 'b' : null;
  return {
    path: none ? ['bond', none] : ['bond', 'b'],
    message: none
      ? 'must not be [0, 0]; it is the step from one unit to its next repeat'
      : 'runs along a, so the pattern would never leave one line; turn it away from a',
  };
}

function overlapProblem(document: LayoutDocument, pattern: BondPattern): DocumentProblem | null {
  const { bond } = document;
  const stepping = bond.kind === 'stepping';
  const cell = Math.abs(latticeCell(pattern));
  const covered = pattern.motif.reduce((sum, { unit }) => {
    const { length, width } = documentUnit(document, unit);
    return sum + length * width;
  }, 0);
  const path = bond.kind === 'custom' ? ['bond', 'motif'] : ['bond', stepping ? 'pitch' : 'unit'];
  const clash = patternClash(
    document,
    pattern,
    stepping ? LENGTH_TOLERANCE_MM : -LENGTH_TOLERANCE_MM,
  );
  if (!clash) return null;
  if (stepping) {
    const unit = documentUnit(document, bond.unit);
    return {
      path,
      message: `makes the units touch; for ${sizeOf(unit)} units use more than ${shownMm(unit.length)} along and ${shownMm(unit.width)} across`,
      at: clash.at,
    };
  }
  const full = `the units cover ${shownMm(covered)} mm² of a repeat of ${shownMm(cell)} mm²`;
  if (clash.gap === null) {
    return { path, message: `repeats too closely for its units: ${full}; lengthen a or b` };
  }
  const which =
    clash.k === clash.l
      ? `unit ${clash.k + 1} of the pattern overlaps its own repeat`
      : `units ${clash.k + 1} and ${clash.l + 1} of the pattern overlap`;
  return {
    path: bond.kind === 'custom' ? [...path, clash.l] : path,
    message: `${which} by ${shownMm(-clash.gap)} mm at ${shownPlace(clash.at)} of the pattern${covered > cell ? ` (${full})` : ''}; move them apart or lengthen a or b`,
  };
}

/** Everything wrong with the units and the bond of a document whose shape is right. */
export function bondProblems(document: LayoutDocument): DocumentProblem[] {
  const ids = unitIdProblems(document);
  if (ids.length > 0) return ids;
  const rules = bondRuleProblems(document);
  if (rules.length > 0) return rules;
  const pattern = bondPattern(document);
  const lattice = latticeProblem(pattern);
  if (lattice) return [lattice];
  const overlap = overlapProblem(document, pattern);
  return overlap ? [overlap] : [];
}

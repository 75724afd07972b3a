import { bondPattern, documentUnit } from '../bond';
import type { LayoutDocument, Unit } from '../layout-document';
import { formatLength } from '../length';
import { TAPE_READING_MM } from '../set-out/tape-cross';
import type { ActualUnit, UnitMeasure } from './creep-types';

/** Units that differ from their nominal size by more than this part were counted wrongly. */
const GREATEST_DEVIATION = 0.1;
/** No more units than this are laid tight to be measured. */
const MOST_MEASURED = 1000;

const usedUnits = (document: LayoutDocument): Unit[] =>
  [...new Set(bondPattern(document).motif.map(({ unit }) => unit))].map((id) =>
    documentUnit(document, id),
  );

/** Why these measures cannot be worked with, and what would do; null when they can. */
export function measureProblem(
  document: LayoutDocument,
  measures: readonly UnitMeasure[],
): string | null {
  const { display } = document;
  for (const { unit: id, side, count, total } of measures) {
    const unit = usedUnits(document).find((used) => used.id === id);
    if (!unit) return 'That unit is not laid on this floor; measure one that is.';
    if (!Number.isInteger(count) || count < 1 || count > MOST_MEASURED)
      return `The number of units measured is a whole number from 1 to ${MOST_MEASURED}; ten is a good one.`;
    if (!(total > 0 && Number.isFinite(total)))
      return 'Type the length that the units came to, from the first side to the last.';
    const mean = total / count;
    if (Math.abs(mean / unit[side] - 1) > GREATEST_DEVIATION) {
      const shown = (mm: number) => formatLength(mm, display, { decimals: 1 });
      return `That makes one ${unit.name} ${shown(mean)} where ${shown(unit[side])} is planned. Look whether ${count} is the right number, and whether the ${side} lay along the tape.`;
    }
  }
  return null;
}

/**
 * The units that the bond uses, as they are: the mean of what was measured, else as planned. A square unit's
 * one measured side stands for both. The measures must have passed `measureProblem`.
 */
export function actualUnits(
  document: LayoutDocument,
  measures: readonly UnitMeasure[],
): ActualUnit[] {
  return usedUnits(document).map(({ id, name, length, width }): ActualUnit => {
    const of = (side: 'length' | 'width') => {
      const mine = measures.filter((measure) => measure.unit === id);
      const own = mine.filter((measure) => measure.side === side);
      const used = own.length === 0 && length === width ? mine : own;
      const count = used.reduce((sum, measure) => sum + measure.count, 0);
      if (count === 0) return null;
      const total = used.reduce((sum, measure) => sum + measure.total, 0);
      return { size: total / count, doubt: (used.length * TAPE_READING_MM) / count };
    };
    const long = of('length');
    const wide = of('width');
    return {
      unit: id,
      name,
      length: long?.size ?? length,
      width: wide?.size ?? width,
      lengthGrowth: long ? long.size - length : 0,
      lengthDoubt: long?.doubt ?? 0,
      widthGrowth: wide ? wide.size - width : 0,
      widthDoubt: wide?.doubt ?? 0,
    };
  });
}

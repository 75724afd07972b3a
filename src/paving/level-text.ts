import { formatLength, type Display } from './length';

/** Less than this, mm, is level with the edge: nobody reads it off a tape. */
const FLUSH_MM = 0.5;

/** A level as it is measured from the top of the edge with a tape: `12 mm below the edge`. */
export function levelText(mm: number, display: Display): string {
  if (Math.abs(mm) < FLUSH_MM) return 'flush with the edge';
  return `${formatLength(Math.abs(mm), display)} ${mm < 0 ? 'below' : 'above'} the edge`;
}

/** A level as a figure with its sign, for tables and drawings: `−12`, `+5`, `0`; inches keep their mark. */
export function levelFigure(mm: number, display: Display): string {
  const figures = formatLength(mm, display, { unit: false });
  return mm >= FLUSH_MM ? `+${figures}` : figures;
}

/** Metres along for one down are said up to this many; beyond, the per cent alone tells more. */
const MOST_ONE_IN = 400;

/** A fall as the trade says it: `1 in 50`; empty where it hardly falls. */
export function oneInText(percent: number): string {
  const along = 100 / percent;
  return along > MOST_ONE_IN ? '' : `1 in ${Number(along.toFixed(along < 20 ? 1 : 0))}`;
}

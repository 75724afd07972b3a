import { figuresCompared, type FigureComparison, type Figures } from './figure-comparison';
import type { Laying } from './laying';
import { floorReport } from './report';
import { unitsMatched, type UnitMatching } from './unit-matching';

export { MOVED_MM, UNIT_FATE, type UnitMatching } from './unit-matching';
export type { FigureChange, FigureComparison, Figures, KindChange } from './figure-comparison';

/** What has changed from floor A to floor B. */
export interface FloorComparison extends UnitMatching {
  readonly figures: FigureComparison;
}

/**
 * Compares two floors: which units are kept, moved, gone and new (`unitsMatched` says how they are told),
 * and their figures with differences. `figures` may be handed in when they are worked out already,
 * as those of saved versions are.
 */
export function floorComparison(
  a: Laying,
  b: Laying,
  figures: readonly [Figures, Figures] = [floorReport(a), floorReport(b)],
): FloorComparison {
  return {
    ...unitsMatched(a, b),
    figures: figuresCompared(a.document, figures[0], b.document, figures[1]),
  };
}

import type { Laying } from '../laying';
import type { LayoutDocument } from '../layout-document';
import { setOut, type SetOut } from '../set-out/set-out';
import { keptJoints } from './actual-pattern';
import { actualUnits } from './actual-units';
import type { ActualUnit, RefitInput, RefitResult } from './creep-types';
import { freshFit } from './fresh-fit';
import { refitAnswer } from './refit-answer';
import { refitFloor, type Choice } from './refit-floor';
import { refitSearches } from './refit-freedom';
import { refitProblem } from './refit-problem';
import type { SearchResult } from './refit-search';
import { restSearched } from './rest-search';
import { tradeJoints } from './trade-joints';

export type * from './creep-types';

/**
 * The joint for the courses still to lay, with those laid held where they are and the units as they are: all units kept
 * whole if any joint within the limits does that, with the widest least gap; else as many as can be. First the joint along
 * the courses is left as it was laid, so that joints stay in line; only where that loses units is it changed too. The answer is
 * laid by the ordinary laying before it is given; a disagreement throws, with the place.
 */
export function refit(
  laying: Laying,
  input: RefitInput,
  { courses }: Pick<SetOut, 'courses'> = setOut(laying),
): RefitResult {
  const { document } = laying;
  const problem = refitProblem(document, courses, input);
  if (problem) return { ok: false, message: problem };
  const units = actualUnits(document, input.measures);
  const limits = input.joints ?? tradeJoints(document);
  if (input.laid.length === 0) return { ok: true, refit: freshFit(laying, units, limits) };

  const floor = refitFloor(laying, courses, input);
  if (floor.rest.length === 0)
    return {
      ok: true,
      refit: refitAnswer(laying, floor, units, keptChoice(document, units), null),
    };
  const searches = refitSearches(document, units, limits, input.shift ?? 0);
  let best: { result: SearchResult; choice: Choice } | null = null;
  for (const search of searches) {
    const result = restSearched(laying, floor, units, search);
    if (!best || result.kept > best.result.kept)
      best = { result, choice: search.choice(result.values) };
    if (best.result.kept === floor.rest.length) break;
  }
  return { ok: true, refit: refitAnswer(laying, floor, units, best!.choice, best!.result) };
}

const keptChoice = (document: LayoutDocument, units: readonly ActualUnit[]): Choice => ({
  joints: keptJoints(document, units),
  shift: 0,
});

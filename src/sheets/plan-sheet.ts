import type { Laying } from '@/paving/laying';
import type { Arrangement, FiguredContent } from './figured-sheet';
import { bestArrangement, figuredDrafts } from './figured-sheet';
import { keepOutPlace } from './keep-out-place';
import type { PaperName } from './paper';
import { planDrawing } from './plan-drawing';
import type { PlanInput } from './plan-input';
import type { PlanFacts } from './plan-panel';
import { planPanelRows } from './plan-panel';
import { pointsBounds } from './plan-view';
import type { NumberedSheet, SheetDraft } from './sheet-draft';
import { sheetsNumbered } from './sheet-draft';
import { startPoint } from './start-point';
import { layingTinted } from './unit-drawing';

/** Characters. */
const LONG_NOTES = 400;
/** A smaller unit on paper than this, mm, asks for a larger sheet where one would be to a larger scale. */
export const READABLE_UNIT = 3;

/**
 * The plan of a version on the paper asked for, or with `auto` on the smallest of its family (A4 and A3;
 * Letter and Tabloid for imperial) that shows units well. The first sheet has the plan; more
 * follow when the figures of its edges and notes need them.
 */
export function planDrafts(given: PlanInput): readonly SheetDraft[] {
  const laying = layingTinted(given.laying);
  const facts: PlanFacts = {
    input: { ...given, laying },
    start: startPoint(laying),
    keepOuts: laying.ground.rings.slice(1).map((ring) => keepOutPlace(laying.ground, ring)),
    asCourses: false,
  };
  const deciding = factsDeciding(facts);
  const content: FiguredContent = {
    bounds: pointsBounds(laying.ground.rings[0].edges.flatMap((edge) => edge.chords)),
    rows: (scale, width) => planPanelRows(deciding, scale, width),
    draw: (view, inside) => {
      const { layers, asCourses } = planDrawing(facts, view, inside);
      const rows = (width: number) => planPanelRows({ ...facts, asCourses }, view.scale, width);
      return { layers, rows };
    },
  };
  const arrangement = arrangementChosen(content, facts.input);
  return figuredDrafts(content, arrangement, { kind: 'plan', type: 'Floor plan' });
}

/** The plan by itself, outside a pack. */
export const planSheets = (input: PlanInput): readonly NumberedSheet[] =>
  sheetsNumbered(planDrafts(input), input);

/** Long notes go where there is room, on a further sheet if need be; they do not decide the paper. */
function factsDeciding(facts: PlanFacts): PlanFacts {
  const { laying } = facts.input;
  if ((laying.document.notes ?? '').length <= LONG_NOTES) return facts;
  const document = { ...laying.document, notes: undefined };
  return { ...facts, input: { ...facts.input, laying: { ...laying, document } } };
}

function arrangementChosen(content: FiguredContent, { laying, paper }: PlanInput): Arrangement {
  const family: readonly PaperName[] =
    laying.document.display === 'metric' ? ['A4', 'A3'] : ['Letter', 'Tabloid'];
  const best = (name: PaperName) => bestArrangement(content, name);
  if (paper !== 'auto') return best(paper);
  const [small, large] = family.map(best);
  const readable = leastUnitSide(laying) / small.scale >= READABLE_UNIT;
  // Tables on a second small sheet are better than a large sheet that shows the plan no larger.
  const enough = large.scale >= small.scale || (readable && small.sheets === 1);
  return enough ? small : large;
}

export const leastUnitSide = (laying: Laying): number =>
  Math.min(...laying.motif.map(({ unit }) => Math.min(unit.length, unit.width)));

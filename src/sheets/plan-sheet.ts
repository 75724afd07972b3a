import type { Laying } from '@/paving/laying';
import type { SetOut } from '@/paving/set-out/set-out-types';
import { boxWidth } from './drawing';
import type { Arrangement, FiguredContent, PanelRest } from './figured-sheet';
import { bestArrangement, figuredDraft, furtherDrafts } from './figured-sheet';
import { keepOutPlace } from './keep-out-place';
import { markRows } from './mark-row';
import type { PaperName } from './paper';
import type { NamedPoint } from './part-drawing';
import { partDrafts } from './part-sheet';
import { planDrawing } from './plan-drawing';
import type { PlanInput } from './plan-input';
import type { PlanFacts } from './plan-panel';
import { planPanelRows } from './plan-panel';
import type { PlanPart } from './plan-parts';
import { planParts } from './plan-parts';
import { pointsBounds } from './plan-view';
import type { NumberedSheet, SheetDraft } from './sheet-draft';
import { sheetsNumbered } from './sheet-draft';
import { startPoint } from './start-point';
import { layingTinted } from './unit-drawing';

/** A plan without its pack counts its own sheets and says so: `Plan 1/2` is no sheet of the pack’s. */
export const PLAN_SERIES = 'Plan';

/** Characters. */
const LONG_NOTES = 400;
/** Stand in for parts while it is not known yet which there are: their row is as high. */
const SOME_PARTS: readonly PlanPart[] = ['A1', 'C3'].map((name) => ({
  name,
  ground: { least: [0, 0], greatest: [0, 0] },
  left: null,
  right: null,
  above: null,
  below: null,
}));
/** A smaller unit on paper than this, mm, asks for a larger sheet where one would be to a larger scale. */
const READABLE_UNIT = 3;

/**
 * The plan of a version on the paper asked for, or with `auto` on the smallest of its family (A4 and A3;
 * Letter and Tabloid for imperial) that shows units well. The first sheet has the plan; more
 * follow when the figures of its edges and notes need them. With `named` points to go by, a plan whose units are too
 * small to be read is shown again in parts, a sheet each. `setOut` may be handed in when it is known.
 */
export function planDrafts(
  given: PlanInput,
  named: readonly NamedPoint[] | null = null,
  setOut?: SetOut,
): readonly SheetDraft[] {
  const { whole, further, parts } = planOfPack(given, named, setOut);
  return [whole, ...further(), ...parts];
}

/** The same, with what the panel has no room for still to be placed. */
export function planOfPack(
  given: PlanInput,
  named: readonly NamedPoint[] | null,
  setOut?: SetOut,
): PlanOfPack {
  const laying = layingTinted(given.laying);
  const facts: PlanFacts = {
    input: { ...given, laying },
    start: startPoint(laying, setOut),
    keepOuts: laying.ground.rings.slice(1).map((ring) => keepOutPlace(laying.ground, ring)),
    asCourses: false,
    parts: [],
  };
  const deciding = factsDeciding(facts);
  const bounds = pointsBounds(laying.ground.rings[0].outline);
  const contentWith = (parts: readonly PlanPart[]): FiguredContent => ({
    bounds,
    head: (width) => markRows(facts.input, width),
    rows: (scale, width) => {
      const inParts = named !== null && leastUnitSide(laying) / scale < READABLE_UNIT;
      return planPanelRows({ ...deciding, parts: inParts ? SOME_PARTS : [] }, scale, width);
    },
    draw: (view, inside) => {
      const { layers, asCourses } = planDrawing({ ...facts, parts }, view, inside);
      const drawn = { ...facts, asCourses, parts };
      return { layers, rows: (width: number) => planPanelRows(drawn, view.scale, width) };
    },
  });
  const arrangement = arrangementChosen(contentWith([]), facts.input);
  const made = named && planParts(laying, bounds, arrangement.paper.name, arrangement.scale);
  const content = contentWith(made?.parts ?? []);
  const drafted = { kinds: ['plan' as const], type: 'Floor plan' };
  const { draft, rest } = figuredDraft(content, arrangement, drafted);
  const inPart = named && { laying, start: facts.start, points: named };
  return {
    whole: draft,
    parts: made && inPart ? partDrafts(facts.input, inPart, made, bounds) : [],
    rest: { rows: rest, width: boxWidth(arrangement.columns[0].box), kinds: drafted.kinds },
    further: () => furtherDrafts(rest, content, arrangement, drafted),
  };
}

/** The plan, its parts, and what its panel has no room for. */
export interface PlanOfPack {
  readonly whole: SheetDraft;
  readonly parts: readonly SheetDraft[];
  readonly rest: PanelRest;
  /** The rest on sheets of its own. */
  readonly further: () => readonly SheetDraft[];
}

/** The plan by itself, outside a pack. */
export const planSheets = (input: PlanInput): readonly NumberedSheet[] =>
  sheetsNumbered(planDrafts(input), input, PLAN_SERIES);

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

const leastUnitSide = (laying: Laying): number =>
  Math.min(...laying.motif.map(({ unit }) => Math.min(unit.length, unit.width)));

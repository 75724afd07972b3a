import { setOut } from '@/paving/set-out/set-out';
import type { TakeOffWithoutCosts } from '@/takeoff/without-costs';
import { checksTable } from './checks-sheet';
import { controlDrafts } from './control-sheet';
import { coursesDrafts } from './courses-sheet';
import { restLead } from './figured-sheet';
import { materialsTable } from './materials-sheet';
import type { PaperName } from './paper';
import type { PlanInput } from './plan-input';
import { PLAN_SERIES, planDrafts, planOfPack } from './plan-sheet';
import { sectionDrafts } from './section-sheet';
import type { SetOutInput } from './set-out-input';
import type { NumberedSheet, SheetKind } from './sheet-draft';
import { sheetsNumbered } from './sheet-draft';
import { tablesDrafts } from './table-sheet';

/** All that a set-out pack is drawn from. */
export interface PackInput extends SetOutInput {
  readonly takeOff: TakeOffWithoutCosts;
}

/** What the pack is drawn from: the plan’s input, set out. */
export const packInput = (input: PlanInput, takeOff: TakeOffWithoutCosts): PackInput => ({
  ...input,
  setOut: setOut(input.laying, input.report),
  takeOff,
});

/** What each kind of sheet is called where one chooses among them, and what it is for. */
export const SHEET_NAMES: Readonly<Record<SheetKind, { name: string; use: string }>> = {
  plan: { name: 'Plan', use: 'the floor with its figures; in parts where it is large' },
  control: { name: 'Control points', use: 'every point by two tapes, by offsets, by coordinates' },
  courses: { name: 'Courses', use: 'strings, and each unit’s running length to tick' },
  section: { name: 'Section', use: 'the build-up, levels and the screed board' },
  materials: { name: 'Materials', use: 'what the floor takes and how it is ordered' },
  checks: { name: 'Checks', use: 'what to measure, what it should read, and room to write' },
};

/** Every sheet of the pack in the order of use, numbered through, all on one size of paper. */
export function packSheets(input: PackInput): readonly NumberedSheet[] {
  const plan = planOfPack(
    input,
    input.setOut.points.filter(({ kind }) => kind !== 'string'),
    input.setOut,
  );
  const paper: PaperName = plan.whole.paper.name;
  // What the plan has no room for stands over the table of control points, where that leaves the table its room.
  const carried =
    plan.rest.rows.length > 0 && restLead([plan.rest], paper) !== null ? plan.rest : null;
  const section = sectionDrafts(input, paper);
  const drafts = [
    plan.whole,
    ...(carried ? [] : plan.further()),
    ...plan.parts,
    ...controlDrafts(input, paper, carried),
    ...coursesDrafts(input, paper),
    ...section.drafts,
    ...tablesDrafts(
      [...section.tables, materialsTable(input, input.takeOff), checksTable(input)],
      input,
      paper,
    ),
  ];
  return sheetsNumbered(drafts, input);
}

/** The plan sheets alone, for whoever may have no more. */
export const planPackSheets = (input: PlanInput): readonly NumberedSheet[] =>
  sheetsNumbered(planDrafts(input, []), input, PLAN_SERIES);

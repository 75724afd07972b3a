import type { DrawCommand, Layer, PaperBox } from './drawing';
import { PENS, boxRing } from './drawing';
import { INK, PAPER } from './inks';
import type { Paper } from './paper';
import type { PlanInput } from './plan-input';
import { STATE_NAMES, sheetDate } from './plan-input';
import { scaleName } from './scales';
import type { Sheet } from './sheet';
import { sheetText } from './text-measure';
import { TITLE_STRIP_HEIGHT, titleFrames, titleStrip } from './title-strip';

/** The sheets of a set-out pack, in the order of use. */
export const SHEET_KINDS = [
  'plan',
  'control',
  'courses',
  'section',
  'materials',
  'checks',
] as const;
export type SheetKind = (typeof SHEET_KINDS)[number];

/** A sheet without its title strip: that says how many sheets there are in all. */
export interface SheetDraft {
  /** What it is of; more than one where tables share a sheet. */
  readonly kinds: readonly SheetKind[];
  /** As the title block has it: `Floor plan`. */
  readonly type: string;
  readonly paper: Paper;
  /** Denominator; null where nothing on it is to scale. */
  readonly scale: number | null;
  readonly frames: Readonly<Record<string, PaperBox>>;
  readonly layers: readonly Layer[];
  /** Where the title strip goes. */
  readonly title: PaperBox;
  /** Lines between the parts. */
  readonly rules: readonly DrawCommand[];
}

export type NumberedSheet = Sheet & {
  readonly kinds: readonly SheetKind[];
  readonly type: string;
};

/** The title strip's place across the foot of a sheet. */
export const footStrip = ({ frame }: Paper): PaperBox => ({
  ...frame,
  top: frame.bottom - TITLE_STRIP_HEIGHT,
});

/** A ruled line between two places, paper mm. */
export const rule = (
  from: readonly [number, number],
  to: readonly [number, number],
): DrawCommand => ({
  kind: 'line',
  from,
  to,
  stroke: { width: PENS.medium, colour: INK },
});

/** Each draft with its title strip, numbered through; `series` stands before the number where it is not the pack’s. */
export function sheetsNumbered(
  drafts: readonly SheetDraft[],
  input: PlanInput,
  series = '',
): readonly NumberedSheet[] {
  return drafts.map((draft, n) => {
    const { paper, title, scale } = draft;
    const number = `${n + 1}/${drafts.length}`;
    const fields = titleFields(input, draft, series === '' ? number : `${series} ${number}`);
    return {
      kinds: draft.kinds,
      type: draft.type,
      width: paper.width,
      height: paper.height,
      paper,
      scale: scale ?? 1,
      frames: { ...draft.frames, ...titleFrames(fields, title) },
      layers: [
        { name: 'paper', commands: [paperSheet(paper)] },
        ...draft.layers,
        {
          name: 'title',
          commands: [
            ...titleStrip(fields, title),
            ...draft.rules,
            {
              kind: 'path',
              rings: [boxRing(paper.frame)],
              stroke: { width: PENS.thick, colour: INK },
            },
          ],
        },
      ],
    };
  });
}

const paperSheet = (paper: Paper): DrawCommand => ({
  kind: 'path',
  rings: [boxRing({ left: 0, top: 0, right: paper.width, bottom: paper.height })],
  fill: PAPER,
});

function titleFields(input: PlanInput, draft: SheetDraft, sheet: string) {
  const { stamp } = input;
  const text = {
    owner: input.firm,
    title: input.project,
    supplement: input.label === '' ? input.layout : `${input.layout}: ${input.label}`,
    documentType: draft.type,
    documentNumber: input.documentNumber,
    version: String(input.version),
    saved: sheetDate(input.date),
    issued: stamp.issuedAt === null ? 'Not issued' : sheetDate(stamp.issuedAt),
    state: STATE_NAMES[input.state],
    scale:
      draft.scale === null
        ? `Not to scale, ${draft.paper.name}`
        : `${scaleName(draft.scale)} on ${draft.paper.name}`,
    creator: input.creator,
    fingerprint: input.fingerprint.slice(0, 10),
    sheet,
  };
  return {
    ...(Object.fromEntries(
      Object.entries(text).map(([name, value]) => [name, sheetText(value)]),
    ) as typeof text),
    currentUrl: stamp.currentUrl,
  };
}

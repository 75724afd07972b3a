import type { DrawCommand, PaperBox, PaperPoint } from './drawing';
import { PENS, boxWidth } from './drawing';
import { INK } from './inks';
import { panelText } from './panel';
import { LETTERING, textFitted, textWidth } from './text-measure';

/** The fields of a title block after ISO 7200. */
export interface TitleFields {
  /** Legal owner: the firm. */
  readonly owner: string;
  /** Title: the project. */
  readonly title: string;
  /** Supplementary title: the layout and the version's label. */
  readonly supplement: string;
  readonly documentType: string;
  readonly documentNumber: string;
  /** Revision: the version's number. */
  readonly version: string;
  readonly date: string;
  readonly state: string;
  readonly scale: string;
  readonly creator: string;
  readonly fingerprint: string;
  readonly sheet: string;
}

const ROW = 10;
export const TITLE_STRIP_HEIGHT = 3 * ROW;
/** The narrowest that its fields are set for, as in ISO 7200. */
export const TITLE_STRIP_WIDTH = 180;

interface Cell {
  readonly label: string;
  readonly value: string;
  readonly strong: boolean;
  readonly frame: string;
  readonly box: PaperBox;
}

/** Three rows of cells; each row's shares make up 180. */
function titleCells(fields: TitleFields, box: PaperBox): readonly Cell[] {
  const rows: readonly (readonly [share: number, label: string, value: string, strong?: true][])[] =
    [
      [
        [52, 'Owner', fields.owner],
        [88, 'Title', fields.title, true],
        [40, 'Version', fields.version, true],
      ],
      [
        [52, 'Drawn by', fields.creator],
        [88, 'Layout', fields.supplement],
        [40, 'State', fields.state],
      ],
      [
        [30, 'Scale', fields.scale],
        [46, 'Saved', fields.date],
        [32, 'Fingerprint', fields.fingerprint],
        [25, 'Type', fields.documentType],
        [33, 'Document', fields.documentNumber],
        [14, 'Sheet', fields.sheet],
      ],
    ];
  const unit = boxWidth(box) / TITLE_STRIP_WIDTH;
  return rows.flatMap((cells, row) => {
    let left = box.left;
    return cells.map(([share, label, value, strong]) => {
      const top = box.top + row * ROW;
      const cell = { left, top, right: left + share * unit, bottom: top + ROW };
      left = cell.right;
      return { label, value, strong: strong ?? false, frame: `title: ${label}`, box: cell };
    });
  });
}

export function titleStrip(fields: TitleFields, box: PaperBox): readonly DrawCommand[] {
  const thin = { width: PENS.thin, colour: INK };
  return titleCells(fields, box).flatMap(({ label, value, strong, frame, box: cell }) => {
    const width = boxWidth(cell) - 2.6;
    const height =
      strong && textWidth(value, LETTERING.medium, 700) <= width
        ? LETTERING.medium
        : LETTERING.small;
    const weight = strong ? 700 : 600;
    const commands: DrawCommand[] = [
      panelText(
        [cell.left + 1.4, cell.top + 3.8],
        textFitted(label, width, LETTERING.small),
        frame,
      ),
      panelText(
        [cell.left + 1.4, cell.bottom - 1.6],
        textFitted(value, width, height, weight),
        frame,
        { height, weight },
      ),
    ];
    const edge = (from: PaperPoint, to: PaperPoint): DrawCommand => ({
      kind: 'line',
      from,
      to,
      stroke: thin,
    });
    if (cell.left > box.left) commands.push(edge([cell.left, cell.top], [cell.left, cell.bottom]));
    if (cell.top > box.top) commands.push(edge([cell.left, cell.top], [cell.right, cell.top]));
    return commands;
  });
}

/** The cells by name, so that a check can tell that each text stays in its own. */
export function titleFrames(
  fields: TitleFields,
  box: PaperBox,
): Readonly<Record<string, PaperBox>> {
  return Object.fromEntries(titleCells(fields, box).map((cell) => [cell.frame, cell.box]));
}

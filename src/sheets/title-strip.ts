import type { DrawCommand, PaperBox, PaperPoint } from './drawing';
import { PENS, boxHeight, boxWidth } from './drawing';
import { INK } from './inks';
import { panelText } from './panel';
import { qrCommands } from './qr-code';
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
  readonly saved: string;
  readonly issued: string;
  readonly state: string;
  readonly scale: string;
  readonly creator: string;
  readonly fingerprint: string;
  readonly sheet: string;
  /** Address of the page that says whether this is still the current plan; none: no QR code. */
  readonly currentUrl: string | null;
}

const ROW = 8.5;
/** Of the title block, paper mm. */
export const TITLE_STRIP_HEIGHT = 4 * ROW;
/** The narrowest that its fields are set for, as in ISO 7200. */
export const TITLE_STRIP_WIDTH = 180;
const QR_CAPTION = 'Still current? Scan.';
const QR_FRAME = 'title: QR';

interface Cell {
  readonly label: string;
  readonly value: string;
  readonly strong: boolean;
  readonly frame: string;
  readonly box: PaperBox;
}

/** The strip's fields, and the square for the QR code at its right end. */
function titleParts(fields: TitleFields, box: PaperBox) {
  const qrLeft = fields.currentUrl === null ? box.right : box.right - boxHeight(box);
  return {
    fieldBox: { ...box, right: qrLeft },
    qrBox: fields.currentUrl === null ? null : { ...box, left: qrLeft },
  };
}

/** Four rows of cells; each row's shares make up 146, its width in mm beside a QR code on A4. */
function titleCells(fields: TitleFields, box: PaperBox): readonly Cell[] {
  const rows: readonly (readonly [share: number, label: string, value: string, strong?: true][])[] =
    [
      [
        [44, 'Owner', fields.owner],
        [74, 'Title', fields.title, true],
        [28, 'Version', fields.version, true],
      ],
      [
        [44, 'Drawn by', fields.creator],
        [74, 'Layout', fields.supplement],
        [28, 'State', fields.state],
      ],
      [
        [44, 'Saved', fields.saved],
        [44, 'Issued', fields.issued],
        [30, 'Document', fields.documentNumber],
        [28, 'Fingerprint', fields.fingerprint],
      ],
      [
        [44, 'Scale', fields.scale],
        [74, 'Type', fields.documentType],
        [28, 'Sheet', fields.sheet, true],
      ],
    ];
  return rows.flatMap((cells, row) => {
    const unit = boxWidth(box) / cells.reduce((sum, [share]) => sum + share, 0);
    let left = box.left;
    return cells.map(([share, label, value, strong]) => {
      const top = box.top + row * ROW;
      const cell = { left, top, right: left + share * unit, bottom: top + ROW };
      left = cell.right;
      return { label, value, strong: strong ?? false, frame: `title: ${label}`, box: cell };
    });
  });
}

/** The title block after ISO 7200, in a box. */
export function titleStrip(fields: TitleFields, box: PaperBox): readonly DrawCommand[] {
  const thin = { width: PENS.thin, colour: INK };
  const edge = (from: PaperPoint, to: PaperPoint): DrawCommand => ({
    kind: 'line',
    from,
    to,
    stroke: thin,
  });
  const { fieldBox, qrBox } = titleParts(fields, box);
  const cells = titleCells(fields, fieldBox).flatMap(
    ({ label, value, strong, frame, box: cell }) => {
      const width = boxWidth(cell) - 2.6;
      const weight = strong ? 700 : 600;
      const labelWidth = textWidth(label, LETTERING.small) + 2;
      // A short large value stands beside its label, over the whole height of its cell.
      const large = strong && textWidth(value, LETTERING.medium, 700) <= width - labelWidth;
      const commands: DrawCommand[] = [
        panelText(
          [cell.left + 1.4, cell.top + 3.6],
          textFitted(label, width, LETTERING.small),
          frame,
        ),
        large
          ? panelText([cell.right - 1.6, cell.bottom - 2.5], value, frame, {
              height: LETTERING.medium,
              weight,
              anchor: 'end',
            })
          : panelText(
              [cell.left + 1.4, cell.bottom - 1.2],
              textFitted(value, width, LETTERING.small, weight),
              frame,
              { weight },
            ),
      ];
      if (cell.left > box.left)
        commands.push(edge([cell.left, cell.top], [cell.left, cell.bottom]));
      if (cell.top > box.top) commands.push(edge([cell.left, cell.top], [cell.right, cell.top]));
      return commands;
    },
  );
  return qrBox ? [...cells, ...qrCell(fields.currentUrl!, qrBox)] : cells;
}

function qrCell(url: string, box: PaperBox): readonly DrawCommand[] {
  const caption = LETTERING.small + 2.2;
  const side = boxHeight(box) - caption;
  const left = (box.left + box.right - side) / 2;
  return [
    {
      kind: 'line',
      from: [box.left, box.top],
      to: [box.left, box.bottom],
      stroke: { width: PENS.thin, colour: INK },
    },
    ...qrCommands(url, { left, top: box.top + 0.3, right: left + side, bottom: box.top + side }),
    panelText([(box.left + box.right) / 2, box.bottom - 1.6], QR_CAPTION, QR_FRAME, {
      weight: 600,
      anchor: 'middle',
    }),
  ];
}

/** The cells by name, so that a check can tell that each text stays in its own. */
export function titleFrames(
  fields: TitleFields,
  box: PaperBox,
): Readonly<Record<string, PaperBox>> {
  const { fieldBox, qrBox } = titleParts(fields, box);
  return Object.fromEntries([
    ...titleCells(fields, fieldBox).map((cell) => [cell.frame, cell.box] as const),
    ...(qrBox ? [[QR_FRAME, qrBox] as const] : []),
  ]);
}

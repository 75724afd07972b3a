import { boxWidth, type PaperBox } from './drawing';
import type { PanelColumn, PanelRow } from './panel';
import { panelFlowed } from './panel';

/** Between the band's columns, and under the band, mm. */
const SPACE = 6;
const STEP = 1;

/** Columns of `columnWidth` side by side over a box. */
function columnsOver(box: PaperBox, columnWidth: number, frame: string): readonly PanelColumn[] {
  const count = Math.max(1, Math.floor((boxWidth(box) + SPACE) / (columnWidth + SPACE)));
  const pitch = (boxWidth(box) + SPACE) / count;
  return Array.from({ length: count }, (_, n) => {
    const left = box.left + n * pitch;
    return { frame, box: { ...box, left, right: left + columnWidth } };
  });
}

/** Rows made for columns of `columnWidth`, as one row over `width`: side by side, as low as holds them all. */
export function rowBand(rows: readonly PanelRow[], columnWidth: number, width: number): PanelRow {
  const flowedIn = (height: number, [left, top]: readonly [number, number], frame: string) => {
    const box = { left, top, right: left + width, bottom: top + height };
    return panelFlowed(rows, columnsOver(box, columnWidth, frame));
  };
  const most = rows.reduce((sum, row) => sum + row.height, 0) + STEP;
  let height = Math.max(...rows.map((row) => row.height));
  while (height < most && flowedIn(height, [0, 0], '').rest.length > 0) height += STEP;
  return {
    height: height + SPACE,
    draw: (at, _width, frame) => flowedIn(height, at, frame).commands,
  };
}

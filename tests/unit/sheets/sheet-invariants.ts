import type { PaperPoint, TextCommand } from '@/sheets/drawing';
import { drawingCommands } from '@/sheets/drawing';
import type { Sheet } from '@/sheets/sheet';
import { textCorners } from '@/sheets/text-measure';

export const sheetTexts = (sheet: Sheet): readonly TextCommand[] =>
  drawingCommands(sheet).filter((command): command is TextCommand => command.kind === 'text');

/** Do two convex outlines share more than a hair's breadth? By the separating axis theorem. */
export function outlinesOverlap(p: readonly PaperPoint[], q: readonly PaperPoint[]): boolean {
  const HAIR = 0.01;
  return ![p, q].some((outline) =>
    outline.some(([x1, y1], n) => {
      const [x2, y2] = outline[(n + 1) % outline.length];
      const length = Math.hypot(x2 - x1, y2 - y1);
      const across = (points: readonly PaperPoint[]) =>
        points.map(([x, y]) => ((x - x1) * (y1 - y2) + (y - y1) * (x2 - x1)) / length);
      const [a, b] = [across(p), across(q)];
      return Math.min(...a) > Math.max(...b) - HAIR || Math.min(...b) > Math.max(...a) - HAIR;
    }),
  );
}

/** Everything wrong with a sheet's lettering, in words. */
export function letteringFaults(sheet: Sheet): readonly string[] {
  const texts = sheetTexts(sheet).map((text) => ({ text, corners: textCorners(text) }));
  const faults: string[] = [];
  texts.forEach(({ text, corners }, n) => {
    if (text.height < 2.5) faults.push(`“${text.text}” is ${text.height} mm high`);
    const frame = sheet.frames[text.frame];
    if (!frame) {
      faults.push(`“${text.text}” names a frame “${text.frame}” that the sheet lacks`);
      return;
    }
    const inside = corners.every(
      ([x, y]) =>
        x >= frame.left - 0.01 &&
        x <= frame.right + 0.01 &&
        y >= frame.top - 0.01 &&
        y <= frame.bottom + 0.01,
    );
    if (!inside) faults.push(`“${text.text}” leaves its frame ${text.frame}`);
    for (const other of texts.slice(n + 1))
      if (outlinesOverlap(corners, other.corners))
        faults.push(`“${text.text}” and “${other.text.text}” overlap`);
  });
  return faults;
}

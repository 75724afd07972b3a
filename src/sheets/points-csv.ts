import Papa from 'papaparse';
import { figuredText } from '@/paving/figured-words';
import { finishSurface } from '@/paving/finish-level';
import { surfaceHeight } from '@/geometry/plane-pieces';
import type { LayoutDocument } from '@/paving/layout-document';
import type { SetOut } from '@/paving/set-out/set-out-types';

const tenth = (mm: number): number => Math.round(mm * 10) / 10 + 0;

/**
 * The control points as CSV, a line each: name, x and y in mm on the plan, the level of the finished floor there in mm
 * above the edge (nothing where no levels are entered), and what it is. For a total station or a spreadsheet, hence
 * always in millimetres with a decimal point.
 */
export function pointsCsv(document: LayoutDocument, setOut: SetOut): string {
  const surface = document.levels ? finishSurface(document) : null;
  return Papa.unparse(
    {
      fields: ['name', 'x_mm', 'y_mm', 'level_mm', 'what'],
      data: setOut.points.map(({ name, at, what }) => [
        name,
        tenth(at[0]),
        tenth(at[1]),
        surface ? tenth(surfaceHeight(surface, at)) : '',
        figuredText(what, document.display),
      ]),
    },
    // A keep-out's name is somebody's own words: a spreadsheet must not take it for a formula.
    { newline: '\r\n', escapeFormulae: true },
  );
}

import { expose } from 'comlink';
import type { SheetPack } from '@/api-types/sheet-pack';
import { floorModel } from '@/sheets/floor-model';
import { drawingDxf } from '@/sheets/dxf-sink';
import { packInput, packSheets, planPackSheets } from '@/sheets/pack';
import type { PaperName } from '@/sheets/paper';
import { pointsCsv } from '@/sheets/points-csv';
import type { NumberedSheet } from '@/sheets/sheet-draft';
import { takeOff } from '@/takeoff/take-off';
import { versionPlanInput } from '../version/version-plan';

const packOf = (pack: SheetPack, paper: PaperName | 'auto') => {
  const input = versionPlanInput(pack, paper);
  return packInput(input, pack.materials ?? takeOff(input.laying, input.report, null));
};

/** The pack drawn beside the page, so that a large floor does not hold it up. */
const packWorker = {
  sheets: (pack: SheetPack, paper: PaperName | 'auto'): readonly NumberedSheet[] =>
    pack.sheets === 'all'
      ? packSheets(packOf(pack, paper))
      : planPackSheets(versionPlanInput(pack, paper)),

  /** The floor at full size. */
  dxf: (pack: SheetPack): string => {
    const { laying, setOut } = packOf(pack, 'auto');
    return drawingDxf(floorModel(laying, setOut));
  },

  /** The control points, a line each. */
  points: (pack: SheetPack): string =>
    pointsCsv(pack.version.document, packOf(pack, 'auto').setOut),
};

export type PackWorker = typeof packWorker;
expose(packWorker);

import type { Point } from '@/geometry/point';
import { formatArea } from '@/paving/area';
import { cutReport, SAW_KERF_MM, type CutReport } from '@/paving/cutting/cut-report';
import { nesting } from '@/paving/cutting/nesting';
import { unitMiddle } from '@/paving/cutting/piece-edges';
import { pieceShape } from '@/paving/cutting/piece-shape';
import { layFloor } from '@/paving/laying';
import type { LayoutDocument } from '@/paving/layout-document';
import { wholeReport } from '@/paving/report';
import { sawMinutes, USUAL_SAW } from '@/takeoff/cutting-cost';
import { formatRun } from '@/takeoff/measures';
import { formatMinutes } from '@/takeoff/saw-time';
import { hatchLines } from '@/sheets/piece-drawing';
import type { DrawCommand, PaperPoint } from '@/sheets/drawing';
import { INK, PAPER, inkMix } from '@/sheets/inks';
import { drawingSvg } from '@/sheets/svg-sink';
import { COURT } from './sample-floors';

/** What the guide says of a floor whole and cut, with a picture of what its pieces are sawn from. */
export interface CuttingPicture {
  readonly whole: LayoutDocument;
  readonly cut: LayoutDocument;
  readonly wholeWords: string;
  readonly cutWords: string;
  /** Some of the units sawn, as SVG text. */
  readonly sawn: string;
}

/** Slabs at 45°, where a floor of whole units leaves the widest margin. */
const DIAGONAL: LayoutDocument = {
  ...COURT,
  bond: { kind: 'stack', unit: COURT.units[0].id, joint: 5 },
  placement: { origin: [320, 330], turn: 45 },
};

/** Units shown, across and down. */
const SHOWN = [4, 2] as const;
const UNIT_PX = 64;
const APART_PX = 12;

let made: CuttingPicture | null = null;

/** Worked out once for as long as the server runs. */
export function cuttingPicture(): CuttingPicture {
  made ??= cuttingPictureOf(DIAGONAL);
  return made;
}

function cuttingPictureOf(document: LayoutDocument): CuttingPicture {
  const laying = layFloor(document);
  const whole = wholeReport(laying);
  const cut = cutReport(laying);
  const area = (m2: number) => formatArea(m2, document.display);
  return {
    whole: { ...document, cutting: 'none' },
    cut: { ...document, cutting: 'edge' },
    wholeWords: `${whole.wholeUnits} units, all whole. ${area(whole.fillArea)} for aggregate. Nothing to saw.`,
    cutWords: `${whole.wholeUnits + cut.wholeUnits} units, ${cut.wholeUnits} of them sawn into ${cut.count} pieces; ${area(cut.waste)} thrown away. ${formatRun(cut.sawLength / 1000, document.display)} to saw: about ${formatMinutes(sawMinutes(cut, USUAL_SAW))}.`,
    sawn: sawnSvg(document, cut),
  };
}

/** Whole units with the pieces that come out of each: the fullest first, no two alike. */
function sawnSvg(document: LayoutDocument, cut: CutReport): string {
  const laying = layFloor(document);
  const shapes = cut.pieces.map((piece) =>
    pieceShape(laying.motif[piece.unit[2]], unitMiddle(laying, piece.unit), piece),
  );
  const alike = new Set<string>();
  const units = nesting(shapes, SAW_KERF_MM)
    .units.filter(({ pieces }) => {
      // A notched piece is nested by its hull, which would look like a piece that it is not.
      if (pieces.some((n) => cut.pieces[n].notched)) return false;
      const key = pieces.map((n) => shapes[n].key).join();
      return !alike.has(key) && alike.add(key);
    })
    .sort((one, other) => other.pieces.length - one.pieces.length)
    .slice(0, SHOWN[0] * SHOWN[1]);
  const [{ length, width }] = document.units;
  const scale = UNIT_PX / Math.max(length, width);
  const commands = units.flatMap(({ places }, n): DrawCommand[] => {
    const x = (n % SHOWN[0]) * (UNIT_PX + APART_PX) + UNIT_PX / 2 + APART_PX;
    const y = Math.floor(n / SHOWN[0]) * (UNIT_PX + APART_PX) + UNIT_PX / 2 + APART_PX;
    const at = ([px, py]: Point): PaperPoint => [x + px * scale, y - py * scale];
    const [hx, hy] = [length / 2, width / 2];
    const corners: Point[] = [[-hx, -hy], [hx, -hy], [hx, hy], [-hx, hy]]; // prettier-ignore
    const rings = places.map((place) => place.map(at));
    return [
      {
        kind: 'path',
        rings: [{ points: corners.map(at), closed: true }],
        stroke: { width: 1, colour: INK, dash: [3, 2] },
      },
      {
        kind: 'path',
        rings: rings.map((points) => ({ points, closed: true })),
        fill: document.units[0].colour ?? PAPER,
        stroke: { width: 1.2, colour: INK },
      },
      {
        kind: 'path',
        rings: rings.flatMap((ring) => hatchLines([ring], 5)),
        stroke: { width: 0.6, colour: inkMix(PAPER, INK, 0.4) },
      },
    ];
  });
  const [across, down] = [SHOWN[0], Math.ceil(units.length / SHOWN[0])].map(
    (count) => count * (UNIT_PX + APART_PX) + APART_PX,
  );
  return drawingSvg(
    { width: across, height: down, layers: [{ name: 'sawn', commands }] },
    { unit: 'px' },
  );
}

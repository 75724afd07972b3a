import type { LayoutDocument } from '@/paving/layout-document';
import { layFloor } from '@/paving/laying';
import { formatLength } from '@/paving/length';
import { documentLevels, levelsSchema } from '@/paving/levels';
import { formatVolume } from '@/paving/volume';
import { boxRing, type DrawCommand } from '@/sheets/drawing';
import { PAPER } from '@/sheets/inks';
import { layerSection } from '@/sheets/layer-section';
import { levelMapDrawing, levelMapKey, mapKeySample } from '@/sheets/level-map-drawing';
import { pointsBounds, viewCentred } from '@/sheets/plan-view';
import { screedPicture } from '@/sheets/screed-picture';
import { drawingSvg } from '@/sheets/svg-sink';
import { earthModel } from '@/takeoff/earth-cells';
import { earthVolumes } from '@/takeoff/earth-volumes';
import { levelMap } from '@/takeoff/level-map';
import { COURT } from './sample-floors';

/** The guide's court on sloping ground, falling to its long side. */
export const SLOPING_COURT: LayoutDocument = {
  ...COURT,
  buildUp: { use: 'foot', frost: false, bedding: 25, base: 100, geotextile: true, overdig: 0 },
  levels: levelsSchema.parse({
    fall: { kind: 'oneWay', direction: 270, percent: 2 },
    proud: 3,
    spots: (
      [
        [0, 0, -290],
        [3100, 0, -310],
        [6400, 0, -275],
        [6400, 2900, -190],
        [4100, 2900, -180],
        [4100, 4700, -95],
        [0, 4700, -80],
        [1000, 2200, -215],
      ] as const
    ).map(([x, y, level]) => ({ at: [x, y], level })),
  }),
};

export interface LevelPictures {
  /** Each as SVG text. */
  readonly map: string;
  readonly section: string;
  readonly screed: string;
  readonly key: readonly { readonly sample: string; readonly text: string }[];
  readonly cut: string;
  readonly base: string;
}

let made: LevelPictures | null = null;

/** The levels of the guide's court, worked out once for as long as the server runs. */
export function levelPictures(): LevelPictures {
  made ??= levelPicturesOf(SLOPING_COURT);
  return made;
}

function picture(commands: readonly DrawCommand[], width: number, height: number): string {
  const box = { left: 0, top: 0, right: width, bottom: height };
  const sheet: DrawCommand = { kind: 'path', rings: [boxRing(box)], fill: PAPER };
  return drawingSvg({
    width,
    height,
    layers: [{ name: 'picture', commands: [sheet, ...commands] }],
  });
}

const inset = (width: number, height: number) => ({
  left: 1,
  top: 1,
  right: width - 1,
  bottom: height - 1,
});

export function levelPicturesOf(document: LayoutDocument): LevelPictures {
  const laying = layFloor(document);
  const model = earthModel(document, laying.ground);
  const map = levelMap(model, document.display);
  const [width, height] = [116, 92];
  const bounds = pointsBounds(model.ground.rings[0].outline);
  const scale = Math.max(
    (bounds.greatest[0] - bounds.least[0]) / (width - 22),
    (bounds.greatest[1] - bounds.least[1]) / (height - 18),
  );
  const box = inset(width, height);
  const drawn = levelMapDrawing(
    document,
    model,
    viewCentred(bounds, scale, box),
    { box, frame: 'map' },
    map,
  );
  const { cut, base } = earthVolumes(laying, model);
  const interval = formatLength(map.interval, document.display);
  return {
    map: picture(drawn.commands, width, height),
    section: picture(layerSection(document, inset(100, 62), 'section', 'screen').commands, 100, 62),
    screed: picture(screedPicture(document, inset(100, 46), 'screed'), 100, 46),
    key: levelMapKey(model, map, interval, documentLevels(document).fall.kind !== 'none').map(
      ({ sample, text }) => ({
        sample: picture(
          mapKeySample(sample, { left: 0.6, top: 0.6, right: 8.4, bottom: 4.4 }),
          9,
          5,
        ),
        text,
      }),
    ),
    cut: formatVolume(cut, document.display),
    base: formatVolume(base, document.display),
  };
}

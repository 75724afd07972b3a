import type { LayoutDocument } from '@/paving/layout-document';
import { documentLevels } from '@/paving/levels';
import { earthModel, type EarthModel } from '@/takeoff/earth-cells';
import { earthVolumes, type EarthVolumes } from '@/takeoff/earth-volumes';
import { levelMap, type LevelMap } from '@/takeoff/level-map';
import { pegLevels, type PegLevel } from '@/takeoff/peg-levels';
import type { Floor } from './floor';

/** What the step Levels shows of a floor, worked out once for each document and only as far as it is asked for. */
export interface Earth {
  readonly model: EarthModel;
  readonly volumes: EarthVolumes;
  readonly map: LevelMap;
  /** The map without its hatching: what is drawn of many spots while a hand moves one. */
  readonly bareMap: LevelMap;
  readonly pegs: readonly PegLevel[];
}

/** Of more spots than this, hatching and figures wait until the hand rests. */
const MANY_SPOTS = 150;

/** Whether a document has so many spots that not all of its earth follows the hand. */
export const manySpots = (document: LayoutDocument): boolean =>
  documentLevels(document).spots.length > MANY_SPOTS;

const earths = new WeakMap<LayoutDocument, Earth | null>();

/** The earth of a floor; null where the floor cannot be laid. */
export function earthOf(floor: Floor): Earth | null {
  const known = earths.get(floor.document);
  if (known !== undefined) return known;
  const { laying } = floor;
  const earth = laying && earthOfLaying(laying);
  earths.set(floor.document, earth);
  return earth;
}

function earthOfLaying(laying: NonNullable<Floor['laying']>): Earth {
  const model = earthModel(laying.document, laying.ground);
  let volumes: EarthVolumes | null = null;
  let map: LevelMap | null = null;
  let bareMap: LevelMap | null = null;
  let pegs: readonly PegLevel[] | null = null;
  return {
    model,
    get volumes() {
      return (volumes ??= earthVolumes(laying, model));
    },
    get map() {
      return (map ??= levelMap(model, laying.document.display));
    },
    get bareMap() {
      return (bareMap ??= map ?? levelMap(model, laying.document.display, false));
    },
    get pegs() {
      return (pegs ??= pegLevels(laying.document, model));
    },
  };
}

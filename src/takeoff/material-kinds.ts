import type { GroundKind, MaterialKind } from '@/paving/materials';
import { M3_PER_CUBIC_YARD, KG_PER_POUND, POUNDS_PER_CUBIC_FOOT } from './measures';

/**
 * What each kind of stone, sand and ground is reckoned with until somebody types better: every figure
 * with where it comes from. Figures that nobody published, or that were not seen in print, are `common
 * practice`: a supplier's own sheet is better than any of them.
 */

/** A figure and who says so. */
export interface Sourced {
  readonly value: number;
  readonly source: string;
}

/** What a kind of stone or sand is taken to be, until somebody types better. */
export interface MaterialDefaults {
  readonly name: string;
  /** Smallest and largest stone, mm. */
  readonly stone: readonly [number, number];
  readonly stoneSource: string;
  /** As delivered, loose, kg/m³. */
  readonly density: Sourced;
  /** Loose volume for one in place. */
  readonly bulk: Sourced;
  /** Rounded by water; does not lock together. */
  readonly rounded: boolean;
  /** Sand, that trickles. */
  readonly sand: boolean;
  /** Stone of few sizes, with open pores. */
  readonly open: boolean;
}

const COMMON_PRACTICE = 'common practice';
const HUD = 'HUD, Residential Structural Design Guide (2000), table 3.3';
const EPA = 'US EPA, Standard Volume-to-Weight Conversion Factors (2006)';
const NAVY = 'Navy Engineering Aid, table 10-1, the row for sand';
const C33 = 'ASTM C33, table 1';

const poundsPerCubicFoot = (value: number, source: string): Sourced => ({
  value: value * POUNDS_PER_CUBIC_FOOT,
  source: `${source}: ${value}\u202flb/ft³`,
});

/** Dry sand. */
const DRY_SAND = poundsPerCubicFoot(90, HUD);
/** Dry gravel. */
const DRY_GRAVEL = poundsPerCubicFoot(105, HUD);
/** Crushed stone, 2 700 lb to the cubic yard. */
const CRUSHED_STONE: Sourced = {
  value: (2700 * KG_PER_POUND) / M3_PER_CUBIC_YARD,
  source: `${EPA}: 2\u202f700\u202flb/yd³`,
};

/** 100 in place are 111 loose and 95 compacted: 111 ÷ 95, to the hundredth that people reckon with. */
const LOOSE_FOR_COMPACTED = 1.17;
const SAND_COMPACTED: Sourced = {
  value: LOOSE_FOR_COMPACTED,
  source: `${NAVY}: 111 loose make 95 compacted`,
};
const STONE_COMPACTED: Sourced = {
  value: LOOSE_FOR_COMPACTED,
  source: `${NAVY} (111 loose make 95 compacted), taken for crushed stone too`,
};
/** Stone of one size settles little. */
const SETTLES: Sourced = { value: 1.1, source: `${COMMON_PRACTICE}: stone of few sizes settles by about a tenth` }; // prettier-ignore

/** Stone and sand, by kind. */
export const MATERIAL_DEFAULTS: Readonly<Record<MaterialKind, MaterialDefaults>> = {
  jointingSand: {
    name: 'Fine jointing sand',
    stone: [0, 1.2],
    stoneSource: COMMON_PRACTICE,
    density: DRY_SAND,
    bulk: SAND_COMPACTED,
    rounded: false,
    sand: true,
    open: false,
  },
  sharpSand: {
    name: 'Sharp sand',
    stone: [0, 4.75],
    stoneSource: `${C33}: nearly all passes 4.75\u202fmm`,
    density: DRY_SAND,
    bulk: SAND_COMPACTED,
    rounded: false,
    sand: true,
    open: false,
  },
  fineChippings: {
    name: 'Fine chippings',
    stone: [2, 6],
    stoneSource: COMMON_PRACTICE,
    density: CRUSHED_STONE,
    bulk: SETTLES,
    rounded: false,
    sand: false,
    open: true,
  },
  chippings: {
    name: 'Chippings',
    stone: [2.36, 9.5],
    stoneSource: `${C33}, size No. 8: 9.5 to 2.36\u202fmm`,
    density: CRUSHED_STONE,
    bulk: SETTLES,
    rounded: false,
    sand: false,
    open: true,
  },
  coarseChippings: {
    name: 'Coarse chippings',
    stone: [10, 20],
    stoneSource: COMMON_PRACTICE,
    density: CRUSHED_STONE,
    bulk: SETTLES,
    rounded: false,
    sand: false,
    open: true,
  },
  gravel: {
    name: 'Rounded gravel',
    stone: [4, 10],
    stoneSource: COMMON_PRACTICE,
    density: DRY_GRAVEL,
    bulk: SETTLES,
    rounded: true,
    sand: false,
    open: true,
  },
  crushedStone: {
    name: 'Crushed stone, all sizes',
    stone: [0, 25],
    stoneSource: 'Caltrans class 2 aggregate base, 3/4 in: all passes 1 in',
    density: CRUSHED_STONE,
    bulk: STONE_COMPACTED,
    rounded: false,
    sand: false,
    open: false,
  },
  openBase: {
    name: 'Clean crushed stone',
    stone: [4.75, 25],
    stoneSource: `${C33}, size No. 57: most of it 25 to 4.75\u202fmm`,
    density: CRUSHED_STONE,
    bulk: SETTLES,
    rounded: false,
    sand: false,
    open: true,
  },
  stoneDust: {
    name: 'Stone dust and screenings',
    stone: [0, 5],
    stoneSource: COMMON_PRACTICE,
    density: CRUSHED_STONE,
    bulk: STONE_COMPACTED,
    rounded: false,
    sand: false,
    open: false,
  },
};

/** What a kind of ground is taken to be once it is dug. */
export interface GroundDefaults {
  readonly name: string;
  /** Loose volume for one as it lies. */
  readonly bulk: Sourced;
  /** Loose, kg/m³. */
  readonly density: Sourced;
}

/** Earth once dug is heavier wet than dry; the figure is for judging loads. */
const LOOSE_EARTH: Sourced = { value: 1250, source: `${COMMON_PRACTICE}: moist earth, tipped loose` }; // prettier-ignore

/** The ground that is dug, by kind. */
export const GROUND_DEFAULTS: Readonly<Record<GroundKind, GroundDefaults>> = {
  sand: {
    name: 'Sand',
    bulk: { value: 1.11, source: `${NAVY}: 100 as it lies are 111 loose` },
    density: DRY_SAND,
  },
  earth: {
    name: 'Earth',
    bulk: { value: 1.25, source: COMMON_PRACTICE },
    density: LOOSE_EARTH,
  },
  clay: {
    name: 'Clay',
    bulk: { value: 1.43, source: COMMON_PRACTICE },
    density: LOOSE_EARTH,
  },
  rock: {
    name: 'Rock',
    bulk: { value: 1.5, source: COMMON_PRACTICE },
    density: CRUSHED_STONE,
  },
};

/** Of a unit whose mass nobody gave: plain concrete. */
export const UNIT_DENSITY = poundsPerCubicFoot(145, HUD);

/** A kind by the words that people call it by; null where the name says nothing. */
export function kindByName(name: string): MaterialKind | null {
  const words = name.toLowerCase();
  if (/jointing|kiln|dried sand/.test(words)) return 'jointingSand';
  if (/dust|screening/.test(words)) return 'stoneDust';
  if (/sand/.test(words)) return 'sharpSand';
  if (/pea|gravel|pebble|cobble/.test(words)) return 'gravel';
  if (/grit|fine chip/.test(words)) return 'fineChippings';
  if (/chip|slate/.test(words)) return 'chippings';
  if (/clean|drain/.test(words)) return 'openBase';
  if (/crush|sub-?base|road base|scalping|hardcore|mixed/.test(words)) return 'crushedStone';
  return null;
}

/** A kind by its smallest and largest stone, mm, where a catalogue gives them. */
export function kindByStone([small, large]: readonly [number, number]): MaterialKind {
  if (large <= 2) return 'jointingSand';
  if (small < 1) return large <= 6 ? 'sharpSand' : 'crushedStone';
  if (large <= 6) return 'fineChippings';
  return large <= 14 ? 'chippings' : 'coarseChippings';
}

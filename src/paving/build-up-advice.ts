import { bondPattern, documentUnit } from './bond';
import { documentBuildUp, type BuildUp } from './build-up';
import type { LayoutDocument } from './layout-document';
import { formatLength, MM_PER_INCH, type Display } from './length';
import { documentLevels } from './levels';

/**
 * What is published about layers, units and falls, and how a floor stands to it. Published values are
 * those of the sources named beside them and nothing more; local codes and licensed practice decide.
 */

/** Where a published value was read. */
export const SOURCES = {
  tolerances:
    'ICPI, Construction Tolerances and Recommendations for Interlocking Concrete Pavements',
  slabs: 'ASTM C1782, as quoted by ICPI',
  ada: '2010 ADA Standards, 403.3, as quoted in the trade',
  irc: 'International Residential Code 2015, R401.3',
  practice: 'common practice',
} as const;

/** Least thickness of the compacted base by use, mm: 4 in and 6 in (source: tolerances). */
const LEAST_BASE_MM: Readonly<Record<BuildUp['use'], number>> = { foot: 100, driveway: 150 };
/** The same as the source prints it for inches: 4 in and 6 in, not what 100 and 150 mm come to. */
const LEAST_BASE_INCHES: Readonly<Record<BuildUp['use'], number>> = { foot: 4, driveway: 6 };

/** The least thickness of the base as it is published, in the words of a display system. */
export const leastBaseWords = (use: BuildUp['use'], display: Display): string =>
  formatLength(
    display === 'imperial' ? LEAST_BASE_INCHES[use] * MM_PER_INCH : LEAST_BASE_MM[use],
    display,
  );

/** Nominal bedding, mm: 1 in (source: tolerances). */
export const NOMINAL_BEDDING_MM = 25;
/** Least thickness of a paver for feet or a driveway, mm: 2 3/8 in (source: tolerances). */
const LEAST_PAVER_MM = 60;
/** Length over thickness of a paver is at most this; what is longer is a slab (source: tolerances). */
const GREATEST_ASPECT = 4;
/** Least thickness of a slab, mm: 1.2 in (source: slabs). */
const LEAST_SLAB_MM = 30;
/** Least fall for drainage, per cent (source: tolerances). */
const LEAST_FALL_PERCENT = 2;
/** Greatest fall across a way for wheelchairs, per cent: 1 in 48; and along it: 1 in 20 (source: ada). */
const GREATEST_CROSS_PERCENT = 100 / 48;
const GREATEST_RUNNING_PERCENT = 5;

/** One remark on layers, falls or use, with who published what it rests on. */
export interface Advice {
  readonly kind:
    | 'thinBase'
    | 'thinBedding'
    | 'thickBedding'
    | 'thinUnit'
    | 'slenderUnit'
    | 'littleFall'
    | 'steepFall'
    | 'byHouse'
    | 'frost'
    | 'vehicles'
    | 'proudOfEdge';
  /** `look`: something is short of what is published. `note`: to be known. */
  readonly weight: 'look' | 'note';
  readonly text: string;
  readonly source: string;
}

/** Bedding that is much thicker than nominal settles unevenly, mm; common practice. */
const THICK_BEDDING_MM = 40;
/** Comparing what was typed in inches with published millimetres, mm. */
const ROUNDING_MM = 2;

const usedUnits = (document: LayoutDocument) =>
  [...new Set(bondPattern(document).motif.map(({ unit }) => unit))].map((id) =>
    documentUnit(document, id),
  );

function unitAdvice(document: LayoutDocument, use: BuildUp['use']): Advice[] {
  const shown = (mm: number) => formatLength(mm, document.display);
  return usedUnits(document).flatMap(({ name, length, width, thickness }): Advice[] => {
    const aspect = Math.max(length, width) / thickness;
    const slab = aspect > GREATEST_ASPECT + 0.01;
    const least = slab ? LEAST_SLAB_MM : LEAST_PAVER_MM;
    const advice: Advice[] = [];
    if (thickness < least - 1) {
      advice.push({
        kind: 'thinUnit',
        weight: 'look',
        text: `${name} is ${shown(thickness)} thick; the least published for a ${slab ? 'slab' : 'paver'} is ${shown(least)}.`,
        source: slab ? SOURCES.slabs : SOURCES.tolerances,
      });
    }
    if (slab && use === 'driveway') {
      advice.push({
        kind: 'slenderUnit',
        weight: 'look',
        text: `${name} is ${Number(aspect.toFixed(1))} times as long as it is thick; under cars at most ${GREATEST_ASPECT} times is published. A longer unit can break under a wheel.`,
        source: SOURCES.tolerances,
      });
    }
    return advice;
  });
}

function fallAdvice(document: LayoutDocument): Advice[] {
  const { fall } = documentLevels(document);
  const percent = fall.kind === 'none' ? 0 : fall.percent;
  const advice: Advice[] = [];
  if (percent < LEAST_FALL_PERCENT) {
    advice.push({
      kind: 'littleFall',
      weight: 'look',
      text: `The floor ${percent === 0 ? 'does not fall' : `falls ${Number(percent.toFixed(2))} %`}; at least ${LEAST_FALL_PERCENT} % is published so that water runs off. Voids and open joints take water only as long as the ground below does.`,
      source: SOURCES.tolerances,
    });
  }
  if (percent > GREATEST_CROSS_PERCENT) {
    const running = percent > GREATEST_RUNNING_PERCENT;
    advice.push({
      kind: 'steepFall',
      weight: 'note',
      text: running
        ? 'The floor falls more than 1 in 20, which is steeper than a way for wheelchairs may be along it.'
        : 'The floor falls more than 1 in 48, which is steeper than a way for wheelchairs may be across it. Between 2 % for water and 1 in 48 there is next to no room: say early who is to use the floor.',
      source: SOURCES.ada,
    });
  }
  advice.push({
    kind: 'byHouse',
    weight: 'note',
    text: 'Beside a house the floor must lead water away from it: hard surfaces within 10 ft (3 m) by 2 % at least, in the code named here. Ask what holds where you build.',
    source: SOURCES.irc,
  });
  return advice;
}

function layerAdvice({ use, bedding, base, frost }: BuildUp, display: Display): Advice[] {
  const shown = (mm: number) => formatLength(mm, display);
  const advice: Advice[] = [];
  const least = LEAST_BASE_MM[use];
  if (base < least - ROUNDING_MM) {
    advice.push({
      kind: 'thinBase',
      weight: 'look',
      text: `The base is ${shown(base)}; at least ${leastBaseWords(use, display)} compacted is published for ${use === 'foot' ? 'patios and paths' : 'a driveway'}.`,
      source: SOURCES.tolerances,
    });
  }
  if (bedding < NOMINAL_BEDDING_MM - ROUNDING_MM) {
    advice.push({
      kind: 'thinBedding',
      weight: 'note',
      text:
        bedding === 0
          ? `The units lie on the base itself, which must then be screeded true to them. Published is ${shown(NOMINAL_BEDDING_MM)} of bedding.`
          : `The bedding is ${shown(bedding)}; ${shown(NOMINAL_BEDDING_MM)} is published.`,
      source: SOURCES.tolerances,
    });
  }
  if (bedding > THICK_BEDDING_MM) {
    advice.push({
      kind: 'thickBedding',
      weight: 'look',
      text: `The bedding is ${shown(bedding)}; ${shown(NOMINAL_BEDDING_MM)} is published. Make up height in the base: thick bedding settles unevenly.`,
      source: SOURCES.tolerances,
    });
  }
  if (use === 'driveway') {
    advice.push({
      kind: 'vehicles',
      weight: 'look',
      text: 'Cars need a pavement designed for them and for the ground below. These figures are not that design.',
      source: SOURCES.practice,
    });
  }
  if (frost) {
    advice.push({
      kind: 'frost',
      weight: 'look',
      text: 'Where the ground freezes, local practice decides how deep the base goes and how it drains. No thickness here is meant for frost.',
      source: SOURCES.practice,
    });
  }
  return advice;
}

/** What to look at in a floor's layers, units and falls; the most pressing first. */
export function buildUpAdvice(document: LayoutDocument): Advice[] {
  const buildUp = documentBuildUp(document);
  const { finish } = documentLevels(document);
  const advice = [
    ...layerAdvice(buildUp, document.display),
    ...unitAdvice(document, buildUp.use),
    ...fallAdvice(document),
  ];
  if (finish > 0) {
    advice.push({
      kind: 'proudOfEdge',
      weight: 'look',
      text: `The finish stands ${formatLength(finish, document.display)} above the edge. Nothing holds the outer units there; finish flush with the edge or below it.`,
      source: SOURCES.practice,
    });
  }
  return [
    ...advice.filter(({ weight }) => weight === 'look'),
    ...advice.filter(({ weight }) => weight === 'note'),
  ];
}

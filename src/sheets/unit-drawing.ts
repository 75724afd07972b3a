import { convexHull } from '@/geometry/convex-hull';
import type { Laying } from '@/paving/laying';
import { unitCorners } from '@/paving/laying';
import type { Unit } from '@/paving/layout-document';
import { unitTone } from '@/paving/tones';
import type { DrawCommand, PaperPoint, PathRing, Stroke } from './drawing';
import { AGGREGATE_COLOUR, PAPER, UNIT_COLOUR, inkMix } from './inks';
import type { PlanView } from './plan-view';
import { paperFromGround } from './plan-view';

/** How units are drawn. */
export interface UnitStyle {
  readonly stroke: Stroke;
  /** Marks units of the second tone with a stroke across, so that tones are told apart in black and white. */
  readonly markTone: boolean;
}

/** Colour of the aggregate, the document’s own if it has one. */
export const aggregateColour = (laying: Laying): string =>
  laying.document.aggregate?.colour ?? AGGREGATE_COLOUR;

/** Colour of a unit, the document’s own if it has one. */
export const firstTone = (unit: Unit): string => unit.colour ?? UNIT_COLOUR;

/** How far the screen's colours are lightened for paper; units more, so that they part from aggregate in grey. */
const UNIT_TINT = 0.52;
const AGGREGATE_TINT = 0.35;

/** The same floor in lighter colours, for paper: figures and grain stay readable over it, in black and white too. */
export function layingTinted(laying: Laying): Laying {
  const lighter = (colour: string) => inkMix(colour, PAPER, UNIT_TINT);
  const unitTinted = (unit: Unit): Unit => ({ ...unit, colour: lighter(firstTone(unit)) });
  const { document } = laying;
  return {
    ...laying,
    motif: laying.motif.map((entry) => ({ ...entry, unit: unitTinted(entry.unit) })),
    document: {
      ...document,
      units: document.units.map(unitTinted),
      tones: document.tones && { ...document.tones, second: lighter(document.tones.second) },
      aggregate: {
        name: document.aggregate?.name ?? 'Fill',
        colour: inkMix(aggregateColour(laying), PAPER, AGGREGATE_TINT),
      },
    },
  };
}

/** Every laid unit, one path for each unit and tone. */
export function unitCommands(
  laying: Laying,
  view: PlanView,
  style: UnitStyle,
): readonly DrawCommand[] {
  const { laid, motif, document } = laying;
  const groups = new Map<string, { fill: string; tone: 0 | 1; rings: PathRing[] }>();
  const marks: PathRing[] = [];
  for (let n = 0; n < laid.count; n += 1) {
    const k = laid.k[n];
    const { unit } = motif[k];
    const tone = unitTone(document, laid.i[n], laid.j[n], k);
    const fill = tone === 1 && document.tones ? document.tones.second : firstTone(unit);
    const corners = unitCorners(motif[k], laid.x[n], laid.y[n]).map((corner) =>
      paperFromGround(view, corner),
    );
    const key = `${unit.id} ${tone}`;
    const group = groups.get(key) ?? { fill, tone, rings: [] as PathRing[] };
    if (group.rings.length === 0) groups.set(key, group);
    group.rings.push({ points: corners, closed: true });
    if (style.markTone && tone === 1) marks.push(toneMark(corners));
  }
  const units = [...groups.values()].map(({ fill, rings }): DrawCommand => ({
    kind: 'path',
    rings,
    fill,
    stroke: style.stroke,
  }));
  return marks.length === 0
    ? units
    : [...units, { kind: 'path', rings: marks, stroke: style.stroke }];
}

/** The middle half of a unit's diagonal. */
export function toneMark(corners: readonly PaperPoint[]): PathRing {
  const between = (share: number): PaperPoint => [
    corners[0][0] + (corners[2][0] - corners[0][0]) * share,
    corners[0][1] + (corners[2][1] - corners[0][1]) * share,
  ];
  return { points: [between(0.3), between(0.7)], closed: false };
}

/**
 * Units too many or too small to draw one by one, as strips: each run of neighbours along the lattice is
 * one outline, in the colour that unit and aggregate make together from afar.
 */
export function courseCommands(
  laying: Laying,
  view: PlanView,
  stroke: Stroke,
): readonly DrawCommand[] {
  const { laid, motif, lattice, document } = laying;
  const cell = Math.abs(lattice.a[0] * lattice.b[1] - lattice.a[1] * lattice.b[0]);
  const covered = motif.reduce((sum, { unit }) => sum + unit.length * unit.width, 0) / cell;
  const second = document.tones?.rule === 'single' ? undefined : document.tones?.second;
  const strips = new Map<number, PathRing[]>();
  for (let first = 0; first < laid.count;) {
    let last = first;
    while (
      last + 1 < laid.count &&
      laid.k[last + 1] === laid.k[first] &&
      laid.j[last + 1] === laid.j[first] &&
      laid.i[last + 1] === laid.i[last] + 1
    )
      last += 1;
    const k = laid.k[first];
    const ends = [first, last].flatMap((n) => unitCorners(motif[k], laid.x[n], laid.y[n]));
    const points = convexHull(ends).map((corner) => paperFromGround(view, corner));
    const rows = strips.get(k) ?? [];
    if (rows.length === 0) strips.set(k, rows);
    rows.push({ points, closed: true });
    first = last + 1;
  }
  return [...strips].map(([k, rings]): DrawCommand => {
    const unitColour = firstTone(motif[k].unit);
    const colour = second ? inkMix(unitColour, second, 0.5) : unitColour;
    const fill = inkMix(aggregateColour(laying), colour, Math.min(1, covered));
    return {
      kind: 'path',
      rings,
      fill,
      stroke: { ...stroke, colour: inkMix(fill, stroke.colour, 0.3) },
    };
  });
}

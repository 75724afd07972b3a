import { bondPattern, documentUnit } from '@/paving/bond';
import { documentBuildUp } from '@/paving/build-up';
import type { LayoutDocument } from '@/paving/layout-document';
import type { Display } from '@/paving/length';
import { documentLevels } from '@/paving/levels';
import { thickestUnit } from '@/takeoff/earth-cells';
import type { DrawCommand, PaperBox, PaperPoint } from './drawing';
import { PENS, boxHeight, boxRing, boxWidth } from './drawing';
import { figureText, lengthText, levelFigureText } from './figures';
import { AGGREGATE_COLOUR, INK, PAPER, SECOND_INK, UNIT_COLOUR, inkMix } from './inks';
import { LEVEL_MARK, levelMark } from './level-mark';
import { panelText } from './panel';
import { scaleFitting } from './scales';
import { LETTERING, textFitted, textWidth } from './text-measure';

/** The layers of a floor against its edge, cut through and figured. */
export interface LayerSection {
  readonly commands: readonly DrawCommand[];
  /** Denominator: the same across and up. */
  readonly scale: number;
}

/** Of the edge, across, mm of the ground. */
const EDGE_MM = 70;
/** How much of the ground below the dig is drawn, mm of the ground. */
const GROUND_MM = 70;
/** On a sheet, to a preferred scale and in full words; on a screen or in running text, where space is dear. */
export type SectionPlace = 'sheet' | 'screen';
/** The floor is drawn over at least this length, mm of the ground. */
const LEAST_RUN_MM = { sheet: 360, screen: 150 } as const;
/** No name is longer than this, paper mm. */
const LONGEST_NAME = 62;
const WORDS = {
  sheet: {
    edge: 'top of the edge',
    dig: 'bottom of the dig',
    Bedding: 'Bedding, screeded',
    Base: 'Base, compacted',
    geotextile: 'Geotextile on the ground',
    ground: 'Ground, trimmed',
  },
  screen: {
    edge: 'edge',
    dig: 'dig',
    Bedding: 'Bedding',
    Base: 'Base',
    geotextile: 'Geotextile',
    ground: 'Ground',
  },
} as const;
/** An edge that stands on its own goes below the dig by this, mm of the ground. */
const EDGE_FOOT_MM = 30;
/** Room above the section for the datum's mark, paper mm. */
const HEAD = LETTERING.small + LEVEL_MARK + 2;
/** From one label's baseline to the next, paper mm. */
const LABEL_PITCH = 3.9;
const BEDDING_COLOUR = inkMix(PAPER, AGGREGATE_COLOUR, 0.5);
const BASE_COLOUR = inkMix(PAPER, INK, 0.1);

interface Band {
  readonly name: 'Unit' | 'Bedding' | 'Base';
  /** False on a sheet where the document has no layers yet, and a usual thickness stands in. */
  readonly known: boolean;
  /** Levels of its top and bottom, mm above the datum. */
  readonly top: number;
  readonly bottom: number;
}

/** Unit, bedding and base from the finish down; a layer without thickness is none. */
function sectionBands(document: LayoutDocument, place: SectionPlace): readonly Band[] {
  const { bedding, base } = documentBuildUp(document);
  const layers = [
    ['Unit', thickestUnit(document)],
    ['Bedding', bedding],
    ['Base', base],
  ] as const;
  let top = documentLevels(document).finish;
  return layers.flatMap(([name, thickness]) => {
    const known = name === 'Unit' || place === 'screen' || document.buildUp !== undefined;
    const band = { name, known, top, bottom: top - thickness };
    top -= thickness;
    return thickness > 0 ? [band] : [];
  });
}

const bandFigure = ({ name, top, bottom }: Band, display: Display): string =>
  `${name} ${figureText(top - bottom, display)}`;

/** A layer by its name and thickness; the unit by its own name, or that of the thickest. */
function bandWords({ name, known, top, bottom }: Band, document: LayoutDocument): string {
  const thickness = lengthText(top - bottom, document.display, 1);
  if (name !== 'Unit') return `${WORDS.sheet[name]}: ${known ? thickness : 'not entered yet'}`;
  const unit = bondPattern(document)
    .motif.map(({ unit: id }) => documentUnit(document, id))
    .reduce((one, other) => (other.thickness > one.thickness ? other : one));
  const room = LONGEST_NAME - textWidth(`: ${thickness}`, LETTERING.small);
  return `${textFitted(unit.name, room, LETTERING.small)}: ${thickness}`;
}

/**
 * The section at the perimeter, where the finish is highest, in `box` on the paper. Layers are to scale. A sheet
 * says which of them are not entered yet; a screen shows what stands in for them. Where two texts would fall on
 * one line, they step aside and lines lead to them.
 */
export function layerSection(
  document: LayoutDocument,
  box: PaperBox,
  frame: string,
  place: SectionPlace,
): LayerSection {
  const { display } = document;
  const words = WORDS[place];
  const { geotextile, overdig } = documentBuildUp(document);
  const { finish, proud } = documentLevels(document);
  const bands = sectionBands(document, place);
  const formation = bands[bands.length - 1].bottom;
  const levels = [
    { level: 0, text: `${levelFigureText(0, display)} ${words.edge}` },
    ...(Math.abs(finish) < 0.5
      ? []
      : [{ level: finish, text: `${levelFigureText(finish, display)} finish` }]),
    ...(bands[bands.length - 1].known
      ? [{ level: formation, text: `${levelFigureText(formation, display)} ${words.dig}` }]
      : []),
  ].sort((one, other) => other.level - one.level);
  const labels = [
    ...bands.map((band) => ({
      text: place === 'sheet' ? bandWords(band, document) : bandFigure(band, display),
      level: (band.top + band.bottom) / 2,
    })),
    ...(geotextile ? [{ text: words.geotextile, level: formation }] : []),
    { text: words.ground, level: formation - GROUND_MM * 0.55 },
  ];
  const widest = (texts: readonly { text: string }[]) =>
    Math.max(...texts.map(({ text }) => textWidth(text, LETTERING.small)));
  const leftWidth = widest(levels) + LEVEL_MARK + 2.6;
  const sectionWidth = boxWidth(box) - leftWidth - widest(labels) - 7.6;

  // The scale: the whole height, and enough of the floor to be seen as one.
  const topLevel = Math.max(0, finish + proud);
  const bottomLevel = formation - GROUND_MM;
  const room = boxHeight(box) - HEAD - 1;
  const tall = topLevel - bottomLevel;
  const wide = EDGE_MM + LEAST_RUN_MM[place];
  const scale =
    place === 'sheet'
      ? scaleFitting(tall, wide, room, sectionWidth)
      : Math.max(tall / room, wide / sectionWidth);
  const top = box.top + HEAD + Math.max(0, (room - tall / scale) / 2);
  const left = box.left + leftWidth;
  const right = left + sectionWidth;
  const inner = left + EDGE_MM / scale;
  const y = (level: number) => top + (topLevel - level) / scale;

  const commands: DrawCommand[] = [];
  const area = (
    sides: readonly [number, number],
    high: number,
    low: number,
    fill?: string,
    pen?: number,
  ) =>
    commands.push({
      kind: 'path',
      rings: [boxRing({ left: sides[0], top: y(high), right: sides[1], bottom: y(low) })],
      ...(fill ? { fill } : {}),
      ...(pen ? { stroke: { width: pen, colour: INK } } : {}),
    });
  const line = (from: PaperPoint, to: PaperPoint, width: number, colour = INK, dash?: number[]) =>
    commands.push({
      kind: 'line',
      from,
      to,
      stroke: { width, colour, ...(dash ? { dash } : {}) },
    });

  // The ground below, hatched, with no border of its own.
  commands.push(
    ...hatch({ left, top: y(formation), right, bottom: y(bottomLevel) }, 2.2, SECOND_INK),
  );

  // Base and bedding; the base goes on beyond the edge where the dig does.
  const baseLeft = overdig > 0 ? left : inner;
  for (const { name, top: high, bottom: low } of bands.slice(1)) {
    const base = name === 'Base';
    const from = base ? baseLeft : inner;
    area([from, right], high, low, base ? BASE_COLOUR : BEDDING_COLOUR, PENS.thin);
    const within = { left: from, top: y(high), right, bottom: y(low) };
    commands.push(...(base ? stones(within, 1.9, 0.62) : stones(within, 0.95, 0.2)));
  }
  if (geotextile) {
    line([baseLeft, y(formation)], [right, y(formation)], PENS.thick, INK, [1.6, 0.9]);
  }

  // Units, and between them what fills gaps and joints.
  const thickest = bands[0];
  area([inner, right], finish, thickest.bottom, document.aggregate?.colour ?? AGGREGATE_COLOUR);
  commands.push(
    ...stones({ left: inner, top: y(finish), right, bottom: y(thickest.bottom) }, 1.3, 0.3),
  );
  for (const unit of unitRun(document, (right - inner) * scale)) {
    const from = inner + unit.from / scale;
    const end = inner + unit.to / scale;
    const to = Math.min(right, end);
    const low = finish - unit.thickness;
    area([from, to], finish, low, unit.colour);
    line([from, y(finish)], [to, y(finish)], PENS.medium);
    line([from, y(low)], [to, y(low)], PENS.thin);
    line([from, y(finish)], [from, y(low)], PENS.thin);
    if (end <= right) line([to, y(finish)], [to, y(low)], PENS.thin);
    // Under a thinner unit the bedding is thicker.
    if (low > thickest.bottom + 0.5) area([from, to], low, thickest.bottom, BEDDING_COLOUR);
  }
  if (proud > 0) {
    line([inner, y(finish + proud)], [right, y(finish + proud)], PENS.thin, SECOND_INK, [1.2, 0.8]);
  }

  // The edge stands on the base where that goes on under it, else on the ground.
  const foot =
    overdig > 0 && bands.length > 1 ? bands[bands.length - 1].top : formation - EDGE_FOOT_MM;
  area([left, inner], 0, foot, PAPER);
  commands.push(...hatch({ left, top: y(0), right: inner, bottom: y(foot) }, 1.1, INK));
  area([left, inner], 0, foot, undefined, PENS.medium);
  const breakLine = [3, 0.8, 0.5, 0.8];
  line([right, y(topLevel) - 1.2], [right, y(bottomLevel) + 0.6], PENS.fine, SECOND_INK, breakLine);

  // Levels at the left.
  const levelYs = placesSpread(
    levels.map(({ level }) => y(level)),
    LETTERING.small + LEVEL_MARK + 0.4,
    [box.top + LETTERING.small + 1, box.bottom],
  );
  levels.forEach(({ level, text }, n) => {
    const at = levelYs[n];
    const markX = left - LEVEL_MARK / 2 - 1.2;
    const markRight = markX + LEVEL_MARK / 2;
    line([box.left, at], [markRight, at], PENS.fine);
    line([markRight, at], [left, y(level)], PENS.fine);
    if (level !== 0) line([left, y(level)], [inner, y(level)], PENS.fine, SECOND_INK, [0.8, 0.6]);
    commands.push(levelMark([markX, at], level === 0));
    const shown = textFitted(text, markX - LEVEL_MARK / 2 - 0.4 - box.left, LETTERING.small);
    commands.push(panelText([box.left, at - 0.7], shown, frame));
  });

  // Thicknesses and names at the right.
  const chain = right + 2;
  for (const { top: high, bottom: low } of bands.filter(({ known }) => known)) {
    line([chain, y(high)], [chain, y(low)], PENS.fine);
    for (const end of [high, low])
      line([chain - 0.7, y(end) + 0.7], [chain + 0.7, y(end) - 0.7], PENS.fine);
  }
  const labelYs = placesSpread(
    labels.map(({ level }) => y(level)),
    LABEL_PITCH,
    [box.top + LETTERING.small / 2, box.bottom - LETTERING.small / 2 - 0.9],
  );
  labels.forEach(({ text, level }, n) => {
    const at = labelYs[n];
    line([bands[n]?.known ? chain : right, y(level)], [chain + 3.6, at], PENS.fine);
    commands.push(panelText([chain + 4.4, at + LETTERING.small / 2], text, frame));
  });
  return { commands, scale };
}

/** Gaps are drawn no narrower than this, mm of the ground, so that they are seen to be there. */
const SEEN_GAP_MM = { edge: 12, joint: 6 } as const;

/** Units along the section from the edge on, in mm of the ground; the last may go on past its end. */
function unitRun(document: LayoutDocument, length: number) {
  const { motif, joint } = bondPattern(document);
  const units = [...new Set(motif.map(({ unit }) => unit))].map((id) => documentUnit(document, id));
  const run: { from: number; to: number; thickness: number; colour: string }[] = [];
  let from = Math.max(document.clearance, SEEN_GAP_MM.edge);
  for (let n = 0; from < length; n++) {
    const { length: long, thickness, colour } = units[n % units.length];
    run.push({ from, to: from + long, thickness, colour: colour ?? UNIT_COLOUR });
    from += long + Math.max(joint, SEEN_GAP_MM.joint);
  }
  return run;
}

/** Lines at 45° up over a box, `apart` mm from one to the next across, clipped to it. */
export function hatch(box: PaperBox, apart: number, colour: string): DrawCommand[] {
  const step = apart * Math.SQRT2;
  const commands: DrawCommand[] = [];
  for (let x = box.left - boxHeight(box) + step / 2; x < box.right; x += step) {
    const start = Math.max(x, box.left);
    const end = Math.min(x + boxHeight(box), box.right);
    if (end <= start) continue;
    commands.push({
      kind: 'line',
      from: [start, box.bottom - (start - x)],
      to: [end, box.bottom - (end - x)],
      stroke: { width: PENS.fine, colour },
    });
  }
  return commands;
}

/** Small stones in rows, every other row shifted, within a box. */
function stones(box: PaperBox, apart: number, size: number): DrawCommand[] {
  const rows = Math.floor(boxHeight(box) / apart);
  const columns = Math.floor(boxWidth(box) / apart);
  if (rows < 1 || columns < 1) return [];
  const [dx, dy] = [boxWidth(box) / columns, boxHeight(box) / rows];
  const rings = [];
  for (let row = 0; row < rows; row++)
    for (let column = 0; column < columns - (row % 2); column++) {
      const x = box.left + (column + 0.5 + (row % 2) / 2) * dx;
      const at = box.top + (row + 0.5) * dy;
      const turn = (row * 7 + column * 11) % 6;
      rings.push({
        points: [0, 2.2, 4.1].map((angle): PaperPoint => [
          x + size * Math.cos(turn + angle),
          at + Math.min(size, dy / 2.2) * Math.sin(turn + angle),
        ]),
        closed: true,
      });
    }
  return [{ kind: 'path', rings, fill: SECOND_INK }];
}

/** Places in order, moved as little as keeps them `pitch` apart and within bounds. */
function placesSpread(
  places: readonly number[],
  pitch: number,
  [least, greatest]: readonly [number, number],
): number[] {
  const at = places.map((place) => Math.min(Math.max(place, least), greatest));
  for (let n = 1; n < at.length; n++) at[n] = Math.max(at[n], at[n - 1] + pitch);
  for (let n = at.length - 1, limit = greatest; n >= 0; n--) {
    at[n] = Math.min(at[n], limit);
    limit = at[n] - pitch;
  }
  return at;
}

import { formatArea } from '@/paving/area';
import { formatCount } from '@/paving/count';
import type { LayoutDocument } from '@/paving/layout-document';
import { MM_PER_FOOT, MM_PER_INCH } from '@/paving/length';
import { aggregateArea } from '@/paving/report';
import { smallFigure } from '@/paving/small-figure';
import { formatRun } from '@/takeoff/measures';
import { floorCautions } from './cautions';
import type { DrawCommand, PaperBox } from './drawing';
import { PENS, boxRing } from './drawing';
import { cornerName, edgeName, keepOutName } from '@/paving/edge-names';
import { figureText, lengthText, rangeText } from './figures';
import { INK, KEEP_OUT_COLOUR, inkMix } from './inks';
import type { KeepOutPlace } from './keep-out-place';
import { markRows } from './mark-row';
import type { PanelRow } from './panel';
import { headingRow, keptTogether, itemRow, pairRow, sampleRow, tableRow, textRows } from './panel';
import type { PlanInput } from './plan-input';
import type { PlanPart } from './plan-parts';
import { scaleBarRow } from './scale-bar';
import { scaleName } from './scales';
import type { StartPoint } from './start-point';
import { liftedMarks } from './lifted-marks';
import { PART_STROKE } from './part-stroke';
import { pieceSample } from './piece-drawing';
import { aggregateColour, firstTone, toneMark } from './unit-drawing';

/** What the panel says, worked out once for every arrangement. */
export interface PlanFacts {
  readonly input: PlanInput;
  readonly start: StartPoint | null;
  readonly keepOuts: readonly KeepOutPlace[];
  readonly asCourses: boolean;
  /** Parts that further sheets show larger. */
  readonly parts: readonly PlanPart[];
}

const BOND_NAMES: Readonly<Record<LayoutDocument['bond']['kind'], string>> = {
  stack: 'Stack',
  running: 'Running',
  chequer: 'Chequer',
  stepping: 'Stepping',
  basket: 'Basket',
  herringbone: 'Herringbone',
  pinwheel: 'Pinwheel',
  custom: 'Own pattern',
};

/** The panel's rows for a column of this width, in the order of use. */
export function planPanelRows(facts: PlanFacts, scale: number, width: number): readonly PanelRow[] {
  const { input } = facts;
  const { display } = input.laying.document;
  return [
    ...markRows(input, width),
    ...quantityRows(input, width),
    ...startRows(facts, width),
    headingRow(`Key, scale ${scaleName(scale)}`, width),
    ...keyRows(facts, width),
    scaleBarRow(scale, display, width),
    ...edgeRows(input, width),
    ...keepOutRows(facts, width),
    ...keptTogether(
      [
        headingRow('Take care', width),
        ...floorCautions(input.laying.document, input.report).map((text) => itemRow(text, width)),
      ],
      'wished',
    ),
    ...noteRows(input.laying.document, width),
  ];
}

function quantityRows({ laying, report }: PlanInput, width: number): readonly PanelRow[] {
  const { document, joint } = laying;
  const { display } = document;
  const units = document.units.filter((unit) => (report.byUnit[unit.id] ?? 0) > 0);
  const thickness = units.length > 0 ? Math.min(...units.map((unit) => unit.thickness)) : 0;
  const deep = units.every((unit) => unit.thickness === thickness) && thickness > 0;
  const pair = (name: string, value: string) => pairRow(name, value, width);
  return [
    headingRow('Units and fill', width),
    ...units.map((unit) => {
      const size = [unit.length, unit.width, unit.thickness]
        .map((side) => figureText(side, display, 1))
        .join(' × ');
      const stated = [1, MM_PER_INCH].some((per) =>
        unit.name
          .replace(/\s/g, '')
          .includes(
            `${Number((unit.length / per).toFixed(3))}×${Number((unit.width / per).toFixed(3))}`,
          ),
      );
      const name = stated
        ? `${unit.name}, ${lengthText(unit.thickness, display, 1)} thick`
        : `${unit.name}, ${size}`;
      return pairRow(name, formatCount(report.byUnit[unit.id]), width, 700);
    }),
    ...(units.length !== 1
      ? [pairRow('Whole units in all', formatCount(report.wholeUnits), width, 700)]
      : []),
    ...(report.lifted > 0 ? [pair('Lifted out by hand', formatCount(report.lifted))] : []),
    ...(report.cut
      ? [
          pairRow('Pieces cut at the edge', formatCount(report.cut.count), width, 700),
          pair('Whole units to saw them from', formatCount(report.cut.wholeUnits)),
          ...(report.cut.underThird > 0
            ? [pair('Smaller than a third of a unit', formatCount(report.cut.underThird))]
            : []),
          pair('To saw, in all', formatRun(report.cut.sawLength / 1000, display)),
        ]
      : [pair('Left out, not drawn', formatCount(report.leftOut))]),
    pair('Bond', BOND_NAMES[document.bond.kind]),
    pair('Joint', lengthText(joint, display, 1)),
    pair('Ground', formatArea(report.groundArea, display)),
    pair(report.cut ? 'Under whole units' : 'Under units', formatArea(report.coveredArea, display)),
    pair(document.aggregate?.name ?? 'Fill', formatArea(aggregateArea(report), display)),
    ...(deep
      ? [
          pair(
            `The same, ${lengthText(thickness, display, 1)} deep`,
            volumeText((aggregateArea(report) * thickness) / 1000, display),
          ),
        ]
      : []),
    ...(report.leastGap === null || report.play === null
      ? []
      : [
          pair('Least gap', lengthText(report.leastGap, display, 1)),
          pair('Play either way', `±${lengthText(report.play, display, 1)}`),
        ]),
  ];
}

/** A smaller volume keeps three significant figures, m³. */
const SMALL_VOLUME = 0.1;

function volumeText(cubicMetres: number, display: 'metric' | 'imperial'): string {
  const CUBIC_FEET = (1000 / MM_PER_FOOT) ** 3;
  return display === 'metric'
    ? `${smallFigure(cubicMetres, 2, SMALL_VOLUME)}\u2009m³`
    : `${smallFigure(cubicMetres * CUBIC_FEET, 1, SMALL_VOLUME * CUBIC_FEET)}\u2009ft³`;
}

function startRows({ input, start }: PlanFacts, width: number): readonly PanelRow[] {
  if (!start) return [];
  const { display } = input.laying.document;
  const { from } = start;
  const line = `${from}–${start.to}`;
  const along =
    start.along < -0.5
      ? `${lengthText(-start.along, display)} beyond ${from}, in line with ${line}`
      : `${lengthText(start.along, display)} from ${from} along ${line}`;
  const square = `${lengthText(Math.abs(start.square), display)} square to its ${start.square < 0 ? 'right' : 'left'}`;
  const angle = Math.round(Math.abs(start.turnDeg) * 100) / 100;
  const turn =
    angle === 0
      ? `Rows run along ${line}.`
      : angle === 90
        ? `Rows run square to ${line}.`
        : `Rows turn ${angle}° ${start.turnDeg > 0 ? 'anticlockwise' : 'clockwise'} from ${line}.`;
  return [
    headingRow('Start', width),
    ...keptTogether(
      textRows(
        `First unit, marked S: its corner nearest ${from} is ${along}, ${square}. ${turn}`,
        width,
      ),
    ),
  ];
}

function keyRows({ input, asCourses, parts }: PlanFacts, width: number): readonly PanelRow[] {
  const { laying, report } = input;
  const { document } = laying;
  const fine = { width: PENS.fine, colour: INK };
  const colour = aggregateColour(laying);
  const swatch =
    (fill: string, extra: (box: PaperBox) => readonly DrawCommand[] = () => []) =>
    (box: PaperBox): readonly DrawCommand[] => [
      { kind: 'path', rings: [boxRing(box)], fill, stroke: fine },
      ...extra(box),
    ];
  const units = document.units.filter((unit) => (report.byUnit[unit.id] ?? 0) > 0);
  const twoTones = document.tones !== undefined && document.tones.rule !== 'single';
  return [
    ...units.map((unit) =>
      sampleRow(
        swatch(firstTone(unit)),
        asCourses ? `${unit.name}, drawn as courses at this scale` : unit.name,
        width,
      ),
    ),
    ...(twoTones && !asCourses
      ? [
          sampleRow(
            swatch(document.tones!.second, (box) => [
              { kind: 'path', rings: [toneMark(boxRing(box).points)], stroke: fine },
            ]),
            'The same in the second tone',
            width,
          ),
        ]
      : []),
    sampleRow(
      swatch(colour, (box) => [
        {
          kind: 'path',
          rings: [1, 2.6, 4.4, 6, 7.8].map((x, n) => ({
            points: [
              [box.left + x, box.top + 1 + (n % 2) * 2],
              [box.left + x + 0.5, box.top + 1.3 + (n % 2) * 2],
              [box.left + x, box.top + 1.6 + (n % 2) * 2],
            ],
            closed: true,
          })),
          fill: inkMix(colour, INK, 0.55),
        },
      ]),
      `${document.aggregate?.name ?? 'Fill'}: joints, voids and margin`,
      width,
    ),
    ...(laying.ground.rings.length > 1
      ? [sampleRow(swatch(KEEP_OUT_COLOUR, crossed), 'Keep-out', width)]
      : []),
    ...(parts.length > 0
      ? [
          sampleRow(
            (box) => [{ kind: 'path', rings: [boxRing(box)], stroke: PART_STROKE }],
            `Parts ${parts[0].name} to ${parts[parts.length - 1].name}: each larger on a sheet of its own`,
            width,
          ),
        ]
      : []),
    ...(report.cut && report.cut.count > 0
      ? [
          sampleRow(
            pieceSample(firstTone(laying.motif[0].unit)),
            'Cut piece: dashed edge sawn; dot, under a third of a unit; cross, too narrow to lay',
            width,
          ),
        ]
      : []),
    ...(laying.lifted.count > 0
      ? [sampleRow(liftedSample(colour), 'Lifted out by hand: leave open', width)]
      : []),
  ];
}

/** The two diagonals of a box, as keep-outs are marked. */
function crossed(box: PaperBox): readonly DrawCommand[] {
  const stroke = { width: PENS.fine, colour: INK };
  return [
    { kind: 'line', from: [box.left, box.top], to: [box.right, box.bottom], stroke },
    { kind: 'line', from: [box.left, box.bottom], to: [box.right, box.top], stroke },
  ];
}

const liftedSample =
  (fill: string) =>
  (box: PaperBox): readonly DrawCommand[] => [
    { kind: 'path', rings: [boxRing(box)], fill },
    ...liftedMarks([boxRing(box).points]),
  ];

function edgeRows({ laying, report }: PlanInput, width: number): readonly PanelRow[] {
  const { display } = laying.document;
  const rows = report.edges.flatMap((edge) => {
    const ring = laying.ground.rings[edge.ring];
    const name = edgeName(edge.ring, edge.edge, ring.edges.length);
    const { bulge, start, end } = ring.edges[edge.edge];
    const gap =
      edge.least === null || edge.greatest === null
        ? '–'
        : rangeText(edge.least, edge.greatest, display);
    const row = tableRow([name, figureText(edge.length, display), gap], width);
    if (bulge === 0) return [row];
    const chord = Math.hypot(end[0] - start[0], end[1] - start[1]);
    const radius = (chord * (1 + bulge * bulge)) / (4 * Math.abs(bulge));
    const arc = `arc R ${figureText(radius, display)}, chord ${figureText(chord, display)}`;
    return keptTogether([row, ...textRows(arc, width)]);
  });
  const unit = display === 'metric' ? ', in mm' : '';
  return [
    headingRow(`Edges${unit}`, width),
    { ...tableRow(['Edge', 'Length', 'Gap to units'], width), keepsNext: 'needed' },
    ...rows,
  ];
}

function keepOutRows({ input, keepOuts }: PlanFacts, width: number): readonly PanelRow[] {
  if (keepOuts.length === 0) return [];
  const { ground, document } = input.laying;
  const { display } = document;
  const corners = ground.rings[0].edges.length;
  return [
    headingRow('Keep-outs', width),
    ...keepOuts.map((place) => {
      const size =
        place.size === null
          ? ''
          : place.size.kind === 'circle'
            ? `, radius ${figureText(place.size.radius, display)}`
            : `, ${figureText(place.size.length, display)} × ${figureText(place.size.width, display)}`;
      const point =
        place.corner === null ? 'centre' : `corner ${cornerName(place.ring, place.corner)}`;
      const measures =
        place.offsets.length === 2
          ? place.offsets.map(
              ({ edge, distance }) => [distance, edgeName(0, edge, corners)] as const,
            )
          : place.tapes.map(({ corner, distance }) => [distance, cornerName(0, corner)] as const);
      const offsets = measures
        .map(([distance, from]) => `${figureText(distance, display)} from ${from}`)
        .join(', ');
      const name = ground.rings[place.ring].name ?? 'Keep-out';
      const where = offsets === '' ? '' : `: ${point} ${offsets}`;
      return itemRow(`${keepOutName(place.ring)} ${name}${size}${where}`, width);
    }),
  ];
}

function noteRows(document: LayoutDocument, width: number): readonly PanelRow[] {
  const paragraphs = (document.notes ?? '').split(/\n+/).filter((text) => text.trim() !== '');
  return paragraphs.length === 0
    ? []
    : [headingRow('Notes', width), ...paragraphs.flatMap((text) => textRows(text, width))];
}

import type { LayoutDocument, Unit } from '@/paving/layout-document';
import { documentLevels } from '@/paving/levels';
import type { DrawCommand, PaperBox, PaperPoint, PathRing } from './drawing';
import { PENS, boxRing, boxWidth } from './drawing';
import { baselineCentred, tick } from './edge-dimensions';
import { figureText, lengthText } from './figures';
import { INK, PAPER, inkMix } from './inks';
import { LINE_PITCH, panelText } from './panel';
import { LETTERING, textLines, textWidth } from './text-measure';

/** What lies under a floor, from the top; thickness null: not entered yet. */
export interface SectionLayer {
  readonly name: string;
  readonly thickness: number | null;
  readonly kind: 'unit' | 'bedding' | 'base' | 'ground';
}

/** A layer without a thickness is drawn this thick, mm: its figure says that it is not known. */
const UNKNOWN_MM = { bedding: 30, base: 100 } as const;
const GROUND_MM = 60;
const FRAME = 'section';
/** Room at the left for dimensions and at the right for names, mm on paper. */
const LEFT_ROOM = 24;
const NAME_ROOM = 66;
const EDGE_WIDTH_MM = 60;

export const layerHeight = ({ kind, thickness }: SectionLayer): number =>
  kind === 'ground' ? GROUND_MM : (thickness ?? (kind === 'unit' ? 50 : UNKNOWN_MM[kind]));

export function sectionLayers(document: LayoutDocument, unit: Unit): readonly SectionLayer[] {
  const { buildUp } = document;
  return [
    { kind: 'unit', name: unit.name, thickness: unit.thickness },
    { kind: 'bedding', name: 'Bedding, screeded', thickness: buildUp?.bedding ?? null },
    { kind: 'base', name: 'Base, compacted', thickness: buildUp?.base ?? null },
    {
      kind: 'ground',
      name: buildUp?.geotextile ? 'Geotextile on the ground, trimmed' : 'Ground, trimmed',
      thickness: null,
    },
  ];
}

/** The layers cut through at the edge, to scale, figured at the left and named at the right. */
export function sectionDrawing(
  document: LayoutDocument,
  unit: Unit,
  scale: number,
  box: PaperBox,
): readonly DrawCommand[] {
  const { display, buildUp, clearance } = document;
  const { finish } = documentLevels(document);
  const layers = sectionLayers(document, unit);
  const left = box.left + LEFT_ROOM;
  const right = box.right - NAME_ROOM;
  const above = Math.max(0, finish) / scale;
  const datum = box.top + 8 + above;
  const edgeRight = left + EDGE_WIDTH_MM / scale;
  let y = datum - finish / scale;
  const placed = layers.map((layer) => {
    const top = y;
    y += layerHeight(layer) / scale;
    return { layer, top, bottom: y };
  });
  const [units, bedding, base, ground] = placed;
  const commands: DrawCommand[] = [];

  // The ground under all, hatched below its trimmed top; base, bedding, units.
  commands.push(...groundHatch(left, right, ground.top, ground.bottom));
  for (const { layer, top, bottom } of [base, bedding])
    commands.push(
      { kind: 'path', rings: [boxRing({ left: edgeRight, top, right, bottom })], fill: PAPER },
      grain(edgeRight, right, top, bottom, layer.kind === 'base'),
      ...(layer.kind === 'base' ? [level(edgeRight, right, bottom)] : []),
      level(edgeRight, right, top),
    );
  commands.push(...unitRow(document, unit, scale, edgeRight + clearance / scale, right, units));
  if (buildUp?.geotextile)
    commands.push({
      kind: 'line',
      from: [edgeRight, ground.top],
      to: [right, ground.top],
      stroke: { width: PENS.thick, colour: INK, dash: [3, 1.2] },
    });
  commands.push({
    kind: 'path',
    rings: [boxRing({ left, top: datum, right: edgeRight, bottom: ground.bottom })],
    fill: inkMix(PAPER, INK, 0.12),
    stroke: { width: PENS.medium, colour: INK },
  });

  // Figures: each layer, and all down to the bottom of the dig.
  const known = placed.filter(({ layer }) => layer.kind !== 'ground');
  for (const { layer, top, bottom } of known)
    if (layer.thickness !== null && layer.thickness > 0)
      commands.push(
        ...dimension(left - 5, top, bottom, figureText(layer.thickness, display, 1), left),
      );
  if (buildUp) {
    const depth = unit.thickness + buildUp.bedding + buildUp.base - finish;
    commands.push(
      ...dimension(left - 16, datum, ground.top, figureText(depth, display, 1), left, datum),
    );
  }
  const nameLeft = right + 12;
  const names = [
    { text: 'Datum: the edge’s top, as built', y: datum, x: edgeRight - 0.5 },
    ...placed.map(({ layer, top, bottom }) => ({
      text: layerName(layer, display),
      y: (top + bottom) / 2,
      x: right,
    })),
  ];
  commands.push(...leaders(names, nameLeft, boxWidth(box) - (nameLeft - box.left)));
  return commands;
}

function layerName({ name, kind, thickness }: SectionLayer, display: 'metric' | 'imperial') {
  if (kind === 'ground') return name;
  return thickness === null
    ? `${name}: not entered yet`
    : `${name}: ${lengthText(thickness, display, 1)}`;
}

const level = (left: number, right: number, y: number): DrawCommand => ({
  kind: 'line',
  from: [left, y],
  to: [right, y],
  stroke: { width: PENS.medium, colour: INK },
});

/** Units side by side from the gap at the edge, as far as the section goes; fill in the gap and the joints. */
function unitRow(
  { bond, clearance }: LayoutDocument,
  unit: Unit,
  scale: number,
  first: number,
  right: number,
  { top, bottom }: { readonly top: number; readonly bottom: number },
): readonly DrawCommand[] {
  const joint = 'joint' in bond && bond.joint !== undefined ? bond.joint : 0;
  const stroke = { width: PENS.medium, colour: INK };
  const commands: DrawCommand[] = [];
  const gapLeft = first - clearance / scale;
  if (first - gapLeft > 0.4) commands.push(grain(gapLeft, first, top, bottom, false));
  for (let x = first; x < right - 0.5;) {
    const end = Math.min(x + unit.length / scale, right);
    commands.push({
      kind: 'path',
      rings: [boxRing({ left: x, top, right: end, bottom })],
      fill: inkMix(PAPER, INK, 0.06),
      stroke,
    });
    x = end + joint / scale;
  }
  return commands;
}

/** Marks on a grid, each shaken off its place the same way every time: stones for a base, dots for finer stuff. */
function grain(
  left: number,
  right: number,
  top: number,
  bottom: number,
  coarse: boolean,
): DrawCommand {
  const [pitch, size] = coarse ? [3, 0.9] : [1.5, 0.22];
  const shaken = (n: number) => ((Math.sin(n * 12.9898) * 43758.5453) % 1) * 0.5 * pitch;
  const rings: PathRing[] = [];
  let n = 0;
  for (let row = top + pitch / 2; row < bottom; row += pitch)
    for (let column = left + pitch / 2; column < right; column += pitch) {
      n += 2;
      const [x, y] = [column + shaken(n), row + shaken(n + 1)];
      if (x < left + size || x > right - size || y < top + size || y > bottom - size) continue;
      rings.push({
        points: [
          [x - size, y + size * 0.7],
          [x + size, y + size * 0.5],
          [x + size * 0.1, y - size * 0.8],
        ],
        closed: true,
      });
    }
  return coarse
    ? { kind: 'path', rings, stroke: { width: PENS.fine, colour: INK } }
    : { kind: 'path', rings, fill: INK };
}

function groundHatch(
  left: number,
  right: number,
  top: number,
  bottom: number,
): readonly DrawCommand[] {
  const rings: PathRing[] = [];
  const deep = Math.min(bottom - top, 6);
  for (let x = left; x < right; x += 3) {
    const reach = Math.min(deep, right - x);
    rings.push({
      points: [
        [x, top + deep],
        [x + reach, top + deep - reach],
      ],
      closed: false,
    });
  }
  return [{ kind: 'path', rings, stroke: { width: PENS.fine, colour: INK } }];
}

/** An upright dimension at `x` with lines out to it, its figure at its left side. */
function dimension(
  x: number,
  top: number,
  bottom: number,
  text: string,
  from: number,
  topLine = top,
): readonly DrawCommand[] {
  const stroke = { width: PENS.fine, colour: INK };
  const u: PaperPoint = [0, 1];
  const normal: PaperPoint = [1, 0];
  const high = bottom - top;
  const upright = textWidth(text, LETTERING.small) + 3 <= high;
  const middle: PaperPoint = [x - 2.4, (top + bottom) / 2];
  const turnDeg = upright ? 90 : 0;
  const at = upright
    ? baselineCentred(middle, LETTERING.small, turnDeg)
    : ([x - 1.6, (top + bottom) / 2 + LETTERING.small / 2] as const);
  return [
    { kind: 'line', from: [x, top], to: [x, bottom], stroke },
    ...[topLine, bottom].map((y): DrawCommand => ({
      kind: 'line',
      from: [x - 1, y],
      to: [from - 1, y],
      stroke,
    })),
    tick([x, top], u, normal),
    tick([x, bottom], u, normal),
    {
      kind: 'text',
      at,
      text,
      height: LETTERING.small,
      weight: 600,
      anchor: upright ? 'middle' : 'end',
      turnDeg,
      colour: INK,
      frame: FRAME,
    },
  ];
}

/** Names one under another, in two lines where they must, each with a line to what it names. */
function leaders(
  names: readonly { readonly text: string; readonly x: number; readonly y: number }[],
  left: number,
  width: number,
): readonly DrawCommand[] {
  const SPACE = 1.2;
  const stroke = { width: PENS.fine, colour: INK };
  let lowest = -Infinity;
  return names.flatMap(({ text, x, y }) => {
    const lines = textLines(text, width - 1, LETTERING.small);
    const half = (lines.length * LINE_PITCH) / 2;
    const at = Math.max(y, lowest + half);
    lowest = at + half + SPACE;
    return [
      { kind: 'line', from: [x, y], to: [left - 6, y], stroke },
      { kind: 'line', from: [left - 6, y], to: [left - 1.2, at], stroke },
      ...lines.map((line, n) =>
        panelText([left, at - half + (n + 0.5) * LINE_PITCH + LETTERING.small / 2], line, FRAME),
      ),
    ] as readonly DrawCommand[];
  });
}

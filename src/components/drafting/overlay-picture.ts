import type { Point } from '@/geometry/point';
import {
  documentRing,
  documentRingCount,
  edgeLength,
  edgeMiddle,
  vertexBulge,
  arcRadius,
  vertexPoint,
} from '@/paving/ground-edits';
import { keepOutName } from '@/paving/edge-names';
import type { EdgeAddress } from '@/paving/fit/fit';
import { formatLength } from '@/paving/length';
import { unitCorners } from '@/paving/laying';
import type { DrawingColours } from '../ui/drawing-colours';
import { paintLetters } from './corner-letters';
import { dimensionLines } from './dimension-lines';
import type { Floor } from './floor';
import { paintLevelMarks, paintLevels } from './levels-picture';
import {
  boxedText,
  dot,
  FONT,
  liveSegment,
  path,
  screen,
  segment,
  strokeLive,
  type Ink,
} from './overlay-ink';
import { paintSetOut } from './set-out/set-out-picture';
import { edgeOutline, ringOutline } from './ring-outline';
import { shownDocument, type Pick, type TableState } from './table-store';
import { turnHandle } from './tools/slide-pattern';

function paintRings(ink: Ink) {
  const { ctx, document, colours } = ink;
  for (let ring = documentRingCount(document) - 1; ring >= 0; ring--) {
    path(ink, ringOutline(documentRing(document, ring)), true);
    if (ring > 0) {
      ctx.fillStyle = colours.stone50;
      ctx.fill();
    }
    ctx.strokeStyle = colours.graphite;
    ctx.lineWidth = ring === 0 ? 2.4 : 1.4;
    ctx.lineJoin = 'miter';
    ctx.stroke();
  }
  for (let ring = 1; ring < documentRingCount(document); ring++) paintKeepOutName(ink, ring);
}

function paintKeepOutName(ink: Ink, ring: number) {
  const { ctx, document, colours } = ink;
  const outline = ringOutline(documentRing(document, ring));
  const xs = outline.map((p) => screen(ink, p)[0]);
  const ys = outline.map((p) => screen(ink, p)[1]);
  const [left, right, top, bottom] = [
    Math.min(...xs),
    Math.max(...xs),
    Math.min(...ys),
    Math.max(...ys),
  ];
  const name = `${keepOutName(ring)} ${document.ground.keepOuts[ring - 1].name}`;
  ctx.font = `400 12px ${FONT}`;
  ctx.save();
  path(ink, outline, true);
  ctx.clip();
  ctx.strokeStyle = colours.slate;
  ctx.lineWidth = 0.7;
  segment(ctx, [left, top], [right, bottom]);
  segment(ctx, [left, bottom], [right, top]);
  ctx.restore();
  if (ctx.measureText(name).width + 8 > right - left || bottom - top < 24) return;
  boxedText(ink, name, [(left + right) / 2, (top + bottom) / 2], 0, colours.slate);
}

/** Boxes that labels have taken: one that would lie over another is left away. */
type Taken = { readonly x: number; readonly y: number; readonly half: number }[];

function paintDimensions(ink: Ink, ring: number, picked: Pick | null, taken: Taken) {
  const { ctx, document, colours, camera, size } = ink;
  const vertices = documentRing(document, ring);
  const lines = dimensionLines(vertices, camera, size, ring === 0 ? 1 : -1);
  // The longest first: where there is no room for all, those are the ones that matter.
  for (const line of [...lines].sort((p, q) => q.lengthPx - p.lengthPx)) {
    const arc = vertexBulge(vertices[line.edge]) !== 0;
    const length = formatLength(edgeLength(vertices, line.edge), document.display, { unit: false });
    const text = arc
      ? `${length} arc, R ${formatLength(arcRadius(vertices, line.edge), document.display, { unit: false })}`
      : length;
    ctx.font = `400 12.5px ${FONT}`;
    const room = arc ? Infinity : line.lengthPx;
    if (ctx.measureText(text).width + 12 > room) continue;
    const live = picked?.kind === 'edge' && picked.ring === ring && picked.edge === line.edge;
    const half = ctx.measureText(text).width / 2 + 6;
    const [lx, ly] = line.middle;
    const reach = Math.max(10, arc ? half : half * Math.abs(Math.cos(line.angle)));
    if (!live && taken.some((t) => Math.abs(t.x - lx) < t.half + reach && Math.abs(t.y - ly) < 20))
      continue;
    if (ring === 0 || live) taken.push({ x: lx, y: ly, half: reach });
    const colour = live ? colours.line : colours.slate;
    ctx.strokeStyle = colour;
    ctx.lineWidth = 0.8;
    if (!arc && ring === 0) {
      segment(ctx, line.from, line.to);
      segment(ctx, line.edgeFrom, overshoot(line.edgeFrom, line.from));
      segment(ctx, line.edgeTo, overshoot(line.edgeTo, line.to));
      for (const end of [line.from, line.to])
        segment(ctx, [end[0] - 4, end[1] + 4], [end[0] + 4, end[1] - 4]);
    }
    if (ring === 0 || live) {
      const at = arc
        ? clearOf(line.edgeMiddle, line.out, ctx.measureText(text).width / 2 + 8)
        : line.middle;
      boxedText(
        ink,
        text,
        at,
        arc ? 0 : line.angle,
        live ? colours.line : colours.graphite,
        live ? 600 : 400,
      );
    }
  }
}

/** Middle of a level label of that half width, moved out from `at` until it is clear of it. */
const clearOf = (at: Point, out: Point, half: number): Point => [
  at[0] + out[0] * (16 + half * Math.abs(out[0])),
  at[1] + out[1] * (16 + half * Math.abs(out[0])),
];

const overshoot = (from: Point, to: Point): Point => {
  const length = Math.hypot(to[0] - from[0], to[1] - from[1]) || 1;
  return [to[0] + ((to[0] - from[0]) / length) * 5, to[1] + ((to[1] - from[1]) / length) * 5];
};

function paintPick(ink: Ink, pick: Pick, strong: boolean) {
  const { ctx, document, colours } = ink;
  if (pick.ring >= documentRingCount(document)) return;
  const ring = documentRing(document, pick.ring);
  ctx.strokeStyle = colours.line;
  if (pick.kind === 'edge') {
    if (pick.edge >= ring.length) return;
    path(ink, edgeOutline(ring, pick.edge), false);
    strokeLive(ink, strong ? 3.2 : 2);
    if (strong) {
      const [x, y] = screen(ink, edgeMiddle(ring, pick.edge));
      ctx.beginPath();
      ctx.moveTo(x, y - 7);
      ctx.lineTo(x + 7, y);
      ctx.lineTo(x, y + 7);
      ctx.lineTo(x - 7, y);
      ctx.closePath();
      ctx.fillStyle = colours.stone50;
      ctx.fill();
      ctx.lineWidth = 2;
      ctx.stroke();
    }
  } else if (pick.vertex < ring.length)
    dot(
      ctx,
      screen(ink, vertexPoint(ring[pick.vertex])),
      strong ? 7 : 6,
      strong ? colours.line : colours.stone50,
      colours.line,
    );
}

function paintHandles(ink: Ink, state: TableState) {
  const { ctx, document, colours } = ink;
  for (let ring = 0; ring < documentRingCount(document); ring++)
    for (const vertex of documentRing(document, ring))
      dot(ctx, screen(ink, vertexPoint(vertex)), 4, colours.stone50, colours.graphite);
  if (state.hover) paintPick(ink, state.hover, false);
  if (state.pick) paintPick(ink, state.pick, true);
}

function paintDrawing(ink: Ink, state: TableState) {
  const { drawing } = state;
  if (!drawing) return;
  const { ctx, colours } = ink;
  const points = drawing.next ? [...drawing.corners, drawing.next] : drawing.corners;
  path(ink, points, false);
  strokeLive(ink, 2.4);
  if (points.length > 2 && drawing.next) {
    ctx.setLineDash([4, 5]);
    ctx.lineWidth = 1;
    path(ink, [points[points.length - 1], points[0]], false);
    ctx.stroke();
    ctx.setLineDash([]);
  }
  drawing.corners.forEach((corner, n) =>
    dot(
      ctx,
      screen(ink, corner),
      n === 0 ? 6 : 4,
      n === 0 ? colours.line : colours.stone50,
      colours.line,
    ),
  );
  if (drawing.next) dot(ctx, screen(ink, drawing.next), 5, colours.stone50, colours.line);
  const last = drawing.corners.at(-1);
  if (last && drawing.next) {
    const length = Math.hypot(drawing.next[0] - last[0], drawing.next[1] - last[1]);
    const a = screen(ink, last);
    const b = screen(ink, drawing.next);
    if (length > 0)
      boxedText(
        ink,
        formatLength(length, ink.document.display),
        [(a[0] + b[0]) / 2, (a[1] + b[1]) / 2 - 16],
        0,
        colours.line,
        600,
      );
  }
}

function paintGuides(ink: Ink, state: TableState) {
  const { ctx, colours } = ink;
  ctx.strokeStyle = colours.line;
  ctx.lineWidth = 0.9;
  ctx.setLineDash([2, 4]);
  for (const guide of state.guides) {
    const [from, to] = [screen(ink, guide.from), screen(ink, guide.to)];
    segment(ctx, from, to);
  }
  ctx.setLineDash([]);
}

/** Where a ring crosses or keep-outs clash: a brick-red ring with a cross, large enough to be found. */
function paintProblems(ink: Ink, floor: Floor) {
  const { ctx, colours } = ink;
  for (const problem of floor.problems) {
    if (!problem.at) continue;
    const [x, y] = screen(ink, problem.at);
    ctx.strokeStyle = colours.brick;
    ctx.lineWidth = 2.5;
    ctx.beginPath();
    ctx.arc(x, y, 13, 0, 2 * Math.PI);
    ctx.stroke();
    segment(ctx, [x - 6, y - 6], [x + 6, y + 6]);
    segment(ctx, [x - 6, y + 6], [x + 6, y - 6]);
  }
}

/** The edges that the start is held to; of two that are being pointed at, the first is live. */
function paintHolds(ink: Ink, { hold, holding }: TableState) {
  const { ctx, document, colours } = ink;
  const along = ([ring, edge]: EdgeAddress, colour: string) => {
    if (ring >= documentRingCount(document)) return;
    const corners = documentRing(document, ring);
    if (edge >= corners.length) return;
    path(ink, edgeOutline(corners, edge), false);
    ctx.strokeStyle = colour;
    ctx.lineWidth = 4.5;
    ctx.stroke();
  };
  for (const one of hold)
    for (const edge of 'edge' in one ? [one.edge] : one.between) along(edge, colours.vial);
  if (holding?.first) along(holding.first, colours.line);
}

/** The unit that would go first, and the gap that would close. */
function paintLeastGap(ink: Ink, floor: Floor) {
  const { laying, leastGap } = floor;
  if (!laying || !leastGap) return;
  const { ctx, colours } = ink;
  const n = leastGap.unit;
  const motif = laying.motif[laying.laid.k[n]];
  path(ink, unitCorners(motif, laying.laid.x[n], laying.laid.y[n]), true);
  strokeLive(ink, 1.8);
  const edgePoint = screen(ink, leastGap.edgePoint);
  const unitPoint = screen(ink, leastGap.unitPoint);
  liveSegment(ink, unitPoint, edgePoint, 1.8);
  dot(ctx, edgePoint, 4, colours.line);

  const text = `goes first: ${formatLength(leastGap.gap, ink.document.display, { decimals: leastGap.gap < 10 ? 1 : 0 })}`;
  ctx.font = `600 12.5px ${FONT}`;
  const width = ctx.measureText(text).width + 16;
  // The label stands outside the edge, where it hides no unit, and inside the window.
  const away: Point = [edgePoint[0] - unitPoint[0], edgePoint[1] - unitPoint[1]];
  const length = Math.hypot(...away) || 1;
  const x = edgePoint[0] + (away[0] / length) * (width / 2 + 14);
  const y = edgePoint[1] + (away[1] / length) * 26 - (Math.abs(away[1]) < 0.4 * length ? 22 : 0);
  const left = Math.min(Math.max(x - width / 2, 4), ink.size.width - width - 4);
  const top = Math.min(Math.max(y - 11, 4), ink.size.height - 26);
  ctx.fillStyle = colours.line;
  ctx.fillRect(left, top, width, 22);
  ctx.fillStyle = colours.onLine;
  ctx.textAlign = 'left';
  ctx.textBaseline = 'middle';
  ctx.fillText(text, left + 8, top + 11.5);
}

/** A spot of the edge and the gap there, lit from the floor or from the ribbon. */
function paintLit(ink: Ink, state: TableState, floor: Floor) {
  const { lit } = state;
  if (!lit || !floor.laying) return;
  const edge = floor.laying.ground.rings[lit.ring]?.edges[lit.edge];
  if (!edge) return;
  let left = lit.s;
  for (let n = 1; n < edge.chords.length; n++) {
    const [a, b] = [edge.chords[n - 1], edge.chords[n]];
    const length = Math.hypot(b[0] - a[0], b[1] - a[1]);
    if (left > length && n < edge.chords.length - 1) {
      left -= length;
      continue;
    }
    const t = length === 0 ? 0 : Math.min(1, left / length);
    const at: Point = [a[0] + (b[0] - a[0]) * t, a[1] + (b[1] - a[1]) * t];
    const side = lit.ring === 0 ? 1 : -1;
    const inward: Point = [(-(b[1] - a[1]) / length) * side, ((b[0] - a[0]) / length) * side];
    const gap = gapAt(floor, lit.ring, lit.edge, lit.s);
    const to: Point = [at[0] + inward[0] * (gap ?? 0), at[1] + inward[1] * (gap ?? 0)];
    liveSegment(ink, screen(ink, at), screen(ink, to), 2);
    dot(ink.ctx, screen(ink, at), 4.5, ink.colours.line);
    if (gap !== null) {
      const [x, y] = screen(ink, to);
      boxedText(
        ink,
        formatLength(gap, ink.document.display),
        [x + 4, y - 16],
        0,
        ink.colours.line,
        600,
      );
    }
    return;
  }
}

/** The gap over the edge at `s`, mm; null where nothing faces it there. */
export function gapAt(floor: Floor, ring: number, edge: number, s: number): number | null {
  const profile = floor.profile.find((p) => p.ring === ring && p.edge === edge);
  const stretch = profile?.stretches.find((part) => s >= part.from && s <= part.to);
  if (!stretch) return null;
  const { line } = stretch;
  for (let n = 1; n < line.length; n++) {
    const [a, b] = [line[n - 1], line[n]];
    if (s <= b[0] || n === line.length - 1) {
      const t = b[0] === a[0] ? 0 : Math.min(1, Math.max(0, (s - a[0]) / (b[0] - a[0])));
      return a[1] + (b[1] - a[1]) * t;
    }
  }
  return line[0]?.[1] ?? null;
}

/** The unit chosen with the keys while lifting. */
function paintChosenUnit(ink: Ink, state: TableState, floor: Floor) {
  const { laying } = floor;
  if (!laying || !state.unit || state.tool !== 'lift') return;
  const [i, j, k] = state.unit;
  const entry = laying.motif[k];
  if (!entry) return;
  const radians = (ink.document.placement.turn * Math.PI) / 180;
  const [cos, sin] = [Math.cos(radians), Math.sin(radians)];
  const { a, b } = laying.lattice;
  const x = laying.origin[0] + i * a[0] + j * b[0] + entry.at[0] * cos - entry.at[1] * sin;
  const y = laying.origin[1] + i * a[1] + j * b[1] + entry.at[0] * sin + entry.at[1] * cos;
  path(ink, unitCorners(entry, x, y), true);
  strokeLive(ink, 2.6);
}

function paintTurnHandle(ink: Ink, state: TableState) {
  const handle = turnHandle(state, ink.document);
  if (!handle) return;
  const { ctx, colours } = ink;
  liveSegment(ink, handle.pivot, handle.handle, 1.6);
  dot(ctx, handle.pivot, 3.5, colours.line);
  dot(ctx, handle.handle, 8, colours.stone50, colours.line);
  dot(ctx, handle.handle, 2.5, colours.line);
  if (state.preview)
    boxedText(
      ink,
      `${Number(ink.document.placement.turn.toFixed(2))}°`,
      [handle.handle[0], handle.handle[1] - 20],
      0,
      colours.line,
      600,
    );
}

/** Everything over the floor: edge, dimensions, handles, guides, what is live and what is wrong. */
export function paintOverlay(
  ctx: CanvasRenderingContext2D,
  state: TableState,
  floor: Floor,
  colours: DrawingColours,
) {
  if (!state.camera) return;
  const ink: Ink = {
    ctx,
    colours,
    camera: state.camera,
    size: state.size,
    document: shownDocument(state),
  };
  const editing = state.step === 'ground';
  const replacing = state.drawing?.target === 'perimeter';
  const levelling = state.step === 'levels';
  ctx.save();
  ctx.globalAlpha = replacing ? 0.25 : 1;
  if (levelling) paintLevels(ink, state, floor);
  paintRings(ink);
  const taken: Taken = [];
  for (let ring = 0; ring < documentRingCount(ink.document) && !levelling; ring++)
    paintDimensions(ink, ring, editing ? state.pick : null, taken);
  paintLetters(ink);
  ctx.globalAlpha = 1;
  if (state.step === 'fit') paintHolds(ink, state);
  if (state.step === 'fit' && state.tool !== 'align' && state.tool !== 'hold')
    paintLeastGap(ink, floor);
  if (levelling) paintLevelMarks(ink, state, floor);
  if (state.step === 'setOut') paintSetOut(ink, state, floor);
  if (editing && !state.drawing) paintHandles(ink, state);
  if ((state.tool === 'align' || state.tool === 'hold') && state.hover)
    paintPick(ink, state.hover, false);
  if (state.step === 'fit' && state.tool === 'slide') paintTurnHandle(ink, state);
  paintChosenUnit(ink, state, floor);
  paintGuides(ink, state);
  paintDrawing(ink, state);
  if (!state.drawing) paintProblems(ink, floor);
  paintLit(ink, state, floor);
  ctx.restore();
}

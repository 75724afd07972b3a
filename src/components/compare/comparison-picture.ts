import { UNIT_FATE, type UnitMatching } from '@/paving/comparison';
import type { Laying } from '@/paving/laying';
import { paintPieces } from '../drafting/cutting/piece-picture';
import { piecesOf } from '../drafting/cutting/shown-pieces';
import { paintFloor } from '../drafting/floor-picture';
import type { Picture } from '../floor-window/FloorWindow';
import { paintGroundLines } from '../floor-window/ground-lines';
import {
  colourShaded,
  PLAIN_AGGREGATE,
  PLAIN_UNIT,
  type DrawingColours,
} from '../ui/drawing-colours';

/** What became of a unit, as it is drawn: by hatching and sign, not by colour alone. */
export type Fate = 'kept' | 'moved' | 'gone' | 'new';

/** Below this many pixels across, a unit has no outline of its own. */
const OUTLINE_FROM_PX = 4;
/** A shift shorter than this on the screen has no arrow. */
const ARROW_FROM_PX = 7;
/** Units in one path: what a browser takes to fill a path grows faster than what is in it. */
const PATH_UNITS = 200;
const TILE = 8;

const tiles = new Map<string, HTMLCanvasElement>();

/** Hatching of a fate: strokes for gone, plus signs for new, level lines for moved. */
function hatching(
  ctx: CanvasRenderingContext2D,
  fate: Fate,
  colour: string,
  ground: string | null,
  ratio: number,
) {
  const key = `${fate} ${colour} ${ground} ${ratio}`;
  let tile = tiles.get(key);
  if (!tile) {
    tile = document.createElement('canvas');
    tile.width = tile.height = TILE * ratio;
    const into = tile.getContext('2d')!;
    into.scale(ratio, ratio);
    if (ground) {
      into.fillStyle = ground;
      into.fillRect(0, 0, TILE, TILE);
    }
    into.strokeStyle = colour;
    into.lineWidth = 1.2;
    into.beginPath();
    if (fate === 'gone')
      for (const from of [-TILE, 0, TILE]) {
        into.moveTo(from - 1, TILE + 1);
        into.lineTo(from + TILE + 1, -1);
      }
    else if (fate === 'new') {
      into.moveTo(1.5, 4);
      into.lineTo(6.5, 4);
      into.moveTo(4, 1.5);
      into.lineTo(4, 6.5);
    } else {
      into.moveTo(0, 4);
      into.lineTo(TILE, 4);
    }
    into.stroke();
    tiles.set(key, tile);
  }
  const pattern = ctx.createPattern(tile, 'repeat');
  pattern?.setTransform(new DOMMatrix([1 / ratio, 0, 0, 1 / ratio, 0, 0]));
  return pattern ?? colour;
}

const fateColour = (fate: Fate, { onFloor }: DrawingColours): string =>
  fate === 'gone'
    ? onFloor.brick
    : fate === 'new'
      ? onFloor.vial
      : fate === 'moved'
        ? onFloor.amber
        : onFloor.graphite;

interface Halves {
  readonly ax: number;
  readonly ay: number;
  readonly bx: number;
  readonly by: number;
  readonly reach: number;
}

const halvesOf = (laying: Laying, scale: number): Halves[] =>
  laying.motif.map(({ halfLength: [lx, ly], halfWidth: [wx, wy] }) => ({
    ax: lx * scale,
    ay: -ly * scale,
    bx: wx * scale,
    by: -wy * scale,
    reach: (Math.hypot(lx, ly) + Math.hypot(wx, wy)) * scale,
  }));

const leastAcross = (laying: Laying) =>
  2 *
  Math.min(
    ...laying.motif.map(({ halfLength, halfWidth }) =>
      Math.min(Math.hypot(...halfLength), Math.hypot(...halfWidth)),
    ),
  );

/** Draws every unit of a fate, some at a time; those outside the window are left out. */
function drawFate(
  { ctx, camera, size }: Picture,
  laying: Laying,
  fates: Uint8Array,
  fate: number,
  draw: () => void,
  towards?: { laying: Laying; partner: Int32Array; share: number },
) {
  const { scale, centre } = camera;
  const halves = halvesOf(laying, scale);
  const { laid } = laying;
  let inPath = 0;
  ctx.beginPath();
  for (let n = 0; n < laid.count; n++) {
    if (fates[n] !== fate) continue;
    let [gx, gy] = [laid.x[n], laid.y[n]];
    const half = halves[laid.k[n]];
    if (towards) {
      const m = towards.partner[n];
      gx += (towards.laying.laid.x[m] - gx) * towards.share;
      gy += (towards.laying.laid.y[m] - gy) * towards.share;
    }
    const x = size.width / 2 + (gx - centre[0]) * scale;
    const y = size.height / 2 - (gy - centre[1]) * scale;
    if (x + half.reach < 0 || x - half.reach > size.width) continue;
    if (y + half.reach < 0 || y - half.reach > size.height) continue;
    ctx.moveTo(x + half.ax + half.bx, y + half.ay + half.by);
    ctx.lineTo(x - half.ax + half.bx, y - half.ay + half.by);
    ctx.lineTo(x - half.ax - half.bx, y - half.ay - half.by);
    ctx.lineTo(x + half.ax - half.bx, y + half.ay - half.by);
    ctx.closePath();
    if (++inPath < PATH_UNITS) continue;
    draw();
    ctx.beginPath();
    inPath = 0;
  }
  if (inPath > 0) draw();
}

/** Fills and strokes the units in the path by what became of them; `ground` is the units' own colour. */
function fateBrush(
  { ctx, colours, pixelRatio }: Picture,
  fate: Fate,
  outlined: boolean,
  ground: string | null,
): () => void {
  const colour = fateColour(fate, colours);
  const fill =
    fate === 'kept' ? (ground ?? colour) : hatching(ctx, fate, colour, ground, pixelRatio);
  const width = fate === 'kept' ? 0.6 : 1.6;
  return () => {
    ctx.fillStyle = fill;
    ctx.fill();
    if (!outlined) return;
    ctx.strokeStyle = colour;
    ctx.lineWidth = width;
    ctx.stroke();
  };
}

/** Marks on one side's own picture what has no like on the other, and what lies elsewhere there. */
export function paintSideMarks(
  picture: Picture,
  laying: Laying,
  fates: Uint8Array,
  alone: 'gone' | 'new',
) {
  const outlined = leastAcross(laying) * picture.camera.scale >= OUTLINE_FROM_PX;
  picture.ctx.save();
  const drawn = (fate: Fate, code: number) =>
    drawFate(picture, laying, fates, code, fateBrush(picture, fate, outlined, null));
  drawn(alone, UNIT_FATE.single);
  drawn('moved', UNIT_FATE.moved);
  picture.ctx.restore();
}

function drawArrows(
  { ctx, camera, size, colours }: Picture,
  a: Laying,
  b: Laying,
  matching: UnitMatching,
) {
  const { scale, centre } = camera;
  ctx.strokeStyle = colours.onFloor.graphite;
  ctx.lineWidth = 1.2;
  ctx.beginPath();
  let inPath = 0;
  for (let n = 0; n < a.laid.count; n++) {
    if (matching.fateOfA[n] !== UNIT_FATE.moved) continue;
    const m = matching.partnerOfA[n];
    const x = size.width / 2 + (a.laid.x[n] - centre[0]) * scale;
    const y = size.height / 2 - (a.laid.y[n] - centre[1]) * scale;
    const dx = (b.laid.x[m] - a.laid.x[n]) * scale;
    const dy = -(b.laid.y[m] - a.laid.y[n]) * scale;
    const length = Math.hypot(dx, dy);
    if (length < ARROW_FROM_PX) continue;
    if (x < -length || y < -length || x > size.width + length || y > size.height + length) continue;
    const [ux, uy] = [dx / length, dy / length];
    const head = Math.min(5, length / 2.5);
    ctx.moveTo(x, y);
    ctx.lineTo(x + dx, y + dy);
    ctx.moveTo(x + dx - head * (ux + uy * 0.6), y + dy - head * (uy - ux * 0.6));
    ctx.lineTo(x + dx, y + dy);
    ctx.lineTo(x + dx - head * (ux - uy * 0.6), y + dy - head * (uy + ux * 0.6));
    if (++inPath < PATH_UNITS) continue;
    ctx.stroke();
    ctx.beginPath();
    inPath = 0;
  }
  ctx.stroke();
}

/**
 * Two floors laid over each other. `share` runs from 0, floor A alone, to 1, floor B alone; units that moved
 * are on their way between, and in the middle all that is gone and new is seen at once.
 */
export function paintOverlaid(
  picture: Picture,
  a: Laying,
  b: Laying,
  matching: UnitMatching,
  share: number,
) {
  const { ctx, camera, size, colours } = picture;
  const nearer = share < 0.5 ? a.document : b.document;
  const outlined = Math.min(leastAcross(a), leastAcross(b)) * camera.scale >= OUTLINE_FROM_PX;
  const unitColour = (laying: Laying) => laying.motif[0]?.unit.colour ?? PLAIN_UNIT;
  ctx.save();
  paintFloor(ctx, nearer, null, camera, size, colours);

  const drawn = (
    laying: Laying,
    fates: Uint8Array,
    fate: Fate,
    code: number,
    way?: { laying: Laying; partner: Int32Array; share: number },
  ) => {
    const brush = fateBrush(picture, fate, outlined, unitColour(laying));
    if (ctx.globalAlpha > 0) drawFate(picture, laying, fates, code, brush, way);
  };
  if (share < 0.5) drawn(a, matching.fateOfA, 'kept', UNIT_FATE.kept);
  else drawn(b, matching.fateOfB, 'kept', UNIT_FATE.kept);
  const near = share < 0.5 ? a : b;
  const cut = piecesOf(near);
  if (cut) {
    const dark = colourShaded(nearer.aggregate?.colour ?? PLAIN_AGGREGATE, -0.45);
    paintPieces(ctx, near, cut.pieces, camera, size, dark, colours.graphite);
  }
  ctx.globalAlpha = Math.min(1, 2 * (1 - share));
  drawn(a, matching.fateOfA, 'gone', UNIT_FATE.single);
  ctx.globalAlpha = Math.min(1, 2 * share);
  drawn(b, matching.fateOfB, 'new', UNIT_FATE.single);
  ctx.globalAlpha = 1;

  // A unit that was turned where it stands is shown as it lies on the nearer floor.
  const [own, partner, fates, other] =
    share < 0.5
      ? [a, matching.partnerOfA, matching.fateOfA, b]
      : [b, matching.partnerOfB, matching.fateOfB, a];
  const way = { laying: other, partner, share: share < 0.5 ? share : 1 - share };
  drawn(own, fates, 'moved', UNIT_FATE.moved, way);
  if (outlined && matching.moved > 0) drawArrows(picture, a, b, matching);
  ctx.restore();
  if (!sameGround(a, b)) paintGroundLines(picture, (share < 0.5 ? b : a).document, [5, 4]);
  paintGroundLines(picture, nearer);
}

const sameGround = (a: Laying, b: Laying): boolean =>
  JSON.stringify(a.document.ground) === JSON.stringify(b.document.ground);

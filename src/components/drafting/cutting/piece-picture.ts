import type { Point } from '@/geometry/point';
import type { CutPiece } from '@/paving/cutting/cut-pieces';
import { pieceMiddle, sawnRuns } from '@/paving/cutting/piece-edges';
import type { Laying } from '@/paving/laying';
import { unitTone } from '@/paving/tones';
import { PLAIN_UNIT } from '../../ui/drawing-colours';
import { screenFromGround, type Camera, type ScreenSize } from '../camera';

/** Hatching of a cut piece, px. */
const HATCH_PX = 8;
/** A piece smaller than this across on the screen, px, is not hatched and has no mark. */
const MARKED_FROM_PX = 9;
/** Pieces in one path: what a browser takes to fill a path grows faster than what is in it. */
const PATH_PIECES = 200;

interface Drawn {
  readonly piece: CutPiece;
  readonly colour: string;
  readonly rings: readonly (readonly Point[])[];
  readonly sawn: readonly (readonly Point[])[];
  readonly middle: Point;
  /** Of its box, mm. */
  readonly min: Point;
  readonly max: Point;
}

const drawn = new WeakMap<readonly CutPiece[], readonly Drawn[]>();

function drawnPieces(laying: Laying, pieces: readonly CutPiece[]): readonly Drawn[] {
  const known = drawn.get(pieces);
  if (known) return known;
  const { document, motif } = laying;
  const made = pieces.map((piece): Drawn => {
    const [i, j, k] = piece.unit;
    const second = document.tones && unitTone(document, i, j, k) === 1;
    const xs = piece.polygon.map(([x]) => x);
    const ys = piece.polygon.map(([, y]) => y);
    return {
      piece,
      colour: second ? document.tones!.second : (motif[k].unit.colour ?? PLAIN_UNIT),
      rings: [piece.polygon, ...(piece.holes ?? [])],
      sawn: sawnRuns(laying, piece),
      middle: pieceMiddle(piece),
      min: [Math.min(...xs), Math.min(...ys)],
      max: [Math.max(...xs), Math.max(...ys)],
    };
  });
  drawn.set(pieces, made);
  return made;
}

/**
 * Paints pieces cut at the edge: in their unit's colour, hatched, the sawn edges dashed; a dot in those smaller than a
 * third of a unit and a cross in those too narrow to lay, so that they tell in grey.
 */
export function paintPieces(
  ctx: CanvasRenderingContext2D,
  laying: Laying,
  pieces: readonly CutPiece[],
  camera: Camera,
  size: ScreenSize,
  dark: string,
  ink: string,
) {
  const { scale } = camera;
  const screen = (point: Point) => screenFromGround(camera, size, point);
  const seen = drawnPieces(laying, pieces).filter(({ min, max }) => {
    const [left, bottom] = screen(min);
    const [right, top] = screen(max);
    return right >= 0 && left <= size.width && bottom >= 0 && top <= size.height;
  });
  const trace = (points: readonly Point[], closed: boolean) => {
    points.forEach((point, n) => {
      const [x, y] = screen(point);
      if (n === 0) ctx.moveTo(x, y);
      else ctx.lineTo(x, y);
    });
    if (closed) ctx.closePath();
  };
  const across = ({ piece }: Drawn) => piece.width * scale;
  ctx.save();
  for (const [colour, group] of byColour(seen)) {
    ctx.fillStyle = colour;
    inPaths(group, (some) => {
      ctx.beginPath();
      for (const { rings } of some) rings.forEach((ring) => trace(ring, true));
      ctx.fill();
    });
  }
  const hatched = seen.filter((one) => across(one) >= MARKED_FROM_PX);
  ctx.fillStyle = hatching(ctx, dark);
  inPaths(hatched, (some) => {
    ctx.beginPath();
    for (const { rings } of some) rings.forEach((ring) => trace(ring, true));
    ctx.fill();
  });
  ctx.lineWidth = 0.6;
  ctx.strokeStyle = dark;
  inPaths(seen, (some) => {
    ctx.beginPath();
    for (const { rings } of some) rings.forEach((ring) => trace(ring, true));
    ctx.stroke();
  });
  ctx.strokeStyle = ink;
  ctx.lineWidth = 1.4;
  ctx.setLineDash([4, 3]);
  inPaths(seen, (some) => {
    ctx.beginPath();
    for (const { sawn } of some) sawn.forEach((run) => trace(run, false));
    ctx.stroke();
  });
  ctx.setLineDash([]);
  ctx.fillStyle = ink;
  for (const { piece, middle } of seen) {
    const [x, y] = screen(middle);
    if (piece.narrow) {
      ctx.beginPath();
      ctx.moveTo(x - 3.5, y - 3.5);
      ctx.lineTo(x + 3.5, y + 3.5);
      ctx.moveTo(x - 3.5, y + 3.5);
      ctx.lineTo(x + 3.5, y - 3.5);
      ctx.stroke();
    } else if (piece.underThird && piece.width * scale >= MARKED_FROM_PX) {
      ctx.beginPath();
      ctx.arc(x, y, 2.6, 0, 2 * Math.PI);
      ctx.fill();
    }
  }
  ctx.restore();
}

function byColour(pieces: readonly Drawn[]): Map<string, Drawn[]> {
  const groups = new Map<string, Drawn[]>();
  for (const piece of pieces) {
    const group = groups.get(piece.colour);
    if (group) group.push(piece);
    else groups.set(piece.colour, [piece]);
  }
  return groups;
}

function inPaths(pieces: readonly Drawn[], paint: (some: readonly Drawn[]) => void) {
  for (let n = 0; n < pieces.length; n += PATH_PIECES) paint(pieces.slice(n, n + PATH_PIECES));
}

const TILE_RATIO = 2;
const tiles = new Map<string, HTMLCanvasElement>();

/** Slanting lines as a pattern: one fill for all pieces, where a clip for each would cost frames. */
function hatching(ctx: CanvasRenderingContext2D, colour: string): CanvasPattern | string {
  let tile = tiles.get(colour);
  if (!tile) {
    tile = document.createElement('canvas');
    tile.width = tile.height = HATCH_PX * TILE_RATIO;
    const into = tile.getContext('2d')!;
    into.scale(TILE_RATIO, TILE_RATIO);
    into.strokeStyle = colour;
    into.lineWidth = 0.7;
    into.beginPath();
    for (const from of [-HATCH_PX, 0, HATCH_PX]) {
      into.moveTo(from - 1, HATCH_PX + 1);
      into.lineTo(from + HATCH_PX + 1, -1);
    }
    into.stroke();
    tiles.set(colour, tile);
  }
  const pattern = ctx.createPattern(tile, 'repeat');
  pattern?.setTransform(new DOMMatrix([1 / TILE_RATIO, 0, 0, 1 / TILE_RATIO, 0, 0]));
  return pattern ?? 'transparent';
}

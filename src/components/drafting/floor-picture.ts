import type { LayoutDocument } from '@/paving/layout-document';
import { documentRing, documentRingCount } from '@/paving/ground-edits';
import type { CutPieces } from '@/paving/cutting/cut-pieces';
import type { Laying, UnitSet } from '@/paving/laying';
import { colourShaded, PLAIN_AGGREGATE, type DrawingColours } from '../ui/drawing-colours';
import { screenFromGround, type Camera, type ScreenSize } from './camera';
import { paintPieces } from './cutting/piece-picture';
import { rasterUnits, unitColours } from './floor-raster';
import { ringOutline } from './ring-outline';

/** Laid units of one colour: their places in `laying.laid`. */
interface ColourBatch {
  readonly colour: string;
  readonly indices: Uint32Array;
}

/** A path is painted after so many units: a browser fills one path of thousands in more than square time. */
const UNITS_A_PATH = 400;

/** Below this many pixels across, a unit has no outline of its own. */
const OUTLINE_FROM_PX = 5;

const batches = new WeakMap<Laying, readonly ColourBatch[]>();

function colourBatches(laying: Laying): readonly ColourBatch[] {
  const known = batches.get(laying);
  if (known) return known;
  const { palette, of } = unitColours(laying);
  const counts = new Uint32Array(palette.length);
  for (const colour of of) counts[colour]++;
  const indices = Array.from(counts, (count) => new Uint32Array(count));
  counts.fill(0);
  for (let n = 0; n < of.length; n++) indices[of[n]][counts[of[n]]++] = n;
  const made = palette.flatMap((colour, at) =>
    indices[at].length > 0 ? [{ colour, indices: indices[at] }] : [],
  );
  batches.set(laying, made);
  return made;
}

function traceRings(
  ctx: CanvasRenderingContext2D,
  document: LayoutDocument,
  camera: Camera,
  size: ScreenSize,
) {
  ctx.beginPath();
  for (let ring = 0; ring < documentRingCount(document); ring++) {
    ringOutline(documentRing(document, ring)).forEach((point, n) => {
      const [x, y] = screenFromGround(camera, size, point);
      if (n === 0) ctx.moveTo(x, y);
      else ctx.lineTo(x, y);
    });
    ctx.closePath();
  }
}

/** Traces the outlines of units, those outside the window left out, and paints them with `paint`, path by path. */
function paintUnits(
  ctx: CanvasRenderingContext2D,
  laying: Laying,
  set: UnitSet,
  indices: Uint32Array | null,
  camera: Camera,
  size: ScreenSize,
  paint: () => void,
) {
  const { scale, centre } = camera;
  const halves = laying.motif.map((entry) => ({
    ax: entry.halfLength[0] * scale,
    ay: -entry.halfLength[1] * scale,
    bx: entry.halfWidth[0] * scale,
    by: -entry.halfWidth[1] * scale,
    reach: (Math.hypot(...entry.halfLength) + Math.hypot(...entry.halfWidth)) * scale,
  }));
  const count = indices ? indices.length : set.count;
  let traced = 0;
  ctx.beginPath();
  for (let m = 0; m < count; m++) {
    const n = indices ? indices[m] : m;
    const half = halves[set.k[n]];
    const x = size.width / 2 + (set.x[n] - centre[0]) * scale;
    const y = size.height / 2 - (set.y[n] - centre[1]) * scale;
    if (x + half.reach < 0 || x - half.reach > size.width) continue;
    if (y + half.reach < 0 || y - half.reach > size.height) continue;
    ctx.moveTo(x + half.ax + half.bx, y + half.ay + half.by);
    ctx.lineTo(x - half.ax + half.bx, y - half.ay + half.by);
    ctx.lineTo(x - half.ax - half.bx, y - half.ay - half.by);
    ctx.lineTo(x + half.ax - half.bx, y + half.ay - half.by);
    ctx.closePath();
    traced += 1;
    if (traced % UNITS_A_PATH === 0) {
      paint();
      ctx.beginPath();
    }
  }
  if (traced % UNITS_A_PATH !== 0) paint();
}

const GRAIN_TILE = 192;
const grains = new Map<string, HTMLCanvasElement>();

/** A tile of quiet grain in the aggregate's colour: the same specks each time. */
function grainTile(colour: string): HTMLCanvasElement {
  const known = grains.get(colour);
  if (known) return known;
  const tile = document.createElement('canvas');
  tile.width = tile.height = GRAIN_TILE;
  const ctx = tile.getContext('2d')!;
  ctx.fillStyle = colour;
  ctx.fillRect(0, 0, GRAIN_TILE, GRAIN_TILE);
  let state = 12345;
  const next = () => (state = (Math.imul(state, 1664525) + 1013904223) >>> 0) / 2 ** 32;
  for (let n = 0; n < 210; n++) {
    const [x, y, radius, kind] = [
      next() * GRAIN_TILE,
      next() * GRAIN_TILE,
      0.5 + next() * 1.1,
      next(),
    ];
    ctx.fillStyle = colourShaded(colour, kind < 0.5 ? -0.22 : kind < 0.8 ? 0.35 : -0.38);
    for (const dx of [0, -GRAIN_TILE, GRAIN_TILE])
      for (const dy of [0, -GRAIN_TILE, GRAIN_TILE]) {
        ctx.beginPath();
        ctx.arc(x + dx, y + dy, radius, 0, 2 * Math.PI);
        ctx.fill();
      }
  }
  grains.set(colour, tile);
  return tile;
}

/** Grain that stays on the ground while panning; its size steps by powers of two with the zoom. */
function grainPattern(
  ctx: CanvasRenderingContext2D,
  colour: string,
  camera: Camera,
  size: ScreenSize,
) {
  const pattern = ctx.createPattern(grainTile(colour), 'repeat');
  if (!pattern) return colour;
  const base = 0.12;
  const size2 = camera.scale / base / 2 ** Math.round(Math.log2(camera.scale / base));
  const [ox, oy] = screenFromGround(camera, size, [0, 0]);
  const period = GRAIN_TILE * size2;
  pattern.setTransform(new DOMMatrix([size2, 0, 0, size2, ox % period, oy % period]));
  return pattern;
}

/** Below this many pixels of the screen across, units are painted by the pixel while the hand moves. */
const RASTER_BELOW_PX = 12;

let rastered: { canvas: HTMLCanvasElement; image: ImageData; pixels: Uint32Array } | null = null;

/** Units as plain pixels: for the moment in which a hand moves many of them. */
function paintCoarsely(
  ctx: CanvasRenderingContext2D,
  laying: Laying,
  camera: Camera,
  size: ScreenSize,
) {
  const ratio = ctx.getTransform().a;
  const [width, height] = [Math.ceil(size.width * ratio), Math.ceil(size.height * ratio)];
  if (rastered?.image.width !== width || rastered.image.height !== height) {
    const canvas = window.document.createElement('canvas');
    canvas.width = width;
    canvas.height = height;
    const image = new ImageData(width, height);
    rastered = { canvas, image, pixels: new Uint32Array(image.data.buffer) };
  } else rastered.pixels.fill(0);
  const inPixels = { ...camera, scale: camera.scale * ratio };
  rasterUnits(rastered.pixels, laying, inPixels, { width, height });
  rastered.canvas.getContext('2d')!.putImageData(rastered.image, 0, 0);
  ctx.drawImage(rastered.canvas, 0, 0, width / ratio, height / ratio);
}

/**
 * Paints ground, aggregate and units, from flat arrays, into a window of `size` CSS pixels. Laid units
 * are filled; left-out ones are a dashed ghost; lifted ones a dashed outline crossed through. `cut`: the pieces that
 * take the place of ghosts on a floor cut at its edge. `coarse`: quickly, for a floor of many units under a moving hand;
 * small ones are pixels then, and what is not laid is left out.
 */
export function paintFloor(
  ctx: CanvasRenderingContext2D,
  document: LayoutDocument,
  laying: Laying | null,
  camera: Camera,
  size: ScreenSize,
  colours: DrawingColours,
  cut: CutPieces | null = null,
  coarse = false,
) {
  const aggregate = document.aggregate?.colour ?? PLAIN_AGGREGATE;
  ctx.save();
  traceRings(ctx, document, camera, size);
  ctx.fillStyle = grainPattern(ctx, aggregate, camera, size);
  ctx.fill('evenodd');
  if (!laying) {
    ctx.restore();
    return;
  }

  const dark = colourShaded(aggregate, -0.45);
  const across = Math.min(
    ...laying.motif.map(
      (entry) => 2 * Math.min(Math.hypot(...entry.halfLength), Math.hypot(...entry.halfWidth)),
    ),
  );
  const outlined = across * camera.scale >= OUTLINE_FROM_PX;

  if (coarse && across * camera.scale < RASTER_BELOW_PX) {
    paintCoarsely(ctx, laying, camera, size);
    ctx.restore();
    return;
  }
  for (const batch of colourBatches(laying)) {
    ctx.fillStyle = batch.colour;
    ctx.strokeStyle = dark;
    ctx.lineWidth = 0.6;
    paintUnits(ctx, laying, laying.laid, batch.indices, camera, size, () => {
      ctx.fill();
      if (outlined) ctx.stroke();
    });
  }

  if (cut) paintPieces(ctx, laying, cut.pieces, camera, size, dark, colours.graphite);
  if (outlined) {
    traceRings(ctx, document, camera, size);
    ctx.clip('evenodd');
    ctx.strokeStyle = dark;
    ctx.lineWidth = 0.9;
    ctx.setLineDash([3, 4]);
    const ghosts = cut ? leftByHand(laying) : null;
    paintUnits(ctx, laying, laying.leftOut, ghosts, camera, size, () => ctx.stroke());

    ctx.strokeStyle = colours.graphite;
    ctx.lineWidth = 1.2;
    ctx.setLineDash([6, 3]);
    paintUnits(ctx, laying, laying.lifted, null, camera, size, () => ctx.stroke());
    ctx.beginPath();
    traceCrosses(ctx, laying, camera, size);
    ctx.stroke();
  }
  ctx.restore();
}

/** Units at the edge that are not cut because they were lifted by hand: their places in `laying.leftOut`. */
function leftByHand({ document, leftOut }: Laying): Uint32Array {
  const lifted = new Set(document.lifted.map((address) => address.join()));
  const places: number[] = [];
  for (let n = 0; lifted.size > 0 && n < leftOut.count; n++) {
    if (lifted.has(`${leftOut.i[n]},${leftOut.j[n]},${leftOut.k[n]}`)) places.push(n);
  }
  return Uint32Array.from(places);
}

/** A cross through each lifted unit, corner to corner. */
function traceCrosses(
  ctx: CanvasRenderingContext2D,
  laying: Laying,
  camera: Camera,
  size: ScreenSize,
) {
  const { lifted, motif } = laying;
  for (let n = 0; n < lifted.count; n++) {
    const { halfLength: a, halfWidth: b } = motif[lifted.k[n]];
    const corner = (p: number, q: number) =>
      screenFromGround(camera, size, [
        lifted.x[n] + p * a[0] + q * b[0],
        lifted.y[n] + p * a[1] + q * b[1],
      ]);
    ctx.moveTo(...(corner(1, 1) as [number, number]));
    ctx.lineTo(...(corner(-1, -1) as [number, number]));
    ctx.moveTo(...(corner(1, -1) as [number, number]));
    ctx.lineTo(...(corner(-1, 1) as [number, number]));
  }
}

import type { Laying } from '@/paving/laying';
import { unitTone } from '@/paving/tones';
import { colourShaded, PLAIN_UNIT } from '../ui/drawing-colours';
import type { Camera, ScreenSize } from './camera';

/** Slight differences between units of one tone, as a delivered pallet has them. */
const SHADES = [0, -0.03, 0.06] as const;

/** The colour of each laid unit, as a place in a short list of colours. */
export interface UnitColours {
  readonly palette: readonly string[];
  /** Beside `laying.laid`. */
  readonly of: Uint16Array;
}

const known = new WeakMap<Laying, UnitColours>();

const shadeOf = (i: number, j: number, k: number): number =>
  ((Math.imul(i, 73856093) ^ Math.imul(j, 19349663) ^ Math.imul(k + 1, 83492791)) >>> 4) %
  SHADES.length;

export function unitColours(laying: Laying): UnitColours {
  const before = known.get(laying);
  if (before) return before;
  const { document, laid, motif } = laying;
  const bases = motif.map(({ unit }) => unit.colour ?? PLAIN_UNIT);
  if (document.tones) bases.push(document.tones.second);
  const of = new Uint16Array(laid.count);
  for (let n = 0; n < laid.count; n++) {
    const [i, j, k] = [laid.i[n], laid.j[n], laid.k[n]];
    const second = document.tones !== undefined && unitTone(document, i, j, k) === 1;
    of[n] = (second ? motif.length : k) * SHADES.length + shadeOf(i, j, k);
  }
  const palette = bases.flatMap((base) => SHADES.map((shade) => colourShaded(base, shade)));
  const made = { palette, of };
  known.set(laying, made);
  return made;
}

/** A colour as one pixel of an image's bytes, read as a little-endian number. */
function pixelOf(colour: string): number {
  const [red, green, blue] = [1, 3, 5].map((at) => parseInt(colour.slice(at, at + 2), 16));
  return ((255 << 24) | (blue << 16) | (green << 8) | red) >>> 0;
}

/**
 * Puts laid units into `pixels`, row by row of a window of `size` pixels, `camera` being in pixels too: each pixel whose
 * middle is on a unit takes its colour. No outlines and no smooth edges, but tens of times quicker than paths: for many small
 * units while the hand moves. Work grows with units and with the pixels that they cover.
 */
export function rasterUnits(
  pixels: Uint32Array,
  laying: Laying,
  camera: Camera,
  { width, height }: ScreenSize,
): void {
  const { laid, motif } = laying;
  const { palette, of } = unitColours(laying);
  const colours = Uint32Array.from(palette, pixelOf);
  const { scale, centre } = camera;
  const halves = motif.map(({ halfLength: [ax, ay], halfWidth: [bx, by] }) => {
    const [px, py, qx, qy] = [ax * scale, -ay * scale, bx * scale, -by * scale];
    const det = px * qy - py * qx;
    return {
      reachX: Math.abs(px) + Math.abs(qx),
      reachY: Math.abs(py) + Math.abs(qy),
      // A pixel (dx, dy) from the centre is on the unit where both of these are within ±1: u = ux·dx + uy·dy, and v likewise.
      ux: qy / det,
      uy: -qx / det,
      vx: -py / det,
      vy: px / det,
    };
  });
  for (let n = 0; n < laid.count; n++) {
    const half = halves[laid.k[n]];
    const { reachX, reachY, ux, uy, vx, vy } = half;
    const x = width / 2 + (laid.x[n] - centre[0]) * scale - 0.5;
    const y = height / 2 - (laid.y[n] - centre[1]) * scale - 0.5;
    const left = Math.max(0, Math.ceil(x - reachX));
    const right = Math.min(width - 1, Math.floor(x + reachX));
    const top = Math.max(0, Math.ceil(y - reachY));
    const bottom = Math.min(height - 1, Math.floor(y + reachY));
    const colour = colours[of[n]];
    for (let row = top; row <= bottom; row++) {
      const from = row * width;
      let u = ux * (left - x) + uy * (row - y);
      let v = vx * (left - x) + vy * (row - y);
      for (let column = left; column <= right; column++) {
        if (u >= -1 && u <= 1 && v >= -1 && v <= 1) pixels[from + column] = colour;
        u += ux;
        v += vx;
      }
    }
  }
}

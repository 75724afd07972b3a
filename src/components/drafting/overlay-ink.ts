import type { Point } from '@/geometry/point';
import type { LayoutDocument } from '@/paving/layout-document';
import type { DrawingColours } from '../ui/drawing-colours';
import { screenFromGround, type Camera, type ScreenSize } from './camera';

/** What an overlay routine draws with. */
export interface Ink {
  readonly ctx: CanvasRenderingContext2D;
  readonly colours: DrawingColours;
  readonly camera: Camera;
  readonly size: ScreenSize;
  readonly document: LayoutDocument;
}

export const FONT = "'Nunito Sans', sans-serif";

export const screen = (ink: Ink, point: Point): Point =>
  screenFromGround(ink.camera, ink.size, point);

export function path(ink: Ink, points: readonly Point[], closed: boolean) {
  ink.ctx.beginPath();
  points.forEach((point, n) => {
    const [x, y] = screen(ink, point);
    if (n === 0) ink.ctx.moveTo(x, y);
    else ink.ctx.lineTo(x, y);
  });
  if (closed) ink.ctx.closePath();
}

export function segment(ctx: CanvasRenderingContext2D, a: Point, b: Point) {
  ctx.beginPath();
  ctx.moveTo(a[0], a[1]);
  ctx.lineTo(b[0], b[1]);
  ctx.stroke();
}

/** How much of the page's colour stands either side of a live line, px. */
const CASING_PX = 1.5;

/**
 * Strokes the path as a live line, cased in the page's colour: pink alone is lost on a pale floor at dusk and on a dark one by
 * day; on the page itself the casing is not seen.
 */
export function strokeLive({ ctx, colours }: Ink, width: number) {
  const dash = ctx.getLineDash();
  ctx.setLineDash([]);
  ctx.strokeStyle = colours.stone50;
  ctx.lineWidth = width + 2 * CASING_PX;
  ctx.stroke();
  ctx.setLineDash(dash);
  ctx.strokeStyle = colours.line;
  ctx.lineWidth = width;
  ctx.stroke();
}

export function liveSegment(ink: Ink, a: Point, b: Point, width: number) {
  ink.ctx.beginPath();
  ink.ctx.moveTo(a[0], a[1]);
  ink.ctx.lineTo(b[0], b[1]);
  strokeLive(ink, width);
}

export function dot(
  ctx: CanvasRenderingContext2D,
  [x, y]: Point,
  radius: number,
  fill: string,
  stroke?: string,
) {
  ctx.beginPath();
  ctx.arc(x, y, radius, 0, 2 * Math.PI);
  ctx.fillStyle = fill;
  ctx.fill();
  if (stroke) {
    ctx.strokeStyle = stroke;
    ctx.lineWidth = 1.5;
    ctx.stroke();
  }
}

/** Text in a box of the page's colour, so that it reads over whatever lies below. */
export function boxedText(
  ink: Ink,
  text: string,
  at: Point,
  angle: number,
  colour: string,
  weight = 400,
) {
  const { ctx } = ink;
  ctx.save();
  ctx.translate(at[0], at[1]);
  ctx.rotate(angle);
  ctx.font = `${weight} 12.5px ${FONT}`;
  ctx.textAlign = 'center';
  ctx.textBaseline = 'middle';
  const width = ctx.measureText(text).width + 10;
  ctx.fillStyle = ink.colours.stone50;
  ctx.fillRect(-width / 2, -9, width, 18);
  ctx.fillStyle = colour;
  ctx.fillText(text, 0, 0.5);
  ctx.restore();
}

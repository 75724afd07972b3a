import { documentRing, documentRingCount } from '@/paving/ground-edits';
import type { LayoutDocument } from '@/paving/layout-document';
import { screenFromGround } from '../drafting/camera';
import { ringOutline } from '../drafting/ring-outline';
import type { Picture } from './FloorWindow';

/** Strokes the perimeter and, thinner, the keep-outs. */
export function paintGroundLines(
  { ctx, camera, size, colours }: Picture,
  document: LayoutDocument,
  dash: readonly number[] = [],
) {
  ctx.save();
  ctx.strokeStyle = colours.graphite;
  ctx.lineJoin = 'round';
  ctx.setLineDash([...dash]);
  for (let ring = 0; ring < documentRingCount(document); ring++) {
    ctx.beginPath();
    ringOutline(documentRing(document, ring)).forEach((point, n) => {
      const [x, y] = screenFromGround(camera, size, point);
      if (n === 0) ctx.moveTo(x, y);
      else ctx.lineTo(x, y);
    });
    ctx.closePath();
    ctx.lineWidth = ring === 0 ? 2 : 1.3;
    ctx.stroke();
  }
  ctx.restore();
}

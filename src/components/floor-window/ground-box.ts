import type { LayoutDocument } from '@/paving/layout-document';
import { documentRing } from '@/paving/ground-edits';
import type { Box } from '../drafting/camera';
import { ringOutline } from '../drafting/ring-outline';

/** The box that the perimeters of all the documents lie in, mm. */
export function groundBox(documents: readonly LayoutDocument[]): Box {
  const points = documents.flatMap((document) => ringOutline(documentRing(document, 0)));
  let [minX, minY, maxX, maxY] = [Infinity, Infinity, -Infinity, -Infinity];
  for (const [x, y] of points) {
    minX = Math.min(minX, x);
    minY = Math.min(minY, y);
    maxX = Math.max(maxX, x);
    maxY = Math.max(maxY, y);
  }
  return { minX, minY, maxX, maxY };
}

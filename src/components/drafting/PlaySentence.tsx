import { edgeName, keepOutName } from '@/paving/edge-names';
import { documentRing } from '@/paving/ground-edits';
import type { LayoutDocument } from '@/paving/layout-document';
import { Length } from '../ui/Length';
import { useShownFloor } from './table-context';

/** Play below this, mm, is none to set out by. */
const NO_PLAY_MM = 0.5;

/** Where an edge is: `AB`, or the keep-out that it is of. */
function edgePlace(document: LayoutDocument, ring: number, edge: number): string {
  if (ring === 0) return edgeName(ring, edge, documentRing(document, ring).length);
  return `${keepOutName(ring)} ${document.ground.keepOuts[ring - 1].name}`.trim();
}

/** What a client makes of the play, and of the unit that is marked on the floor. */
export function PlaySentence() {
  const { document, report, leastGap } = useShownFloor();
  if (!report) return null;
  if (report.play === null || !leastGap)
    return 'No unit lies whole inside the edge. Slide or turn the pattern, or take a smaller unit.';
  const place = edgePlace(document, leastGap.ring, leastGap.edge);
  if (report.play < NO_PLAY_MM)
    return `There is next to no play: the pattern must start exactly here, or a unit would come too near the edge. The marked one, at ${place}, would be the first.`;
  return (
    <>
      The whole floor may drift{' '}
      <Length mm={report.play} display={document.display} decimals={report.play < 10 ? 1 : 0} /> in
      any direction while it is laid before a unit would come too near the edge. The marked one, at{' '}
      {place}, would be the first.
    </>
  );
}

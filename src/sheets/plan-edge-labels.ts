import { cornerName } from '@/paving/edge-names';
import type { GroundEdge } from '@/paving/ground';
import type { PaperPoint } from './drawing';
import type { DimensionedEdge, Outline } from './edge-dimensions';
import { readingTurn } from './edge-dimensions';
import { figureText } from './figures';
import { isInside } from './label-space';
import { unitVector } from './paper-vectors';
import type { LabelPlace, WantedLabel } from './plan-labels';
import { placesAlong, placesOff } from './plan-labels';
import type { PlanView } from './plan-view';
import { paperChords } from './plan-view';
import { LETTERING, textWidth } from './text-measure';

/** Places along an edge that is long enough for the text: outside, then inside on a plate. */
export function alongEdge(edge: DimensionedEdge, text: string): readonly LabelPlace[] {
  const room = Math.hypot(edge.to[0] - edge.from[0], edge.to[1] - edge.from[1]);
  return textWidth(text, LETTERING.small) <= room
    ? [...placesAlong(edge, 3, false), ...placesAlong(edge, -3, true)]
    : [];
}

/** Places along the outside of an arc, turned with it; the text's ends decide whether it clears the ring. */
export function alongArc(chords: readonly PaperPoint[], ring: Outline): readonly LabelPlace[] {
  return [0.3, 0.7, 0.4, 0.6, 0.15, 0.85].flatMap((share) => {
    const n = Math.min(chords.length - 2, Math.floor(share * (chords.length - 1)));
    const [from, to] = [chords[n], chords[n + 1]];
    const along = unitVector([to[0] - from[0], to[1] - from[1]]);
    return [3, 3.8, 5]
      .map((distance): LabelPlace => ({
        middle: [from[0] - along[1] * distance, from[1] + along[0] * distance],
        turnDeg: readingTurn(along),
      }))
      .filter(({ middle }) => !isInside(middle, ring.points));
  });
}

/** Radius and length of an arc, outside it. */
export function arcLabel(
  edge: GroundEdge,
  view: PlanView,
  ring: Outline,
  display: 'metric' | 'imperial',
): WantedLabel {
  const chords = paperChords(view, edge);
  const chord = Math.hypot(edge.end[0] - edge.start[0], edge.end[1] - edge.start[1]);
  const radius = (chord * (1 + edge.bulge ** 2)) / (4 * Math.abs(edge.bulge));
  const text = `R ${figureText(radius, display)}, arc ${figureText(edge.length, display)}`;
  const width = textWidth(text, LETTERING.small);
  const places = [0.5, 0.35, 0.65, 0.2, 0.8].flatMap((share) => {
    const n = Math.min(chords.length - 2, Math.floor(share * (chords.length - 1)));
    const [from, to] = [chords[n], chords[n + 1]];
    const along = unitVector([to[0] - from[0], to[1] - from[1]]);
    const outward: PaperPoint = [-along[1], along[0]];
    return placesOff(from, outward, width, [3, 5, 8, 12]).filter(
      ({ middle }) => !isInside(middle, ring.points),
    );
  });
  return { text, places };
}

/** The corner at the start of edge n, and the way out of the ring that halves its angle. */
export function letteredCorner(edges: readonly GroundEdge[], n: number, view: PlanView) {
  const before = paperChords(view, edges[(n + edges.length - 1) % edges.length]);
  const after = paperChords(view, edges[n]);
  const at = after[0];
  const inward = unitVector([
    at[0] - before[before.length - 2][0],
    at[1] - before[before.length - 2][1],
  ]);
  const onward = unitVector([after[1][0] - at[0], after[1][1] - at[1]]);
  // The right-hand normals of both edges point out of a ring that runs anticlockwise.
  const outward = unitVector([-inward[1] - onward[1], inward[0] + onward[0]]);
  return { at, outward, name: cornerName(0, n) };
}

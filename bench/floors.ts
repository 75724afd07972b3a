import type { LayoutDocument, Vertex } from '@/paving/layout-document';
import { parseLayoutDocument } from '@/paving/layout-validation';

/** An irregular ring of `corners` corners about the origin, radius 0.9 to 1.1 of `radiusMm`. */
export function wavyRing(radiusMm: number, corners: number): Vertex[] {
  return Array.from({ length: corners }, (_, n): Vertex => {
    const angle = (n / corners) * 2 * Math.PI;
    const radius = radiusMm * (1 + 0.07 * Math.sin(5 * angle) + 0.03 * Math.sin(23 * angle + 1));
    return [radius * Math.cos(angle), radius * Math.sin(angle)];
  });
}

/** A floor of about `units` whole units at a turn of 17°, inside a wavy ring. */
export function wavyFloor(units: number, corners = 200): LayoutDocument {
  const side = 200;
  const joint = 3;
  const radius = Math.sqrt((units * (side + joint) ** 2) / Math.PI);
  const parsed = parseLayoutDocument({
    schema: 'evenlay/layout@1',
    display: 'metric',
    ground: { perimeter: wavyRing(radius, corners), keepOuts: [] },
    units: [{ id: 'a', name: 'Paver 200', length: side, width: side, thickness: 50 }],
    bond: { kind: 'stack', unit: 'a', joint },
    placement: { origin: [31, 17], turn: 17 },
    clearance: 6,
  });
  if (!parsed.ok) throw new Error(JSON.stringify(parsed.problems));
  return parsed.document;
}

import { useMemo } from 'react';
import type { LayoutDocument } from '@/paving/layout-document';
import { layFloor, unitCorners } from '@/paving/laying';
import { bondPattern } from '@/paving/bond';
import { unitTone } from '@/paving/tones';
import { PLAIN_AGGREGATE, PLAIN_UNIT } from '../ui/drawing-colours';

/** How many lattice steps a picture shows either way. */
const STEPS_SHOWN = 2.1;

/** A bond drawn by the same core as the floor: the document's pattern over a small square of ground. */
export function BondPicture({ document, size = 76 }: { document: LayoutDocument; size?: number }) {
  const picture = useMemo(() => {
    const { a, b, motif } = bondPattern(document);
    const cell = Math.abs(a[0] * b[1] - a[1] * b[0]);
    const side = Math.sqrt(cell / motif.length) * STEPS_SHOWN * 1.5;
    const margin = side * 2;
    const square = (half: number): [number, number][] => [
      [-half, -half],
      [half, -half],
      [half, half],
      [-half, half],
    ];
    const laying = layFloor({
      ...document,
      ground: { perimeter: square(side / 2 + margin), keepOuts: [] },
      placement: { origin: [0, 0], turn: 0 },
      clearance: 0,
      lifted: [],
    });
    const { laid } = laying;
    const paths = new Map<string, string[]>();
    for (let n = 0; n < laid.count; n++) {
      const entry = laying.motif[laid.k[n]];
      const reach = entry.unit.length + entry.unit.width;
      if (Math.max(Math.abs(laid.x[n]), Math.abs(laid.y[n])) > side / 2 + reach) continue;
      const second = document.tones && unitTone(document, laid.i[n], laid.j[n], laid.k[n]) === 1;
      const colour = second ? document.tones!.second : (entry.unit.colour ?? PLAIN_UNIT);
      const corners = unitCorners(entry, laid.x[n], laid.y[n]).map(([x, y]) => `${x} ${-y}`);
      const path = `M${corners.join('L')}Z`;
      paths.set(colour, [...(paths.get(colour) ?? []), path]);
    }
    return { side, paths: [...paths] };
  }, [document]);
  const { side, paths } = picture;
  return (
    <svg
      width={size}
      height={size}
      viewBox={`${-side / 2} ${-side / 2} ${side} ${side}`}
      aria-hidden="true"
      className="block w-full"
      preserveAspectRatio="xMidYMid slice"
    >
      <rect
        x={-side / 2}
        y={-side / 2}
        width={side}
        height={side}
        fill={document.aggregate?.colour ?? PLAIN_AGGREGATE}
      />
      {paths.map(([colour, parts]) => (
        <path
          key={colour}
          d={parts.join('')}
          fill={colour}
          stroke="var(--slate)"
          strokeWidth={side / 160}
        />
      ))}
    </svg>
  );
}

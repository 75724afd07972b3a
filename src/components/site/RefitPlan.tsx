import { useState } from 'react';
import type { Point } from '@/geometry/point';
import type { Refit } from '@/paving/creep/refit';
import { unitCorners } from '@/paving/laying';
import type { Camera } from '../drafting/camera';
import { useFloorPainter } from '../floor-window/floor-painter';
import { FloorWindow } from '../floor-window/FloorWindow';
import { groundBox } from '../floor-window/ground-box';
import type { PackFloor } from './pack-floor';

/** The floor as it would be built on: what lies is hatched, the string to pull next is live. */
export function RefitPlan({
  found,
  floor,
  laid,
}: {
  found: Refit;
  floor: PackFloor;
  laid: readonly number[];
}) {
  const [look, setLook] = useState<Camera | null>(null);
  const paint = useFloorPainter(found.document);
  const { laid: lying, motif } = floor.laying;
  const held = floor.setOut.courses
    .filter(({ number }) => laid.includes(number))
    .flatMap(({ runs }) => runs.flatMap((run) => run.laid))
    .map((unit) => unitCorners(motif[lying.k[unit]], lying.x[unit], lying.y[unit]));
  // The nearest to what lies is the one to pull next.
  const next = found.courses.reduce<Refit['courses'][number] | null>(
    (best, course) =>
      best === null || Math.abs(course.fromLaid) < Math.abs(best.fromLaid) ? course : best,
    null,
  );
  const words = `${laid.length} courses laid, ${found.courses.length} still to lay.`;
  return (
    <FloorWindow
      box={groundBox([found.document])}
      look={look}
      onLook={setLook}
      paint={paint}
      label={`The floor fitted anew: ${words}`}
      over={(place) => (
        <svg aria-hidden="true" className="pointer-events-none absolute inset-0 h-full w-full">
          <defs>
            <pattern
              id="laid-hatch"
              width="7"
              height="7"
              patternUnits="userSpaceOnUse"
              patternTransform="rotate(45)"
            >
              <path d="M0 0V7" className="stroke-graphite" strokeWidth="2" />
            </pattern>
          </defs>
          <path
            d={held
              .map((corners) => `M${corners.map((at: Point) => place(at).join(' ')).join('L')}Z`)
              .join('')}
            fill="url(#laid-hatch)"
            className="stroke-graphite"
          />
          {next && (
            <path
              d={`M${place(next.from).join(' ')}L${place(next.to).join(' ')}`}
              className="fill-none stroke-line"
              strokeWidth="4"
            />
          )}
        </svg>
      )}
    />
  );
}

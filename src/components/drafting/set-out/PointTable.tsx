import { useState } from 'react';
import { formatCount } from '@/paving/count';
import { figuredText } from '@/paving/figured-words';
import type { ControlPoint, SetOut } from '@/paving/set-out/set-out';
import { Length } from '../../ui/Length';
import { useShownFloor, useTable, useTableStore } from '../table-context';

const GROUPS = [
  ['edge', 'Edge', ['corner', 'arc']],
  ['keep-out', 'Keep-outs', ['keep-out']],
  ['unit', 'First unit', ['unit']],
  ['string', 'Strings', ['string']],
] as const;

/** All points with their figures: for those who cannot see the drawing and for copying out. */
export function PointTable({ setOut }: { setOut: SetOut }) {
  const table = useTableStore();
  const { document } = useShownFloor();
  const picked = useTable((state) => state.point);
  const [group, setGroup] = useState<string>('edge');
  const [a, b] = setOut.datums;
  const groups = GROUPS.map(([key, label, kinds]) => ({
    key,
    label,
    points: setOut.points.filter(({ kind }) => (kinds as readonly string[]).includes(kind)),
  })).filter(({ points }) => points.length > 0);
  const shown = groups.find(({ key }) => key === group) ?? groups[0];
  const figure = (mm: number) => (
    <Length mm={mm} display={document.display} unit={document.display === 'imperial'} />
  );
  return (
    <section aria-label="All points">
      <h2 className="border-b border-graphite pb-1 text-base">
        All points{document.display === 'metric' && ', mm'}
      </h2>
      <label className="mt-2 block">
        <span className="sr-only">Which points</span>
        <select
          className="field w-full"
          value={shown.key}
          onChange={(event) => setGroup(event.target.value)}
        >
          {groups.map(({ key, label, points }) => (
            <option key={key} value={key}>
              {label} ({formatCount(points.length)})
            </option>
          ))}
        </select>
      </label>
      <div className="mt-1 max-h-80 overflow-y-auto">
        <table className="w-full text-right text-[0.93rem]">
          <thead className="sticky top-0 bg-stone-50 text-sm text-slate">
            <tr>
              <th scope="col" className="py-1 text-left font-normal">
                Point
              </th>
              <th scope="col" className="font-normal">
                from {a.name}
              </th>
              <th scope="col" className="font-normal">
                from {b.name}
              </th>
              <th scope="col" className="font-normal">
                side
              </th>
              <th scope="col" className="font-normal">
                meet
              </th>
              <th scope="col" className="font-normal">
                {document.display === 'metric' ? '±' : '±\u202fmm'}
              </th>
            </tr>
          </thead>
          <tbody className="hairlines">
            {shown.points.map((point) => (
              <tr
                key={point.name}
                aria-selected={point.name === picked}
                className={`cursor-pointer hover:text-line ${point.name === picked ? 'font-semibold text-line' : ''}`}
                onClick={() => table.getState().set({ point: point.name, pointed: null })}
                onPointerEnter={() => table.getState().set({ pointed: point.name })}
                onPointerLeave={() => table.getState().set({ pointed: null })}
              >
                <th scope="row" className="text-left font-semibold whitespace-nowrap">
                  <button
                    type="button"
                    className="py-1 pointer-coarse:min-h-11 pointer-coarse:min-w-11 text-left"
                    title={figuredText(point.what, document.display)}
                  >
                    {point.name}
                  </button>
                </th>
                <PointCells point={point} figure={figure} />
              </tr>
            ))}
          </tbody>
        </table>
      </div>
      <p className="mt-1 text-sm text-slate">
        Side: left or right of the line from {a.name} to {b.name}. ±: how far off the point can come
        to lie. A star: the two tapes meet too flat or too sharp, see the point.
      </p>
    </section>
  );
}

function PointCells({
  point,
  figure,
}: {
  point: ControlPoint;
  figure: (mm: number) => React.ReactNode;
}) {
  if (point.by === 'datum')
    return (
      <td colSpan={5} className="text-slate">
        hook a tape on here
      </td>
    );
  const badly = point.by !== 'tapes';
  return (
    <>
      <td>{figure(point.tapes[0])}</td>
      <td>{figure(point.tapes[1])}</td>
      <td className="text-slate">{point.side}</td>
      <td className={badly ? 'text-amber' : undefined}>
        {Math.round(point.crossingDeg)}°{badly && ' *'}
      </td>
      <td>{point.doubt.toFixed(1)}</td>
    </>
  );
}

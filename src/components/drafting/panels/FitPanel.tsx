import { Hand, RotateCcw, RotateCw, Spline, SquareDashed } from 'lucide-react';
import { vertexBulge } from '@/paving/ground-edits';
import { documentEdgeName } from '@/paving/edge-names';
import { groundMiddle, placementTurned, turnNormal } from '@/paving/placement-edits';
import { Length } from '../../ui/Length';
import { LengthField } from '../../ui/LengthField';
import { NumberField } from '../../ui/NumberField';
import { CuttingChoice } from '../cutting/CuttingChoice';
import { BestStart } from '../fit/BestStart';
import { FitPictures } from '../fit/FitPictures';
import type { FitService } from '../fit/fit-service';
import { HoldFields } from '../fit/HoldFields';
import { JointRange } from '../fit/JointRange';
import { coordinateRefused } from '../field-limits';
import { FloorFigures } from '../FloorFigures';
import { turnNudged } from '../table-keys';
import { useShownFloor, useTable, useTableStore } from '../table-context';
import type { ToolName } from '../table-store';
import { alignTableToEdge } from '../tools/align-to-edge';

const TOOLS: readonly (readonly [ToolName, string, typeof Hand])[] = [
  ['slide', 'Slide', Hand],
  ['lift', 'Lift', SquareDashed],
  ['align', 'Align', Spline],
];

const HINTS: Partial<Record<ToolName, string>> = {
  slide: 'Drag the floor to slide the pattern, and the round handle to turn it.',
  lift: 'Tap or click a unit to lift it out, and again to lay it back. With keys: arrows choose, Enter lifts.',
  align: 'Tap or click the edge along which a row is to start.',
};

/** Where the pattern stands: the best start and its pictures, and the pattern by hand. */
export function FitPanel({ fit }: { fit: FitService }) {
  const table = useTableStore();
  const floor = useShownFloor();
  const tool = useTable((state) => state.tool);
  const { document } = floor;
  const { placement, display } = document;
  const origin = (axis: 0 | 1) => (mm: number) =>
    table.getState().edit((now) => ({
      ...now,
      placement: {
        ...now.placement,
        origin: axis === 0 ? [mm, now.placement.origin[1]] : [now.placement.origin[0], mm],
      },
    }));
  return (
    <div className="space-y-5">
      <BestStart fit={fit} />
      <FloorFigures />
      <FitPictures fit={fit} />
      <HoldFields fit={fit} />
      <JointRange />
      <section aria-label="By hand">
        <h3 className="mb-2 border-b border-graphite pb-1">By hand</h3>
        <div className="grid grid-cols-3 gap-2">
          {TOOLS.map(([name, label, Icon]) => (
            <button
              key={name}
              type="button"
              className="button px-2"
              aria-pressed={tool === name}
              onClick={() => table.getState().set({ tool: name, hover: null })}
            >
              <Icon size={17} aria-hidden /> {label}
            </button>
          ))}
        </div>
        <p className="mt-2 text-sm text-slate">{HINTS[tool]}</p>
        {tool === 'align' && (
          <ul className="mt-2 flex flex-wrap gap-2">
            {document.ground.perimeter.map((vertex, edge) =>
              vertexBulge(vertex) === 0 ? (
                <li key={edge}>
                  <button
                    type="button"
                    className="button"
                    onClick={() => alignTableToEdge(table, 0, edge)}
                  >
                    {documentEdgeName(document, 0, edge)}
                  </button>
                </li>
              ) : null,
            )}
          </ul>
        )}
        {document.lifted.length > 0 && (
          <button
            type="button"
            className="button mt-2 w-full"
            onClick={() => table.getState().edit((now) => ({ ...now, lifted: [] }))}
          >
            Lay all lifted units back
          </button>
        )}
      </section>
      <section aria-label="Turn" className="grid grid-cols-[auto_1fr_auto] items-end gap-2">
        <button
          type="button"
          className="button min-w-11 px-3"
          aria-label="Turn 1° anticlockwise"
          onClick={() => turnNudged(table, 1)}
        >
          <RotateCcw size={17} aria-hidden />
        </button>
        <NumberField
          label="Turn, anticlockwise"
          value={placement.turn}
          suffix="°"
          refuse={(value) => (Math.abs(value) > 3600 ? 'Between −3600° and 3600°.' : null)}
          onNumber={(turn) =>
            table.getState().edit((now) => ({
              ...now,
              placement: placementTurned(now.placement, turnNormal(turn), groundMiddle(now)),
            }))
          }
        />
        <button
          type="button"
          className="button min-w-11 px-3"
          aria-label="Turn 1° clockwise"
          onClick={() => turnNudged(table, -1)}
        >
          <RotateCw size={17} aria-hidden />
        </button>
      </section>
      <section aria-label="Start" className="grid grid-cols-2 gap-2">
        <LengthField
          label="Start across"
          mm={placement.origin[0]}
          refuse={coordinateRefused}
          display={display}
          onLength={origin(0)}
        />
        <LengthField
          label="Start up"
          mm={placement.origin[1]}
          refuse={coordinateRefused}
          display={display}
          onLength={origin(1)}
        />
      </section>
      <EdgeGaps />
      <CuttingChoice />
    </div>
  );
}

/** The gaps edge by edge, as text: for those who cannot see the ribbon and for copying out. */
function EdgeGaps() {
  const table = useTableStore();
  const floor = useShownFloor();
  const { document, report } = floor;
  if (!report) return null;
  const text = (mm: number | null) =>
    mm === null ? (
      '–'
    ) : (
      <Length mm={mm} display={document.display} unit={document.display === 'imperial'} />
    );
  return (
    <section aria-label="Gaps by edge">
      <table className="w-full text-right text-[0.93rem]">
        <caption className="border-b border-graphite pb-1 text-left font-bold">
          Gaps by edge{document.display === 'metric' && ', mm'}
        </caption>
        <thead className="text-sm text-slate">
          <tr>
            <th scope="col" className="py-1 text-left font-normal">
              Edge
            </th>
            <th scope="col" className="font-normal">
              facing
            </th>
            <th scope="col" className="font-normal">
              least
            </th>
            <th scope="col" className="font-normal">
              greatest
            </th>
            <th scope="col" className="font-normal">
              mean
            </th>
          </tr>
        </thead>
        <tbody className="hairlines">
          {report.edges.map((edge) => (
            <tr
              key={`${edge.ring}.${edge.edge}`}
              className="hover:text-line"
              onPointerEnter={() =>
                table.getState().set({
                  lit: { ring: edge.ring, edge: edge.edge, s: edge.length / 2, from: 'ribbon' },
                })
              }
              onPointerLeave={() => table.getState().set({ lit: null })}
            >
              <th scope="row" className="max-w-24 truncate py-1 text-left font-semibold">
                {documentEdgeName(document, edge.ring, edge.edge)}
              </th>
              <td>{edge.facing}</td>
              <td>{text(edge.least)}</td>
              <td>{text(edge.greatest)}</td>
              <td>{text(edge.mean)}</td>
            </tr>
          ))}
        </tbody>
      </table>
    </section>
  );
}

import { useEffect, useRef, useState } from 'react';
import { MapPin, Minus, Plus, Trash2 } from 'lucide-react';
import {
  arcRise,
  chordLength,
  documentRing,
  edgeDirectionDeg,
  edgeDirectionSet,
  edgeLength,
  edgeLengthSet,
  edgeRiseSet,
  ringReplaced,
  vertexBulge,
  vertexMoved,
  type Ring,
} from '@/paving/ground-edits';
import { cornerName, documentEdgeName, keepOutName } from '@/paving/edge-names';
import { formatArea } from '@/paving/area';
import { formatLength } from '@/paving/length';
import { LengthField } from '../../ui/LengthField';
import { NumberField } from '../../ui/NumberField';
import { Segmented } from '../../ui/Segmented';
import { coordinateRefused, edgeRefused, gapRefused } from '../field-limits';
import { FloorProblems } from '../FloorFigures';
import { groundKeptInView } from '../FloorStage';
import { GroundFileDialog } from '../ground-file/GroundFileDialog';
import { SurveyDialog } from '../survey/SurveyDialog';
import {
  cornerAdded,
  cornerRemoved,
  drawGround,
  drawKeepOut,
  drawingLeft,
  keepOutRemoved,
} from '../ground-actions';
import { useShownFloor, useTable, useTableStore } from '../table-context';
import type { Pick } from '../table-store';
import { cornerTakenBack, ringClosed } from '../tools/draw-ring';

function EdgeRow({ ring, edge }: { ring: number; edge: number }) {
  const table = useTableStore();
  const { document } = useShownFloor();
  const picked = useTable(
    (state) => state.pick?.kind === 'edge' && state.pick.ring === ring && state.pick.edge === edge,
  );
  const row = useRef<HTMLLIElement>(null);
  useEffect(() => {
    if (picked) row.current?.scrollIntoView({ block: 'nearest' });
  }, [picked]);
  const vertices = documentRing(document, ring);
  const name = documentEdgeName(document, ring, edge);
  const arc = vertexBulge(vertices[edge]) !== 0;
  return (
    <li ref={row} className="py-1">
      <div className="flex items-center gap-2">
        <button
          type="button"
          aria-pressed={picked}
          className={`min-h-9 w-14 shrink-0 text-left font-semibold pointer-coarse:min-h-11 ${picked ? 'text-line' : ''}`}
          onClick={() =>
            table.getState().set({ pick: picked ? null : { kind: 'edge', ring, edge } })
          }
        >
          {ring === 0 ? name : name.replace(/^\S+ /, '')}
          <span className="sr-only">, pick this edge</span>
        </button>
        <div className="flex-1">
          <LengthField
            label={`Length of ${name}${arc ? ' from end to end' : ''}`}
            hideLabel
            mm={chordLength(vertices, edge)}
            display={document.display}
            refuse={edgeRefused}
            onLength={(mm) => {
              table
                .getState()
                .edit((now) =>
                  ringReplaced(now, ring, edgeLengthSet(documentRing(now, ring), edge, mm)),
                );
              groundKeptInView(table);
            }}
          />
        </div>
      </div>
      {picked && <PickedEdge ring={ring} edge={edge} />}
    </li>
  );
}

function PickedEdge({ ring, edge }: { ring: number; edge: number }) {
  const table = useTableStore();
  const { document } = useShownFloor();
  const vertices = documentRing(document, ring);
  const bulge = vertexBulge(vertices[edge]);
  const change = (make: (ring: Ring) => Ring) => {
    table.getState().edit((now) => ringReplaced(now, ring, make(documentRing(now, ring))));
    groundKeptInView(table);
  };
  return (
    <div className="mb-2 ml-14 space-y-3 border-l-2 border-line py-1 pl-3">
      <Segmented
        label="Shape"
        value={bulge === 0 ? 'straight' : 'arc'}
        options={[
          ['straight', 'Straight'],
          ['arc', 'Arc'],
        ]}
        onChange={(shape) =>
          change((now) =>
            edgeRiseSet(now, edge, shape === 'straight' ? 0 : chordLength(now, edge) / 6),
          )
        }
      />
      {bulge !== 0 && (
        <>
          <LengthField
            label="Rise over the straight line (− bends inward)"
            mm={arcRise(vertices, edge)}
            display={document.display}
            refuse={(mm) =>
              Math.abs(mm) > 40 * chordLength(vertices, edge)
                ? 'That rise is too great for this side.'
                : null
            }
            onLength={(mm) => change((now) => edgeRiseSet(now, edge, mm))}
          />
          <p className="text-sm text-slate">
            Along the arc {formatLength(edgeLength(vertices, edge), document.display)}
          </p>
        </>
      )}
      {bulge === 0 && (
        <NumberField
          label="Direction, from the right, anticlockwise"
          value={edgeDirectionDeg(vertices, edge)}
          suffix="°"
          onNumber={(deg) => change((now) => edgeDirectionSet(now, edge, deg))}
        />
      )}
      <button type="button" className="button w-full" onClick={() => cornerAdded(table)}>
        <Plus size={16} aria-hidden /> Put a corner here
      </button>
    </div>
  );
}

function PickedVertex({ pick }: { pick: Extract<Pick, { kind: 'vertex' }> }) {
  const table = useTableStore();
  const { document } = useShownFloor();
  const ring = documentRing(document, pick.ring);
  const vertex = ring[pick.vertex];
  if (!vertex) return null;
  const move = (axis: 0 | 1) => (mm: number) =>
    table.getState().edit((now) => {
      const vertices = documentRing(now, pick.ring);
      const [x, y] = vertices[pick.vertex];
      return ringReplaced(
        now,
        pick.ring,
        vertexMoved(vertices, pick.vertex, axis === 0 ? [mm, y] : [x, mm]),
      );
    });
  const name =
    pick.ring === 0
      ? `Corner ${cornerName(0, pick.vertex)}`
      : `${document.ground.keepOuts[pick.ring - 1].name}, corner ${cornerName(pick.ring, pick.vertex)}`;
  return (
    <section className="border-2 border-line p-3" aria-label={name}>
      <h3 className="mb-2 flex items-center gap-2">
        <MapPin size={16} aria-hidden /> {name}
      </h3>
      <div className="grid grid-cols-2 gap-2">
        <LengthField
          label="Across"
          mm={vertex[0]}
          refuse={coordinateRefused}
          display={document.display}
          onLength={move(0)}
        />
        <LengthField
          label="Up"
          mm={vertex[1]}
          refuse={coordinateRefused}
          display={document.display}
          onLength={move(1)}
        />
      </div>
      <button
        type="button"
        className="button mt-2 w-full"
        disabled={ring.length <= 3}
        onClick={() => cornerRemoved(table)}
      >
        <Minus size={16} aria-hidden /> Take this corner away
      </button>
    </section>
  );
}

function DrawingPanel() {
  const table = useTableStore();
  const drawing = useTable((state) => state.drawing)!;
  const enough = drawing.corners.length >= 3;
  return (
    <div className="space-y-4">
      <p>
        {drawing.corners.length === 0
          ? 'Tap or click where the first corner lies.'
          : 'Tap or click the next corner, or type the length and press Enter. The first corner again closes the ring.'}
      </p>
      <p className="text-slate">
        {drawing.corners.length} {drawing.corners.length === 1 ? 'corner' : 'corners'} down.
        {drawing.target === 'perimeter' && ' The ground you had stays until the new one is closed.'}
      </p>
      <div className="grid gap-2">
        <button
          type="button"
          className="button button-primary"
          disabled={!enough}
          onClick={() => ringClosed(table)}
        >
          Close the ring
        </button>
        <button
          type="button"
          className="button"
          disabled={drawing.corners.length === 0}
          onClick={() => cornerTakenBack(table)}
        >
          Take the last corner back
        </button>
        <button type="button" className="button button-quiet" onClick={() => drawingLeft(table)}>
          Leave drawing
        </button>
      </div>
    </div>
  );
}

export function GroundPanel() {
  const table = useTableStore();
  const floor = useShownFloor();
  const pick = useTable((state) => state.pick);
  const drawing = useTable((state) => state.drawing);
  const snap = useTable((state) => state.snap);
  const [asking, setAsking] = useState<'tapes' | 'file' | null>(null);
  const { document } = floor;
  if (drawing) return <DrawingPanel />;
  const { perimeter, keepOuts } = document.ground;
  const area = floor.report?.groundArea;

  return (
    <div className="space-y-5">
      {floor.problems.length > 0 && <FloorProblems />}
      <p className="text-slate">
        Drag corners and sides, or type a side’s length. A double tap on a side puts a corner there.
      </p>
      <div className="grid grid-cols-2 gap-2">
        <button type="button" className="button" onClick={() => drawGround(table)}>
          Draw anew
        </button>
        <button type="button" className="button" onClick={() => drawKeepOut(table)}>
          Add keep-out
        </button>
        <button type="button" className="button col-span-2" onClick={() => setAsking('tapes')}>
          {document.survey ? 'Go on with the tape survey' : 'Enter a tape survey'}
        </button>
        <button type="button" className="button col-span-2" onClick={() => setAsking('file')}>
          Open the edge from a file
        </button>
      </div>
      <SurveyDialog open={asking === 'tapes'} onClose={() => setAsking(null)} />
      <GroundFileDialog open={asking === 'file'} onClose={() => setAsking(null)} />
      {pick?.kind === 'vertex' && <PickedVertex pick={pick} />}
      <section aria-label="Perimeter">
        <div className="flex items-baseline justify-between border-b border-graphite pb-1">
          <h3>Perimeter</h3>
          <span className="text-slate">
            {area === undefined ? '–' : formatArea(area, document.display)}
          </span>
        </div>
        <ul className="hairlines">
          {perimeter.map((_, edge) => (
            <EdgeRow key={edge} ring={0} edge={edge} />
          ))}
        </ul>
      </section>
      {keepOuts.map((keepOut, index) => (
        <section key={index} aria-label={keepOut.name}>
          <div className="flex items-center gap-2 border-b border-graphite pb-1">
            <b>{keepOutName(index + 1)}</b>
            <input
              className="min-h-11 min-w-0 flex-1 bg-transparent py-1 font-bold"
              aria-label="Name of the keep-out"
              defaultValue={keepOut.name}
              key={keepOut.name}
              maxLength={80}
              onBlur={(event) => {
                const name = event.target.value.trim();
                if (name === '') event.target.value = keepOut.name;
                else if (name !== keepOut.name)
                  table.getState().edit((now) => ({
                    ...now,
                    ground: {
                      ...now.ground,
                      keepOuts: now.ground.keepOuts.map((k, n) =>
                        n === index ? { ...k, name } : k,
                      ),
                    },
                  }));
              }}
              onKeyDown={(event) => event.key === 'Enter' && event.currentTarget.blur()}
            />
            <button
              type="button"
              className="button button-quiet"
              aria-label={`Remove ${keepOut.name}`}
              onClick={() => keepOutRemoved(table, index)}
            >
              <Trash2 size={16} aria-hidden />
            </button>
          </div>
          <ul className="hairlines">
            {keepOut.ring.map((_, edge) => (
              <EdgeRow key={edge} ring={index + 1} edge={edge} />
            ))}
          </ul>
        </section>
      ))}
      <section className="space-y-3">
        <LengthField
          label="Clearance: least gap to the edge and keep-outs"
          mm={document.clearance}
          display={document.display}
          refuse={gapRefused(document.display)}
          onLength={(mm) => table.getState().edit((now) => ({ ...now, clearance: mm }))}
        />
        <label className="flex min-h-11 items-center gap-2">
          <input
            type="checkbox"
            className="size-5 accent-line"
            checked={snap}
            onChange={(event) => table.getState().set({ snap: event.target.checked })}
          />
          Snap to square, corners and grid (hold Alt to suspend)
        </label>
      </section>
    </div>
  );
}

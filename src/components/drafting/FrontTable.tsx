import { useEffect, useState } from 'react';
import type { Point } from '@/geometry/point';
import type { LayoutDocument } from '@/paving/layout-document';
import { placementSlid } from '@/paving/placement-edits';
import { keepFloor } from '../ui/kept-floor';
import { BestStart } from './fit/BestStart';
import { createFitService } from './fit/fit-service';
import { shiftHands } from './fit/shift-hands';
import { ShiftMapPicture } from './fit/ShiftMapPicture';
import { useFit } from './fit/use-fit';
import { FloorFigures } from './FloorFigures';
import FloorStage from './FloorStage';
import { GapRibbon } from './GapRibbon';
import { PlaySentence } from './PlaySentence';
import { TableProvider, useShownFloor, useTableStore } from './table-context';
import { createTableStore } from './table-store';
import { nudge } from './nudge';

/** The table itself, alive on a sample floor: slide it, read it, keep it. */
export default function FrontTable({ document }: { document: LayoutDocument }) {
  const [table] = useState(() => {
    const made = createTableStore(document);
    made.setState({ step: 'fit', tool: 'slide' });
    return made;
  });
  return (
    <TableProvider store={table}>
      <Sample />
    </TableProvider>
  );
}

const ARROWS: Record<string, Point> = {
  ArrowRight: [1, 0],
  ArrowLeft: [-1, 0],
  ArrowUp: [0, 1],
  ArrowDown: [0, -1],
};

function Sample() {
  const table = useTableStore();
  const [fit] = useState(() => createFitService(table, { sweeps: false }));
  useEffect(() => fit.start(), [fit]);
  const { map, face, result, current } = useFit(fit);
  const { document, report } = useShownFloor();
  const best = result?.choices[0];
  return (
    <div className="border border-graphite">
      <div
        className="relative h-[19rem] md:h-[25rem]"
        onKeyDown={(event) => {
          const by = ARROWS[event.key];
          if (!by || (event.target as HTMLElement).closest('[role=slider]')) return;
          event.preventDefault();
          const step = event.shiftKey ? 10 : 1;
          nudge(table, (now) => ({
            ...now,
            placement: placementSlid(now.placement, [by[0] * step, by[1] * step]),
          }));
        }}
      >
        <FloorStage
          label={`A sample floor with ${report?.wholeUnits ?? 0} whole units. Arrows slide the pattern.`}
        />
      </div>
      <div className="border-t border-graphite">
        <GapRibbon />
      </div>
      <div className="grid gap-5 border-t border-stone-300 p-4 sm:grid-cols-[1fr_1.15fr]">
        <div>
          {map && (
            <div className="max-sm:max-w-60">
              <ShiftMapPicture
                map={map}
                face={current ? face : null}
                origin={document.placement.origin}
                best={best && current ? { origin: best.placement.origin, play: best.play } : null}
                countHere={report?.wholeUnits ?? null}
                most={Math.max(map.most, current ? (face?.most ?? 0) : 0)}
                {...shiftHands(table)}
              />
            </div>
          )}
          <p className="mt-1 text-sm text-slate">
            Every place where the pattern can start; darker lays more. Drag the dot, or the floor.
          </p>
        </div>
        <div className="space-y-3">
          <FloorFigures brief />
          <p className="text-sm text-slate">
            <PlaySentence />
          </p>
          <BestStart fit={fit} />
          <button
            type="button"
            className="button w-full"
            onClick={() => {
              table.getState().settleShown();
              const { document: floor } = table.getState();
              location.assign(keepFloor(floor) ? '/sign-up?next=/keep' : '/sign-up');
            }}
          >
            Keep this floor
          </button>
        </div>
      </div>
      <p role="status" id="table-said" className="sr-only" />
    </div>
  );
}

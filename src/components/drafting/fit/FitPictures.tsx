import { formatCount } from '@/paving/count';
import { formatLength } from '@/paving/length';
import { useShownFloor, useTable, useTableStore } from '../table-context';
import { placementTaken } from './BestStart';
import { Choices } from './Choices';
import { SWEEP, type FitService } from './fit-service';
import { shiftHands } from './shift-hands';
import { ShiftMapPicture } from './ShiftMapPicture';
import { TurnCurve } from './TurnCurve';
import { useFit } from './use-fit';

function Heading({ title, note }: { title: string; note: string }) {
  return (
    <div className="mb-2 flex items-baseline justify-between gap-3 border-b border-graphite pb-1">
      <h3>{title}</h3>
      <span className="text-right text-sm text-slate">{note}</span>
    </div>
  );
}

/** Shift map, turn curve and choices, each with its figures as text. */
export function FitPictures({ fit }: { fit: FitService }) {
  const table = useTableStore();
  const floor = useShownFloor();
  const hold = useTable((state) => state.hold);
  const { result, map, face, current, turns, sweeping, sweepFailure, swept } = useFit(fit);
  const { document, report } = floor;
  const { placement, display } = document;
  const length = (mm: number) => formatLength(mm, display, { decimals: mm < 10 ? 1 : 0 });
  const count = report ? report.wholeUnits + report.lifted : null;
  const most = result?.choices[0] ?? null;
  const chosen =
    result?.choices.find(
      (choice) =>
        choice.wholeUnits === count &&
        report?.play != null &&
        Math.abs(choice.play - report.play) < 0.05,
    ) ?? null;

  const top = Math.max(map?.most ?? 0, current ? (face?.most ?? 0) : 0, count ?? 0);

  return (
    <>
      <section aria-label="Shift map" aria-busy={!current}>
        <Heading
          title="Shift map"
          note={
            map
              ? `one ${formatLength(map.pitch, display, { unit: false })} × ${length(map.rise)} cell`
              : ''
          }
        />
        {map && (
          <>
            <div className="grid grid-cols-[1fr_auto] gap-3">
              <div className={map.rise > map.pitch * 0.7 ? 'max-w-48' : ''}>
                <ShiftMapPicture
                  map={map}
                  face={current ? face : null}
                  origin={placement.origin}
                  best={most && current ? { origin: most.placement.origin, play: most.play } : null}
                  countHere={count}
                  most={top}
                  {...shiftHands(table)}
                />
              </div>
              <div className="flex min-h-20 gap-2 text-sm text-slate">
                <span
                  aria-hidden="true"
                  className="w-2.5 border border-slate"
                  style={{ background: 'linear-gradient(to top, rgb(240 240 237), rgb(60 60 57))' }}
                />
                <span className="flex flex-col justify-between">
                  <span>
                    <b className="text-graphite">{formatCount(top)}</b> whole
                  </span>
                  <span>
                    <b className="text-line">{count === null ? '–' : formatCount(count)}</b> here
                  </span>
                  <span>
                    <b className="text-graphite">{formatCount(map.least)}</b> whole
                  </span>
                </span>
              </div>
            </div>
            <p className="mt-1 text-sm text-slate">
              {top === 0 ? (
                'No start in this cell lays a whole unit.'
              ) : (
                <>
                  Drag the dot: the floor follows. Outlined is where the most lie whole
                  {most && most.play > 0 && (
                    <>; the dashed circle is their play, ±{length(most.play)}</>
                  )}
                  .
                </>
              )}
            </p>
          </>
        )}
      </section>

      <section aria-label="Turn curve">
        <Heading
          title="Turn curve"
          note={hold.length > 0 ? 'most at each turn, not held' : 'most at each turn'}
        />
        {turns.length > 1 ? (
          <TurnCurve
            turns={turns}
            range={SWEEP}
            turn={placement.turn}
            display={display}
            onTurn={(turn) => void fit.takeTurn(turn)}
          />
        ) : (
          <p className="text-sm text-slate">
            {sweeping ? 'Sweeping the turns …' : 'The turns are swept when the floor rests.'}
          </p>
        )}
        <div className="mt-1 flex items-center justify-between text-sm text-slate">
          <span aria-live="polite">
            {sweeping && `Sweeping the turns: ${Math.round(swept * 100)} %`}
            {sweepFailure && (
              <span className="text-brick">The sweep could not go on: {sweepFailure}.</span>
            )}
          </span>
          <button
            type="button"
            className="link pointer-coarse:min-h-11"
            onClick={() => (sweeping ? fit.stopSweep() : fit.sweep())}
          >
            {sweeping ? 'Stop' : 'Sweep again'}
          </button>
        </div>
      </section>

      {result && result.choices.length > 0 && (
        <section aria-label="Choices">
          <Heading
            title="Choices"
            note={hold.length > 0 ? 'as held' : 'most units, or most play'}
          />
          <Choices
            choices={result.choices}
            document={document}
            chosen={chosen}
            onChoice={(choice) => placementTaken(table, choice)}
          />
        </section>
      )}
    </>
  );
}

import { formatCount } from '@/paving/count';
import { documentEdgeName } from '@/paving/edge-names';
import { fitRefusal, type FitChoice, type HoldRefusal } from '@/paving/fit/fit';
import { sameStart, turnNormal } from '@/paving/placement-edits';
import { useShownFloor, useTable, useTableStore } from '../table-context';
import type { TableStore } from '../table-store';
import { holdWords } from '../tools/hold-edge';
import type { FitService } from './fit-service';
import { useFit } from './use-fit';

/** Takes a found placement: one undo step. */
export function placementTaken(
  table: TableStore,
  choice: Pick<FitChoice, 'placement' | 'wholeUnits'>,
): void {
  table.getState().edit((now) => ({ ...now, placement: choice.placement }));
  table.getState().set({ said: `${formatCount(choice.wholeUnits)} whole units from this start.` });
}

/** Why a hold cannot be kept, with what would do: a turn, or letting go of it. */
function HoldRefused({ refusal, fit }: { refusal: HoldRefusal; fit: FitService }) {
  const table = useTableStore();
  const { document } = useShownFloor();
  const hold = useTable((state) => state.hold);
  const refused = hold[refusal.hold];
  return (
    <div role="alert" className="space-y-2" data-testid="hold-refused">
      <p className="text-brick first-letter:uppercase">{refusal.message}.</p>
      <div className="flex flex-wrap gap-2">
        {refusal.turns.map((turn) => (
          <button
            key={turn}
            type="button"
            className="button px-2"
            onClick={() => void fit.takeTurn(turn)}
          >
            Turn to {Number(turnNormal(turn).toFixed(2))}°
          </button>
        ))}
        {refused && (
          <button
            type="button"
            className="button px-2"
            onClick={() => table.getState().set({ hold: hold.filter((one) => one !== refused) })}
          >
            Let go of {holdWords(refused, (ring, edge) => documentEdgeName(document, ring, edge))}
          </button>
        )}
      </div>
    </div>
  );
}

/** Says what is proven of this floor, and takes the best start. */
export function BestStart({ fit }: { fit: FitService }) {
  const table = useTableStore();
  const { document, report, laying } = useShownFloor();
  const hold = useTable((state) => state.hold);
  const { result, current, failure } = useFit(fit);
  if (!laying) return null;
  const refusal = fitRefusal(document, { hold });
  if (refusal) return <HoldRefused refusal={refusal} fit={fit} />;
  if (failure && current)
    return (
      <p role="alert" className="text-brick">
        The best start could not be found: {failure}. Slide the pattern by hand meanwhile.
      </p>
    );
  if (!result || !current)
    return <p className="min-h-12 text-slate">Looking for the best start …</p>;

  const turn = `${Number(document.placement.turn.toFixed(2))}°`;
  const held = hold.map((h) =>
    holdWords(h, (ring, edge) => documentEdgeName(document, ring, edge)),
  );
  const under = held.length > 0 ? `${turn}, with ${held.join(' and ')}` : turn;
  if (result.wholeUnits === 0)
    return <p>No start lays a whole unit at {under}. Try another turn, or a smaller unit.</p>;

  const laid = (report?.wholeUnits ?? 0) + (report?.lifted ?? 0);
  // A start that keeps to no hold may have more play than the best that does.
  const reached =
    hold.length > 0
      ? sameStart(laying.lattice, document.placement.origin, result.placement.origin)
      : laid === result.wholeUnits && (report?.play ?? 0) > (result.play ?? 0) - PLAY_REACHED_MM;
  return (
    <div className="space-y-2" data-testid="best-start">
      <p>
        No start lays more than <b>{formatCount(result.wholeUnits)}</b> whole units at {under}.
        {reached &&
          ((result.play ?? 0) > PLAY_REACHED_MM
            ? ' This is it, with the most play that they can have.'
            : ' This is it.')}
        {!reached && hold.length > 0 && ' The floor does not stand there yet.'}
        {!reached &&
          hold.length === 0 &&
          laid === result.wholeUnits &&
          ' This start lays as many, with less play.'}
        {hold.length === 0 && laid < result.wholeUnits && ` This start lays ${formatCount(laid)}.`}{' '}
        <a className="link text-sm text-slate" href="/guide/best-start" target="_blank">
          How that is proven
        </a>
      </p>
      {!reached && (
        <button
          type="button"
          className="button button-primary w-full"
          onClick={() =>
            placementTaken(table, { placement: result.placement, wholeUnits: result.wholeUnits })
          }
        >
          Take the best start
        </button>
      )}
    </div>
  );
}

/** Play this near to the most counts as the most: half of what a figure shows, mm. */
const PLAY_REACHED_MM = 0.05;

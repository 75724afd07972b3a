import { useRef, type KeyboardEvent, type PointerEvent } from 'react';
import { formatCount } from '@/paving/count';
import type { FitTurn, TurnRange } from '@/paving/fit/fit';
import { formatLength, type Display } from '@/paving/length';

interface Props {
  readonly turns: readonly FitTurn[];
  /** What is swept: the picture has this width from the first turn on, and fills in. */
  readonly range: TurnRange;
  readonly turn: number;
  readonly display: Display;
  readonly onTurn: (turn: number) => void;
}

const WIDTH = 288;
const HEIGHT = 92;
/** A press of an arrow goes this much at least, degrees. */
const KEY_STEP_DEG = 0.5;

const degrees = (turn: number) => `${Number(turn.toFixed(2))}°`;

const nearestTurn = (turns: readonly FitTurn[], turn: number): FitTurn | undefined =>
  turns.reduce<FitTurn | undefined>(
    (best, t) => (!best || Math.abs(t.turn - turn) < Math.abs(best.turn - turn) ? t : best),
    undefined,
  );

/** Whole units against turn: click or press arrows to take one. */
export function TurnCurve({ turns, range, turn, display, onTurn }: Props) {
  const frame = useRef<SVGSVGElement>(null);
  const { from, to } = range;
  const counts = turns.map((t) => t.wholeUnits);
  const least = Math.min(...counts);
  const most = Math.max(...counts);
  // Of the turns with the most units, the one with the most play.
  const best = turns
    .filter((t) => t.wholeUnits === most)
    .reduce<FitTurn | null>((p, t) => (!p || (t.play ?? 0) > (p.play ?? 0) ? t : p), null);
  const x = (deg: number) => ((deg - from) / (to - from)) * WIDTH;
  const y = (count: number) => 8 + ((most - count) / Math.max(most - least, 1)) * (HEIGHT - 16);
  const shown = from + ((((turn - from) % (to - from)) + (to - from)) % (to - from));
  const nearest = nearestTurn(turns, shown);
  // While the curve fills in, the present turn may lie beyond what is known.
  const here = nearest && Math.abs(nearest.turn - shown) <= range.step ? nearest : undefined;

  const take = (event: PointerEvent) => {
    const box = frame.current!.getBoundingClientRect();
    const near = nearestTurn(turns, from + ((event.clientX - box.left) / box.width) * (to - from));
    if (near) onTurn(near.turn);
  };
  const key = (event: KeyboardEvent) => {
    const by = event.key === 'ArrowRight' ? 1 : event.key === 'ArrowLeft' ? -1 : 0;
    if (!by || !nearest) return;
    event.preventDefault();
    event.stopPropagation();
    // The sweep looks closer about its best turns; the keys go by whole steps all the same.
    const beyond = turns.filter((t) => (t.turn - nearest.turn) * by >= KEY_STEP_DEG - 1e-6);
    const next = by > 0 ? (beyond[0] ?? turns[0]) : (beyond.at(-1) ?? turns[turns.length - 1]);
    onTurn(next.turn);
  };
  return (
    <div>
      <svg
        ref={frame}
        viewBox={`0 0 ${WIDTH} ${HEIGHT}`}
        className="block w-full cursor-crosshair touch-none overflow-visible"
        role="slider"
        tabIndex={0}
        aria-label="Turn curve"
        aria-valuemin={from}
        aria-valuemax={to}
        aria-valuenow={Number(shown.toFixed(2))}
        aria-valuetext={
          here
            ? `${degrees(here.turn)}, ${formatCount(here.wholeUnits)} whole units, play ${here.play === null ? 'none' : formatLength(here.play, display)}`
            : degrees(shown)
        }
        data-testid="turn-curve"
        onPointerDown={take}
        onKeyDown={key}
      >
        <path d={`M0 ${HEIGHT}H${WIDTH}`} stroke="var(--stone-300)" />
        <polyline
          points={turns.map((t) => `${x(t.turn)},${y(t.wholeUnits)}`).join(' ')}
          fill="none"
          stroke="var(--graphite)"
          strokeWidth="1.6"
          strokeLinejoin="round"
        />
        <path d={`M${x(shown)} 0V${HEIGHT}`} stroke="var(--line)" strokeWidth="1.6" />
        {here && <circle cx={x(shown)} cy={y(here.wholeUnits)} r="4" fill="var(--line)" />}
      </svg>
      <div className="flex justify-between text-xs text-slate" aria-hidden="true">
        {[0, 1, 2, 3, 4, 5, 6].map((n) => (
          <span key={n}>{Math.round(from + ((to - from) * n) / 6)}°</span>
        ))}
      </div>
      {turns.length > 1 && (
        <p className="mt-1 text-sm text-slate">
          {most === 0
            ? 'No turn lays a whole unit.'
            : `From ${formatCount(least)} to ${formatCount(most)} whole units.`}{' '}
          {best && most > (here?.wholeUnits ?? most) && (
            <button
              type="button"
              className="link pointer-coarse:min-h-11"
              onClick={() => onTurn(best.turn)}
            >
              Take {degrees(best.turn)}, with {formatCount(most)}
            </button>
          )}
        </p>
      )}
    </div>
  );
}

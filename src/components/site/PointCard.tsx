import type { Display } from '@/paving/length';
import type { ControlPoint, Datum, TapeCross } from '@/paving/set-out/set-out';
import { FiguredWords } from '../ui/FiguredWords';
import { Length } from '../ui/Length';

const SIDES = { left: 'left', right: 'right', on: null } as const;

/** One point large enough to read at arm's length in the sun: two tapes, and the offsets that prove them. */
export function PointCard({
  point,
  datums,
  display,
}: {
  point: ControlPoint;
  datums: readonly [Datum, Datum];
  display: Display;
}) {
  const second = point.by === 'second-pair' ? point.secondPair : null;
  return (
    <article className="mt-4" data-testid="point" aria-live="polite">
      <h3 className="flex items-baseline gap-3 text-[1.35rem]">
        <span className="border-2 border-line px-2 font-bold text-line">{point.name}</span>
        <span className="text-[1rem] font-normal">
          <FiguredWords words={point.what} display={display} />
        </span>
      </h3>
      {point.by === 'datum' ? (
        <p className="mt-2">A tape is hooked on here. Nothing to measure to it.</p>
      ) : point.by === 'offsets' ? (
        <p className="mt-2 border-l-2 border-amber pl-3">
          Tapes would not cross cleanly here: use the two offsets.
        </p>
      ) : (
        <Tapes cross={second ?? point} datums={second?.datums ?? datums} display={display} />
      )}
      {point.by !== 'datum' && (
        <dl
          className={`mt-3 grid grid-cols-2 gap-3 ${point.by === 'offsets' ? 'text-[1.5rem] font-bold' : ''}`}
        >
          <div>
            <dt className="text-sm font-normal text-slate">
              Along {datums[0].name}–{datums[1].name}
            </dt>
            <dd>
              <Length mm={point.along} display={display} />
            </dd>
          </div>
          <div>
            <dt className="text-sm font-normal text-slate">
              Square to it, {point.square < 0 ? 'right' : 'left'}
            </dt>
            <dd>
              <Length mm={Math.abs(point.square)} display={display} />
            </dd>
          </div>
        </dl>
      )}
    </article>
  );
}

function Tapes({
  cross,
  datums,
  display,
}: {
  cross: TapeCross;
  datums: readonly [Datum, Datum];
  display: Display;
}) {
  const side = SIDES[cross.side];
  return (
    <>
      <dl className="mt-3 grid grid-cols-2 gap-3">
        {datums.map(({ name }, n) => (
          <div key={name} className="border-t-2 border-graphite pt-1">
            <dt className="text-slate">Tape from {name}</dt>
            <dd className="text-[2rem] leading-tight font-bold">
              <Length mm={cross.tapes[n]} display={display} />
            </dd>
          </div>
        ))}
      </dl>
      <p className="mt-2 text-slate">
        {side && `To the ${side} as you look from ${datums[0].name} to ${datums[1].name}. `}
        The tapes meet at {Math.round(cross.crossingDeg)}°
        {cross.uncertainty !== null && (
          <>
            ; read to <Length mm={2} display={display} decimals={0} />, the point lies within{' '}
            <Length mm={cross.uncertainty} display={display} decimals={0} />
          </>
        )}
        .
      </p>
    </>
  );
}

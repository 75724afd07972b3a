import { ChevronLeft, ChevronRight } from 'lucide-react';
import type { ReactNode } from 'react';
import type { ControlPoint, SetOut } from '@/paving/set-out/set-out';
import { FiguredWords } from '../../ui/FiguredWords';
import { Length } from '../../ui/Length';
import { useShownFloor, useTable, useTableStore } from '../table-context';
import { pointStepped } from './set-out-actions';
import { pointShown, tapedFrom } from './set-out-picture';
import { TapePicture } from './TapePicture';

function Row({ name, children }: { name: string; children: ReactNode }) {
  return (
    <div className="flex items-baseline justify-between gap-3 py-1">
      <dt className="text-slate">{name}</dt>
      <dd className="font-semibold">{children}</dd>
    </div>
  );
}

/** How the point in hand is set out, in figures, with what its tapes leave open. */
export function PointCard({ setOut }: { setOut: SetOut }) {
  const table = useTableStore();
  const { document } = useShownFloor();
  const point = useTable((state) => state.point);
  const pointed = useTable((state) => state.pointed);
  const shown = pointShown(setOut, { point, pointed });
  return (
    <section aria-label="Point" className="border-t border-graphite pt-2">
      <div className="flex items-center justify-between gap-2">
        <h2 className="text-base">{shown ? `Point ${shown.name}` : 'Point by point'}</h2>
        <div className="flex">
          <button
            type="button"
            className="button button-quiet px-2"
            aria-label="The point before"
            onClick={() => pointStepped(table, -1)}
          >
            <ChevronLeft size={18} aria-hidden />
          </button>
          <button
            type="button"
            className="button button-quiet px-2"
            aria-label="The point after"
            onClick={() => pointStepped(table, 1)}
          >
            <ChevronRight size={18} aria-hidden />
          </button>
        </div>
      </div>
      {shown ? (
        <PointFigures setOut={setOut} point={shown} display={document.display} />
      ) : (
        <p className="text-slate">
          Point at a small cross on the floor, or go through them with the arrows, to see its tapes.
        </p>
      )}
    </section>
  );
}

function PointFigures({
  setOut,
  point,
  display,
}: {
  setOut: SetOut;
  point: ControlPoint;
  display: 'metric' | 'imperial';
}) {
  const [a, b] = tapedFrom(setOut, point);
  const cross = point.secondPair ?? point;
  const length = (mm: number) => <Length mm={mm} display={display} decimals={1} />;
  const side =
    cross.side === 'on'
      ? `on the line ${a.name} to ${b.name}`
      : `${cross.side} of the line ${a.name} to ${b.name}`;
  return (
    <div data-testid="point">
      <p>
        <FiguredWords words={point.what} display={display} />
        {point.angleDeg !== undefined && `, ${Number(point.angleDeg.toFixed(2))}°`}.
      </p>
      {point.by === 'datum' && <p className="text-slate">One of the two corners to tape from.</p>}
      {point.by === 'second-pair' && (
        <p className="text-amber">
          From {setOut.datums.map(({ name }) => name).join(' and ')} the tapes would meet at{' '}
          {Math.round(point.crossingDeg)}°. Take {a.name} and {b.name} for this one.
        </p>
      )}
      {point.by === 'offsets' && (
        <p className="text-amber">
          The tapes would meet at {Math.round(point.crossingDeg)}°. Measure along the line instead,
          and square to it.
        </p>
      )}
      <div className="flex flex-wrap items-start gap-x-4 gap-y-2">
        <dl className="hairlines min-w-40 flex-1 text-[0.95rem]">
          {(point.by === 'tapes' || point.by === 'second-pair') && (
            <>
              <Row name={`From ${a.name}`}>{length(cross.tapes[0])}</Row>
              <Row name={`From ${b.name}`}>{length(cross.tapes[1])}</Row>
              <Row name="Side">{side}</Row>
              <Row name="Tapes meet at">{cross.crossingDeg.toFixed(0)}°</Row>
            </>
          )}
          {point.by !== 'datum' && (
            <>
              <Row name={`Along ${setOut.datums[0].name} to ${setOut.datums[1].name}`}>
                {length(point.along)}
              </Row>
              <Row name={point.square < 0 ? 'Square, to the right' : 'Square, to the left'}>
                {length(Math.abs(point.square))}
              </Row>
              <Row name="Comes to lie within">{length(point.doubt)}</Row>
            </>
          )}
        </dl>
        <TapePicture setOut={setOut} point={point} />
      </div>
      {(point.by === 'tapes' || point.by === 'second-pair') && (
        <p className="mt-1 text-sm text-slate">
          The grey shape holds every place that two tapes read to ±2&#8239;mm can give.
        </p>
      )}
    </div>
  );
}

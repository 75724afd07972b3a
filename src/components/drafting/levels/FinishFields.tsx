import { Crosshair } from 'lucide-react';
import { fallOfKind, levelsChanged } from '@/paving/level-edits';
import { levelText, oneInText } from '@/paving/level-text';
import { formatLength } from '@/paving/length';
import {
  documentLevels,
  GREATEST_FALL_PERCENT,
  GREATEST_LEVEL_MM,
  GREATEST_PROUD_MM,
  type Fall,
  type Levels,
} from '@/paving/levels';
import { groundMiddle } from '@/paving/placement-edits';
import { LengthField } from '../../ui/LengthField';
import { NumberField } from '../../ui/NumberField';
import { coordinateRefused, lengthWithin } from '../field-limits';
import { placingLeft, placingStarted } from '../level-actions';
import { useShownFloor, useTable, useTableStore } from '../table-context';
import type { Placing } from '../table-store';

const FALLS: readonly (readonly [Fall['kind'], string])[] = [
  ['none', 'Level all over'],
  ['oneWay', 'Falls one way'],
  ['toPoint', 'Falls to a point, such as a drain'],
  ['toLine', 'Falls to a line, such as a channel'],
];

const percentRefused = (percent: number) =>
  percent <= 0
    ? 'Must be more than 0 %. For none, choose “Level all over”.'
    : percent > GREATEST_FALL_PERCENT
      ? `Steeper than ${GREATEST_FALL_PERCENT} % is a stair.`
      : null;

/** The finish against the edge's top, and how the floor falls. */
export function FinishFields() {
  const table = useTableStore();
  const { document } = useShownFloor();
  const { display } = document;
  const levels = documentLevels(document);
  const { finish, proud, fall } = levels;
  const change = (part: Partial<Levels>) =>
    table.getState().edit((now) => levelsChanged(now, part));
  return (
    <section aria-label="Finish and falls" className="space-y-3">
      <h2 className="border-b border-graphite pb-1 text-base">Finish and falls</h2>
      <p className="text-sm text-slate">
        The top of the edge is the datum: every level here is measured from it, and the edge is
        taken to be level all round.
      </p>
      <div className="grid grid-cols-2 items-end gap-3">
        <LengthField
          label="Finish above the edge (− is below)"
          mm={finish}
          display={display}
          refuse={lengthWithin(display, -GREATEST_LEVEL_MM, GREATEST_LEVEL_MM)}
          onLength={(mm) => change({ finish: mm })}
        />
        <LengthField
          label="Units stand proud until compacted by"
          mm={proud}
          display={display}
          refuse={lengthWithin(display, 0, GREATEST_PROUD_MM)}
          onLength={(mm) => change({ proud: mm })}
        />
      </div>
      <p className="text-sm text-slate">
        {fall.kind === 'none' ? 'The finish is' : 'The finish at its highest is'}{' '}
        {levelText(finish, display)}
        {proud > 0 && (
          <>, and as laid, before it is compacted, {levelText(finish + proud, display)}</>
        )}
        . A few millimetres proud are common practice where units are compacted by a plate.
      </p>
      <div>
        <label className="field-label" htmlFor="fall-kind">
          Fall
        </label>
        <select
          id="fall-kind"
          className="field"
          value={fall.kind}
          onChange={(event) => {
            const kind = FALLS.find(([each]) => each === event.target.value)![0];
            placingLeft(table);
            change({ fall: fallOfKind(kind, fall, groundMiddle(document)) });
          }}
        >
          {FALLS.map(([kind, label]) => (
            <option key={kind} value={kind}>
              {label}
            </option>
          ))}
        </select>
      </div>
      {fall.kind !== 'none' && (
        <>
          <NumberField
            label={`How steep: ${[oneInText(fall.percent), `${formatLength(display === 'metric' ? fall.percent * 10 : (fall.percent * 304.8) / 100, display, { decimals: 1 })} to ${display === 'metric' ? 'a metre' : 'a foot'}`].filter(Boolean).join(', ')}`}
            value={fall.percent}
            suffix=" %"
            refuse={percentRefused}
            onNumber={(percent) => change({ fall: { ...fall, percent } })}
          />
          <FallPlace fall={fall} change={(next) => change({ fall: next })} />
        </>
      )}
    </section>
  );
}

function FallPlace({
  fall,
  change,
}: {
  fall: Exclude<Fall, { kind: 'none' }>;
  change: (fall: Fall) => void;
}) {
  const { display } = useShownFloor().document;
  const place = (
    label: string,
    [x, y]: readonly [number, number],
    take: (at: [number, number]) => void,
  ) => (
    <div className="grid grid-cols-2 gap-3">
      <LengthField
        label={`${label}, across`}
        mm={x}
        display={display}
        refuse={coordinateRefused}
        onLength={(mm) => take([mm, y])}
      />
      <LengthField
        label={`${label}, up`}
        mm={y}
        display={display}
        refuse={coordinateRefused}
        onLength={(mm) => take([x, mm])}
      />
    </div>
  );
  switch (fall.kind) {
    case 'oneWay':
      return (
        <>
          <NumberField
            label="Water runs towards, from the right, anticlockwise"
            value={fall.direction}
            suffix="°"
            refuse={(value) => (Math.abs(value) > 3600 ? 'Between −3600° and 3600°.' : null)}
            onNumber={(direction) => change({ ...fall, direction })}
          />
          <PointButton what="fallDirection" label="Point the way on the plan" />
        </>
      );
    case 'toPoint':
      return (
        <>
          {place('Low point', fall.at, (at) => change({ ...fall, at }))}
          <PointButton what="fallPoint" label="Point at it on the plan" />
          <p className="text-sm text-slate">
            Four planes fall to the point, with straight creases between them, so that a straight
            board can screed each.
          </p>
          <NumberField
            label="One of them falls along, from the right, anticlockwise"
            value={fall.direction}
            suffix="°"
            refuse={(value) => (Math.abs(value) > 3600 ? 'Between −3600° and 3600°.' : null)}
            onNumber={(direction) => change({ ...fall, direction })}
          />
        </>
      );
    case 'toLine': {
      const apart = (a: readonly [number, number], b: readonly [number, number]) =>
        Math.hypot(a[0] - b[0], a[1] - b[1]) >= 1;
      return (
        <>
          {place('From', fall.from, (from) => apart(from, fall.to) && change({ ...fall, from }))}
          {place('To', fall.to, (to) => apart(fall.from, to) && change({ ...fall, to }))}
          <PointButton what="fallLine" label="Point at two places on it" />
        </>
      );
    }
  }
}

/** Starts or leaves pointing on the plan, and says what to point at. */
export function PointButton({ what, label }: { what: Placing['what']; label: string }) {
  const table = useTableStore();
  const placing = useTable((state) => state.placing);
  const on = placing?.what === what;
  const says: Record<Placing['what'], string> = {
    spots: 'Tap or click where you measured. Then type the level.',
    fallPoint: 'Tap or click the low point.',
    fallLine: placing?.first
      ? 'Now another place on the line.'
      : 'Tap or click one place on the line.',
    fallDirection: placing?.first
      ? 'Now towards where the water is to go.'
      : 'Tap or click where the water comes from.',
  };
  return (
    <div>
      <button
        type="button"
        className="button w-full"
        aria-pressed={on}
        onClick={() => (on ? placingLeft(table) : placingStarted(table, what))}
      >
        <Crosshair size={16} aria-hidden /> {on ? 'Done pointing' : label}
      </button>
      {on && <p className="mt-1 text-sm text-line">{says[what]}</p>}
    </div>
  );
}

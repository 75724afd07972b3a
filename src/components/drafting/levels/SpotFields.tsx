import { ClipboardPaste, Trash2 } from 'lucide-react';
import { useEffect, useRef, useState } from 'react';
import { spotAt, spotChanged } from '@/paving/level-edits';
import { levelText } from '@/paving/level-text';
import { documentLevels, GREATEST_LEVEL_MM } from '@/paving/levels';
import { spotName } from '@/takeoff/level-warnings';
import { LengthField } from '../../ui/LengthField';
import { coordinateRefused, lengthWithin } from '../field-limits';
import { spotPlacedInView, spotTaken } from '../level-actions';
import { useShownFloor, useTable, useTableStore } from '../table-context';
import { PointButton } from './FinishFields';
import { SpotPaste } from './SpotPaste';

/** So many spots are shown at once; a longer list is walked through. */
const SHOWN = 20;

/** Levels of the existing ground: the list, pointing and pasting. */
export function SpotFields() {
  const { document } = useShownFloor();
  const table = useTableStore();
  const [pasting, setPasting] = useState(false);
  const picked = useTable((state) => state.spot);
  const { spots } = documentLevels(document);
  const start = picked !== null && picked >= SHOWN ? Math.floor(picked / SHOWN) * SHOWN : 0;
  const [from, setFrom] = useState(0);
  useEffect(() => setFrom(start), [start]);
  const shown = spots.slice(from, from + SHOWN);
  return (
    <section aria-label="Spot levels" className="space-y-3">
      <div className="flex items-baseline justify-between border-b border-graphite pb-1">
        <h2 className="text-base">The ground as it is</h2>
        <span className="text-slate" data-testid="spot-count">
          {spots.length === 1 ? '1 spot' : `${spots.length} spots`}
        </span>
      </div>
      {spots.length === 0 && (
        <p className="text-slate">
          No spot is measured yet. Lay a straight board or a string over the edge and measure down
          to the ground: at the corners first, then where it changes.
        </p>
      )}
      <PointButton what="spots" label="Point at spots on the plan" />
      <div className="grid grid-cols-2 gap-2">
        <button type="button" className="button" onClick={() => spotPlacedInView(table)}>
          Add one
        </button>
        <button type="button" className="button" onClick={() => setPasting(true)}>
          <ClipboardPaste size={16} aria-hidden /> Paste a list
        </button>
      </div>
      {spots.length > 0 && (
        <>
          <div aria-hidden="true" className="flex justify-between text-sm text-slate">
            <span>Spot</span>
            <span>above the edge (− below)</span>
          </div>
          <ol className="-mt-2 border-t border-stone-300 hairlines">
            {shown.map((_, n) => (
              <SpotRow key={from + n} index={from + n} />
            ))}
          </ol>
          {spots.length > SHOWN && (
            <div className="flex items-center justify-between gap-2">
              <button
                type="button"
                className="button"
                disabled={from === 0}
                onClick={() => setFrom(from - SHOWN)}
              >
                Before
              </button>
              <span className="text-sm text-slate">
                {from + 1} to {Math.min(from + SHOWN, spots.length)}
              </span>
              <button
                type="button"
                className="button"
                disabled={from + SHOWN >= spots.length}
                onClick={() => setFrom(from + SHOWN)}
              >
                After
              </button>
            </div>
          )}
        </>
      )}
      <SpotPaste open={pasting} onClose={() => setPasting(false)} />
    </section>
  );
}

function SpotRow({ index }: { index: number }) {
  const table = useTableStore();
  const { document } = useShownFloor();
  const picked = useTable((state) => state.spot === index);
  const placing = useTable((state) => state.placing !== null);
  const row = useRef<HTMLLIElement>(null);
  const level = useRef<HTMLInputElement>(null);
  const { spots } = documentLevels(document);
  const spot = spots[index];
  const name = spotName(spots, index);
  useEffect(() => {
    if (!picked) return;
    row.current?.scrollIntoView({ block: 'nearest' });
    // Put down by pointing: what was measured there is typed next.
    if (placing) level.current?.focus();
  }, [picked, placing]);
  const change = (part: Parameters<typeof spotChanged>[2]) =>
    table.getState().edit((now) => spotChanged(now, index, part));
  const move = (axis: 0 | 1) => (mm: number) => {
    const at: [number, number] = axis === 0 ? [mm, spot.at[1]] : [spot.at[0], mm];
    const there = spotAt(spots, at, index);
    if (there < 0) change({ at });
    else table.getState().set({ said: `Spot ${spotName(spots, there)} is there already.` });
  };
  return (
    <li ref={row} className="py-1">
      <div className="flex items-center gap-2">
        <button
          type="button"
          aria-pressed={picked}
          className={`min-h-9 min-w-0 flex-1 truncate text-left font-semibold pointer-coarse:min-h-11 ${picked ? 'text-line' : ''}`}
          onClick={() => table.getState().set({ spot: picked ? null : index })}
        >
          {name}
          <span className="sr-only">, pick this spot</span>
        </button>
        <div className="w-36">
          <LengthField
            label={`Level of spot ${name}`}
            hideLabel
            inputRef={level}
            mm={spot.level}
            display={document.display}
            refuse={lengthWithin(document.display, -GREATEST_LEVEL_MM, GREATEST_LEVEL_MM)}
            onLength={(mm) => change({ level: mm })}
          />
        </div>
      </div>
      {picked && (
        <div className="mt-1 mb-2 space-y-3 border-l-2 border-line py-1 pl-3">
          <p className="text-sm text-slate">{levelText(spot.level, document.display)}</p>
          <div>
            <label className="field-label" htmlFor={`spot-name-${index}`}>
              Name
            </label>
            <input
              id={`spot-name-${index}`}
              key={spot.name ?? ''}
              className="field"
              placeholder={String(index + 1)}
              defaultValue={spot.name ?? ''}
              maxLength={40}
              onBlur={(event) => {
                const typed = event.target.value.trim();
                if (typed !== (spot.name ?? '')) change({ name: typed || undefined });
              }}
              onKeyDown={(event) => event.key === 'Enter' && event.currentTarget.blur()}
            />
          </div>
          <div className="grid grid-cols-2 gap-2">
            <LengthField
              label="Across"
              mm={spot.at[0]}
              display={document.display}
              refuse={coordinateRefused}
              onLength={move(0)}
            />
            <LengthField
              label="Up"
              mm={spot.at[1]}
              display={document.display}
              refuse={coordinateRefused}
              onLength={move(1)}
            />
          </div>
          <button type="button" className="button w-full" onClick={() => spotTaken(table, index)}>
            <Trash2 size={16} aria-hidden /> Take this spot away
          </button>
        </div>
      )}
    </li>
  );
}

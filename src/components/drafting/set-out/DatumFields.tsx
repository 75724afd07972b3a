import { useEffect, useRef } from 'react';
import { cornerLabel } from '@/paving/set-out/marks';
import type { SetOut } from '@/paving/set-out/set-out';
import { Length } from '../../ui/Length';
import { useShownFloor, useTable, useTableStore } from '../table-context';
import {
  datumCorners,
  datumPointed,
  datumRefused,
  datumsCleared,
  datumsLeft,
  datumsStarted,
} from './set-out-actions';

/** The two corners that tapes are hooked on: picked by the program, or chosen by pointing or by letter. */
export function DatumFields({ setOut }: { setOut: SetOut }) {
  const table = useTableStore();
  const { document } = useShownFloor();
  const choosing = useTable((state) => state.tool === 'datum');
  const first = useTable((state) => state.datumFirst);
  const [a, b] = setOut.datums;
  const letters = useRef<HTMLUListElement>(null);
  const again = useRef<HTMLButtonElement>(null);
  const before = useRef(choosing);
  // The button pressed is gone by then: by the keys one goes on where one was.
  useEffect(() => {
    if (before.current === choosing) return;
    before.current = choosing;
    const { activeElement, body } = window.document;
    if (activeElement !== body) return;
    (choosing ? letters.current?.querySelector('button') : again.current)?.focus();
  }, [choosing]);
  return (
    <section aria-label="Corners to tape from" className="space-y-2">
      <p className="text-lg leading-snug">
        Two tapes, hooked on at <b data-testid="datums">{`${a.name} and ${b.name}`}</b>,{' '}
        <Length mm={setOut.baseline.length} display={document.display} /> apart.
      </p>
      <p className="text-sm text-slate">
        {setOut.baseline.chosen
          ? 'You chose these corners.'
          : 'Picked for you: of all pairs of corners, the one from which the most points are fixed well, and best.'}
      </p>
      {choosing ? (
        <div className="border-l-2 border-line pl-3">
          <p>
            {first
              ? `From ${cornerLabel(...first)} and …: point at the second corner.`
              : 'Point at the first corner to tape from.'}
          </p>
          <ul ref={letters} className="mt-2 flex flex-wrap gap-2">
            {datumCorners(document).map((corner) => (
              <li key={corner.join('.')}>
                <button
                  type="button"
                  className="button px-2"
                  disabled={datumRefused(document, first, corner) !== null}
                  onClick={() => datumPointed(table, corner)}
                >
                  {cornerLabel(...corner)}
                </button>
              </li>
            ))}
          </ul>
          <button
            type="button"
            className="button button-quiet mt-1"
            onClick={() => datumsLeft(table)}
          >
            Leave them as they are
          </button>
        </div>
      ) : (
        <div className="flex gap-2">
          <button
            ref={again}
            type="button"
            className="button flex-1 px-2 text-sm"
            onClick={() => datumsStarted(table)}
          >
            Choose two corners
          </button>
          {setOut.baseline.chosen && (
            <button
              type="button"
              className="button flex-1 px-2 text-sm"
              onClick={() => datumsCleared(table)}
            >
              Pick them for me
            </button>
          )}
        </div>
      )}
    </section>
  );
}

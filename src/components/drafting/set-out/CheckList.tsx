import { formatCount } from '@/paving/count';
import type { Check, SetOut } from '@/paving/set-out/set-out';
import { formatLength, type Display } from '@/paving/length';
import { FiguredWords } from '../../ui/FiguredWords';
import { Length } from '../../ui/Length';
import { useShownFloor } from '../table-context';

/** What will do, in words: `2 mm to 5 mm`, `at least 6 mm`. */
function checkLimits({ least, greatest }: Check, display: Display): string {
  const shown = (mm: number) => formatLength(mm, display, { decimals: 1 });
  if (least !== null && greatest !== null)
    return least === 0 ? `up to ${shown(greatest)}` : `${shown(least)} to ${shown(greatest)}`;
  if (least !== null) return `at least ${shown(least)}`;
  return greatest === null ? '' : `at most ${shown(greatest)}`;
}

/** What the crew measures, the figure expected, and what will do. */
export function CheckList({ setOut }: { setOut: SetOut }) {
  const { display } = useShownFloor().document;
  return (
    <details>
      <summary className="cursor-pointer border-b border-graphite pb-1 font-bold pointer-coarse:min-h-11">
        What to check ({formatCount(setOut.checks.length)})
      </summary>
      <ul className="hairlines text-[0.93rem]">
        {setOut.checks.map((check) => (
          <li key={check.id} className="py-1.5">
            <div className="flex items-baseline justify-between gap-3">
              <span>
                <FiguredWords words={check.what} display={display} />
              </span>
              <b className="shrink-0">
                <Length mm={check.expected} display={display} decimals={1} />
              </b>
            </div>
            <p className="text-sm text-slate">
              {checkLimits(check, display)} will do; {check.source}.
            </p>
          </li>
        ))}
      </ul>
    </details>
  );
}

import { useEffect, useRef } from 'react';
import { STEPS, type Step } from './table-store';
import { useTable, useTableStore } from './table-context';

export const STEP_NAMES: Record<Step, string> = {
  ground: 'Ground',
  unit: 'Unit',
  bond: 'Bond',
  fit: 'Fit',
  levels: 'Levels',
  takeOff: 'Take-off',
  setOut: 'Set-out',
  versions: 'Versions',
};

function Peg({ state }: { state: 'done' | 'now' | 'to come' }) {
  const fill =
    state === 'to come' ? 'var(--peg-empty)' : state === 'now' ? 'var(--line)' : 'var(--graphite)';
  const stroke = state === 'to come' ? 'var(--slate)' : fill;
  return (
    <svg width="22" height="22" viewBox="0 0 22 22" aria-hidden="true" className="shrink-0">
      <path d="M6 3h10l-2 16H8z" fill={fill} stroke={stroke} strokeWidth="1.2" />
      {state === 'now' && <path d="M2 7h18M2 10h18" stroke="var(--line)" strokeWidth="1.6" />}
    </svg>
  );
}

/** The steps of the job as pegs on a string, in the order of the work. */
export function PegString() {
  const table = useTableStore();
  const step = useTable((state) => state.step);
  const at = STEPS.indexOf(step);
  const string = useRef<HTMLElement>(null);
  // On a narrow window the string is longer than the window: the current peg is kept in its middle.
  useEffect(() => {
    const peg = string.current?.querySelector<HTMLElement>('[aria-current]');
    if (!string.current || !peg) return;
    string.current.scrollLeft = peg.offsetLeft - (string.current.clientWidth - peg.offsetWidth) / 2;
  }, [step]);
  return (
    <nav
      ref={string}
      aria-label="Steps"
      className="relative flex overflow-x-auto md:w-[6.6rem] md:flex-col md:overflow-x-visible md:py-6"
    >
      <span
        aria-hidden="true"
        className="absolute top-[1.35rem] right-0 left-0 h-px bg-stone-300 md:top-0 md:right-auto md:bottom-0 md:left-[1.35rem] md:h-auto md:w-px"
      />
      {STEPS.map((name, n) => (
        <button
          key={name}
          type="button"
          aria-current={name === step ? 'step' : undefined}
          onClick={() => table.getState().goTo(name)}
          className={`relative flex min-h-[3.3rem] min-w-[4.1rem] flex-1 flex-col items-center justify-start gap-0.5 pt-2 text-sm md:min-h-[4rem] md:min-w-0 md:flex-none md:flex-row md:items-center md:justify-start md:gap-2 md:px-2.5 md:pt-0 ${
            name === step ? 'font-bold text-line' : n < at ? 'font-semibold' : 'text-slate'
          }`}
        >
          <Peg state={n < at ? 'done' : n === at ? 'now' : 'to come'} />
          <span className="whitespace-nowrap">{STEP_NAMES[name]}</span>
        </button>
      ))}
    </nav>
  );
}

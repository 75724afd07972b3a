import { formatCount } from '@/paving/count';
import type { Fate } from './comparison-picture';
import type { UnitCounts } from './difference-words';

const STROKES: Record<Fate, string> = {
  kept: '',
  gone: 'M0 20L20 0M0 10L10 0M10 20L20 10',
  new: 'M3 6.5h7M6.5 3v7M11 13.5h7M14.5 10v7',
  moved: 'M0 6h20M0 13h20',
};
const COLOURS: Record<Fate, string> = {
  kept: 'var(--graphite)',
  gone: 'var(--brick)',
  new: 'var(--vial)',
  moved: 'var(--amber)',
};

/** The key of the picture: how each fate is hatched, and how many units share it. */
export function FateKey({ units, from, to }: { units: UnitCounts; from: string; to: string }) {
  const entries: readonly (readonly [Fate, number, string])[] = [
    ['kept', units.kept, 'kept'],
    ...(units.anew ? [] : ([['moved', units.moved, 'moved']] as const)),
    ['gone', units.gone, `only in ${from}`],
    ['new', units.added, `only in ${to}`],
  ];
  return (
    <ul className="flex flex-wrap gap-x-6 gap-y-2" aria-label="Units, one by one">
      {entries.map(([fate, count, words]) => (
        <li key={fate} className="flex items-center gap-2">
          <svg width="20" height="20" viewBox="0 0 20 20" aria-hidden="true">
            <path d={STROKES[fate]} stroke={COLOURS[fate]} strokeWidth="1.5" fill="none" />
            <rect
              x="0.8"
              y="0.8"
              width="18.4"
              height="18.4"
              fill="none"
              stroke={COLOURS[fate]}
              strokeWidth="1.6"
            />
          </svg>
          <span>
            <strong data-testid={`units-${fate}`}>{formatCount(count)}</strong> {words}
          </span>
        </li>
      ))}
    </ul>
  );
}

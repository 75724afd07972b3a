import { buildUpAdvice } from '@/paving/build-up-advice';
import { earthOf } from '../earth';
import { useRestingFloor } from './use-resting-floor';

/** What to look at before the figures are built by: the survey first, then layers, units and falls. */
export function LevelAdvice() {
  const floor = useRestingFloor();
  const earth = earthOf(floor);
  if (!earth) return null;
  const advice = buildUpAdvice(floor.document);
  const looks = advice.filter(({ weight }) => weight === 'look');
  const notes = advice.filter(({ weight }) => weight === 'note');
  return (
    <section aria-label="Look here" className="space-y-2">
      {(earth.volumes.warnings.length > 0 || looks.length > 0) && (
        <div
          className="border-t-2 border-amber bg-amber-wash px-3 py-2"
          data-testid="level-warnings"
        >
          <h2 className="text-base">Look here</h2>
          <ul className="mt-1 list-disc space-y-1.5 pl-5">
            {earth.volumes.warnings.map(({ kind, text }, n) => (
              <li key={`${kind} ${n}`}>{text}</li>
            ))}
            {looks.map(({ kind, text, source }) => (
              <li key={kind + text}>
                {text} <span className="text-sm text-slate">({source})</span>
              </li>
            ))}
          </ul>
        </div>
      )}
      <ul className="list-disc space-y-1.5 pl-5 text-sm">
        {notes.map(({ kind, text, source }) => (
          <li key={kind + text}>
            {text} <span className="text-slate">({source})</span>
          </li>
        ))}
        <li>
          Before anybody digs, have buried pipes and cables located, and dig by hand near them.
        </li>
      </ul>
    </section>
  );
}

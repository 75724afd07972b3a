import { CircleAlert, HardHat, Eye } from 'lucide-react';
import type { TakeOffWarning } from '@/takeoff/take-off';

const LOOKS = {
  wrong: { word: 'Will not work', icon: CircleAlert, ink: 'text-brick' },
  look: { word: 'Look here', icon: Eye, ink: 'text-amber' },
  caution: { word: '', icon: HardHat, ink: 'text-graphite' },
} as const;

/** Warnings of one kind under a heading: what a careful person would look at before ordering. */
export function TakeOffWarnings({
  title,
  warnings,
}: {
  title: string;
  warnings: readonly TakeOffWarning[];
}) {
  if (warnings.length === 0) return null;
  return (
    <section aria-label={title}>
      <h3 className="border-b border-graphite pb-1">{title}</h3>
      <ul className="hairlines">
        {warnings.map(({ id, weight, words, source }) => {
          const { word, icon: Icon, ink } = LOOKS[weight];
          return (
            <li key={id} className="flex gap-2.5 py-2">
              <Icon size={18} aria-hidden className={`mt-0.5 shrink-0 ${ink}`} />
              <div>
                <p className="text-[0.95rem]">
                  {word && <b className={ink}>{word}.</b>} {words}
                </p>
                {source && (
                  <p className="text-[0.82rem] text-slate">
                    {source[0].toUpperCase() + source.slice(1)}.
                  </p>
                )}
              </div>
            </li>
          );
        })}
      </ul>
    </section>
  );
}

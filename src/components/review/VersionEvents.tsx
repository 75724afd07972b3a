import type { VersionEvent } from '@/api-types/versions';
import { Peg, statePeg } from '../ui/Peg';
import { Moment } from '../ui/Moment';
import { STATE_WORDS } from '../ui/version-words';

/** What became of a version, each step a peg on the string. */
export function VersionEvents({ events }: { events: readonly VersionEvent[] }) {
  return (
    <section aria-label="What became of it">
      <h2 className="text-base">What became of it</h2>
      <ol className="mt-2">
        {events.map((event, n) => (
          <li key={n} className="relative flex gap-3 pb-3">
            {n < events.length - 1 && (
              <span
                className="absolute top-3 bottom-0 left-[6px] border-l border-slate"
                aria-hidden="true"
              />
            )}
            <Peg look={statePeg(event.kind)} className="relative mt-0.5" />
            <div className="min-w-0">
              <p>
                <strong>{STATE_WORDS[event.kind]}</strong> by {event.person.name}
              </p>
              <p className="text-sm text-slate">
                <Moment iso={event.at} />
              </p>
              {event.note && (
                <p className="mt-1 text-sm break-words whitespace-pre-line">{event.note}</p>
              )}
            </div>
          </li>
        ))}
      </ol>
    </section>
  );
}

import { formatCount } from '@/paving/count';
import { dayAndTime } from '../ui/times';
import { refreshNow, useSite, type SiteState } from './site-state';
import { takeNewer, useProgram } from './site-worker';

/** What is kept and what is still to be sent, plainly. */
const syncWords = ({
  waiting,
  heard,
  busy,
}: Pick<SiteState, 'waiting' | 'heard' | 'busy'>): string => {
  const n = waiting.filter(({ refused }) => refused === null).length;
  const entries = n === 1 ? '1 entry' : `${formatCount(n)} entries`;
  if (n === 0) {
    if (busy) return 'Asking for news …';
    if (heard === 'no-signal') return 'Kept on this phone. No signal; nothing waits to be sent.';
    return heard === 'failed' ? 'Kept on this phone. The server did not answer.' : 'All sent.';
  }
  if (busy) return `Sending ${entries} …`;
  const why: Partial<Record<NonNullable<SiteState['heard']>, string>> = {
    'no-signal': ' No signal.',
    failed: ' The server did not answer; it is tried again.',
    'not-yours': ' Somebody else is signed in.',
  };
  return `Kept on this phone, ${entries} to send.${(heard && why[heard]) ?? ''}`;
};

/** The line under the head: what is kept, what waits, whether the program opens without signal. */
export function SyncLine({ keptAt }: { keptAt?: string }) {
  const { waiting, heard, busy, trouble } = useSite();
  const program = useProgram();
  const unsent = waiting.some(({ refused }) => refused === null);
  const refused = waiting.filter((entry) => entry.refused !== null).length;
  return (
    <div className="border-b border-stone-300">
      <div className="flex min-h-11 items-center justify-between gap-3 px-4">
        <p
          role="status"
          data-testid="site-sync"
          data-unsent={waiting.length - refused}
          className={`py-1.5 leading-snug ${unsent && !busy ? 'font-semibold' : ''}`}
        >
          {syncWords({ waiting, heard, busy })}
          {keptAt && !unsent && !busy && (
            <span className="text-slate"> As of {dayAndTime(keptAt)}.</span>
          )}
        </p>
        {!busy && heard !== 'heard' && heard !== null && (
          <button type="button" className="button button-quiet" onClick={() => void refreshNow()}>
            Try now
          </button>
        )}
      </div>
      {trouble && (
        <p role="alert" className="bg-brick-wash px-4 py-2 font-semibold text-brick">
          {trouble}
        </p>
      )}
      {refused > 0 && (
        <p className="bg-amber-wash px-4 py-2 text-amber">
          {refused === 1 ? 'One entry was' : `${formatCount(refused)} entries were`} not taken. Look
          under Notes: each says why.
        </p>
      )}
      {program === 'newer' && (
        <p className="flex flex-wrap items-center justify-between gap-2 bg-stone-100 px-4 py-2">
          A newer program is on this phone. Take it when nothing is half typed.
          <button type="button" className="button" onClick={takeNewer}>
            Take it now
          </button>
        </p>
      )}
      {(program === 'impossible' || program === 'keeping') && (
        <p className="px-4 pb-2 text-sm text-slate" data-testid="program">
          {program === 'keeping'
            ? 'The program is still being kept on this phone. Wait a moment before you leave the signal.'
            : 'This browser does not keep the program itself: leave this page open, and do not load it again without signal.'}
        </p>
      )}
      {program === 'kept' && !keptAt && (
        <p className="px-4 pb-2 text-sm text-slate" data-testid="program">
          This page opens without signal.
        </p>
      )}
    </div>
  );
}

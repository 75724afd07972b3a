import { formatCount } from '@/paving/count';
import type { Heard } from './phone-sync';
import { refreshNow, useSite } from './site-state';

/** Nobody's phone at the moment: nothing is shown of anybody, and what waits is said. */
export function SignedOut({ heard }: { heard: Heard }) {
  const locked = useSite((state) => state.locked);
  const here = `/sign-in?next=${encodeURIComponent(location.pathname)}`;
  return (
    <div className="max-w-xl p-5">
      <h1>On site</h1>
      {heard === 'not-yours' ? (
        <p className="mt-3">
          These are the crew’s plans. You are signed in as a client: how the work goes stands on the
          page of your floor, under{' '}
          <a className="link" href="/projects">
            your projects
          </a>
          .
        </p>
      ) : (
        <>
          <p className="mt-3">
            {heard === 'no-signal'
              ? 'Nobody is signed in on this phone, and there is no signal to sign in with. Come back to this page where there is signal.'
              : heard === 'failed'
                ? 'The server could not answer just now. Nothing on this phone is lost.'
                : 'Sign in, and the plans that you build from are kept on this phone.'}
          </p>
          <p className="mt-5 flex flex-wrap gap-3">
            {heard === 'signed-out' && (
              <a className="button button-primary" href={here}>
                Sign in
              </a>
            )}
            {(heard === 'no-signal' || heard === 'failed') && (
              <button type="button" className="button" onClick={() => void refreshNow()}>
                Try again
              </button>
            )}
          </p>
        </>
      )}
      {locked > 0 && (
        <p className="mt-6 border-l-2 border-amber pl-3">
          {locked === 1 ? 'One entry waits' : `${formatCount(locked)} entries wait`} on this phone,
          locked. {locked === 1 ? 'It is' : 'They are'} sent once whoever made{' '}
          {locked === 1 ? 'it' : 'them'} signs in again.
        </p>
      )}
    </div>
  );
}

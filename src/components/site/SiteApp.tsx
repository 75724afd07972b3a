import { useEffect, useState } from 'react';
import { PackView } from './PackView';
import { SignedOut } from './SignedOut';
import { SiteList } from './SiteList';
import { keepPack, startSite, useSite } from './site-state';
import { keepProgram } from './site-worker';

/** The last step of the address: the version that is open, or none for the list. */
const versionOf = (path: string): string | null =>
  /^\/site\/([A-Za-z0-9_-]+)\/?$/.exec(path)?.[1] ?? null;

/** The phone's own screens. All of them are drawn from what the phone keeps, so that they are the same without signal. */
export default function SiteApp() {
  const { phase, person, heard, packs } = useSite();
  useEffect(() => {
    void keepProgram();
    return startSite();
  }, []);
  const versionId = versionOf(location.pathname);
  const kept = packs.find((pack) => pack.versionId === versionId);
  const listed = person?.summaries.some((summary) => summary.versionId === versionId) ?? false;
  const [fetched, setFetched] = useState<'no' | 'asked' | 'failed'>('no');
  // A plan that is opened here is kept here.
  useEffect(() => {
    if (!versionId || kept || !listed || fetched !== 'no' || heard !== 'heard') return;
    setFetched('asked');
    keepPack(versionId).catch(() => setFetched('failed'));
  }, [versionId, kept, listed, fetched, heard]);
  if (phase === 'opening') return <Said>Looking at what this phone keeps …</Said>;
  if (phase === 'blocked') return <Blocked />;
  if (!person) {
    if (heard === null) return <Said>Asking what you may build from …</Said>;
    return <SignedOut heard={heard} />;
  }
  if (versionId && !kept && fetched === 'asked') return <Said>Fetching the plan …</Said>;
  if (versionId && kept) return <PackView kept={kept} person={person} />;
  return <SiteList person={person} packs={packs} asked={versionId} />;
}

function Said({ children }: { children: string }) {
  return (
    <p role="status" className="p-5 text-slate">
      {children}
    </p>
  );
}

function Blocked() {
  return (
    <div role="alert" className="max-w-xl p-5">
      <h1>This browser keeps nothing</h1>
      <p className="mt-3">
        Plans and what you enter must be kept on the phone, or they would be lost where there is no
        signal. This window does not let pages keep anything: it may be a private window, or keeping
        is shut off in the browser’s settings.
      </p>
      <p className="mt-3">
        Open this page in an ordinary window, or allow it to keep data, and load it again. Until
        then, use{' '}
        <a className="link" href="/projects">
          the projects
        </a>{' '}
        while there is signal, or the plan on paper.
      </p>
      <button type="button" className="button mt-5" onClick={() => location.reload()}>
        Try again
      </button>
    </div>
  );
}

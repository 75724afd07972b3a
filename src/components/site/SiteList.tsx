import { useState } from 'react';
import type { Role } from '@/api-types/people';
import type { SitePackSummary } from '@/api-types/site';
import { Mark } from '../ui/Mark';
import { Peg } from '../ui/Peg';
import { dayOf } from '../ui/times';
import { FloorDrawing } from '../ui/FloorDrawing';
import { packEntries, packFloor, packRecord } from './pack-floor';
import type { KeptPack, PhonePerson } from './phone-store';
import { keepPack, useSite } from './site-state';
import { SyncLine } from './SyncLine';
import { ThemeButton } from './ThemeButton';

interface Props {
  readonly person: PhonePerson;
  readonly packs: readonly KeptPack[];
  /** A version that was asked for and is not kept here. */
  readonly asked: string | null;
}

/** Where no plan is issued: whose turn it is. */
const EMPTY: Readonly<Record<Role, string>> = {
  installer: 'No plan is issued to you yet. It comes here by itself once the designer issues it.',
  designer:
    'No version is issued yet. Issue one from its own page once the client has accepted it: it is then here, and on the phones of the crew.',
  owner:
    'No version is issued yet. Once the client has accepted one and it is issued, it is here, and on the phones of the crew.',
  client:
    'Nothing is being built yet. Once your version is issued, its page in the project shows how far the work is.',
};

/** The plans to build from: those kept on this phone, and those that can be. */
export function SiteList({ person, packs, asked }: Props) {
  const { busy, heard } = useSite();
  const builds = person.account.role === 'installer';
  const kept = new Map(packs.map((pack) => [pack.versionId, pack]));
  const current = person.summaries.filter(({ state }) => state === 'issued');
  const past = person.summaries.filter(
    ({ state, versionId }) => state !== 'issued' && kept.has(versionId),
  );
  const wanted = asked ? person.summaries.find(({ versionId }) => versionId === asked) : undefined;
  return (
    <>
      <header className="flex min-h-[52px] items-center justify-between border-b border-graphite px-4">
        <a
          className="flex min-h-11 items-center gap-2 text-lg font-bold no-underline"
          href="/projects"
        >
          <Mark size={26} />
          On site
        </a>
        <ThemeButton />
      </header>
      <SyncLine />
      <div className="mx-auto max-w-3xl px-4 py-5">
        <h1 className="text-[1.5rem]">{builds ? 'Plans to build from' : 'Plans on site'}</h1>
        <p className="mt-1 text-slate">
          {person.account.name}, {person.account.firm.name}
        </p>
        {asked && (
          <p role="status" className="mt-4 border-l-2 border-amber pl-3">
            {wanted
              ? 'That plan is not kept on this phone yet. Keep it below while there is signal.'
              : builds
                ? 'That plan is not among those you build from: it is not issued, or it is not yours.'
                : 'That plan is not issued, or it is not your firm’s.'}
          </p>
        )}
        {current.length === 0 && (
          <p className="mt-6 max-w-prose">
            {busy
              ? 'Asking which plans are issued to you …'
              : heard === 'heard'
                ? EMPTY[person.account.role]
                : 'No plan is kept on this phone yet. Open this page once where there is signal.'}
          </p>
        )}
        <ul className="mt-4">
          {current.map((summary) => (
            <Plan
              key={summary.versionId}
              summary={summary}
              kept={kept.get(summary.versionId)}
              person={person}
            />
          ))}
        </ul>
        {past.length > 0 && (
          <>
            <h2 className="mt-8 text-base">Superseded: do not build from these</h2>
            <ul className="mt-2">
              {past.map((summary) => (
                <Plan
                  key={summary.versionId}
                  summary={summary}
                  kept={kept.get(summary.versionId)}
                  person={person}
                />
              ))}
            </ul>
          </>
        )}
        <p className="mt-8 border-t border-stone-300 pt-3 text-sm text-slate">
          Signing out takes every plan off this phone. What is not sent yet stays on it, locked,
          until you sign in again.
        </p>
        <p className="flex gap-6">
          <a className="link flex min-h-11 items-center" href="/account">
            Your account
          </a>
          <a className="link flex min-h-11 items-center" href="/guide/on-site">
            Guide
          </a>
        </p>
      </div>
    </>
  );
}

function Plan({
  summary,
  kept,
  person,
}: {
  summary: SitePackSummary;
  kept: KeptPack | undefined;
  person: PhonePerson;
}) {
  const waiting = useSite((state) => state.waiting);
  const superseded = summary.state !== 'issued';
  const laid = kept && packRecord(packEntries(kept, waiting, person)).laid.size;
  const courses = kept && packFloor(kept.versionId, kept.pack.document).setOut.courses.length;
  const to = `/site/${summary.versionId}`;
  const words = (
    <span className="min-w-0 flex-1">
      <span className="block font-semibold">
        {summary.projectName}: {summary.layoutName}
      </span>
      <span className="block text-sm text-slate">
        Version {summary.number}, {summary.label}
      </span>
      <span className={`block text-sm ${superseded ? 'font-semibold text-brick' : ''}`}>
        {superseded
          ? `Superseded${summary.supersededBy ? ` by version ${summary.supersededBy.number}` : ''}`
          : `Issued ${dayOf(summary.issuedAt)}`}
        {kept && !superseded && ` · ${laid} of ${courses} courses laid`}
      </span>
    </span>
  );
  return (
    <li className="border-t border-stone-300 last:border-b" data-testid="site-plan">
      {kept ? (
        <a
          href={to}
          className="flex min-h-20 items-center gap-3 py-3 no-underline hover:bg-stone-100"
        >
          <Peg look={superseded ? 'empty' : 'holds'} />
          {words}
          <FloorDrawing
            document={kept.pack.document}
            width={80}
            height={60}
            className="w-20 shrink-0"
          />
        </a>
      ) : (
        <NotKept versionId={summary.versionId}>{words}</NotKept>
      )}
    </li>
  );
}

function NotKept({ versionId, children }: { versionId: string; children: React.ReactNode }) {
  const [busy, setBusy] = useState(false);
  const [wrong, setWrong] = useState<string | null>(null);
  const keep = async () => {
    setBusy(true);
    setWrong(null);
    try {
      await keepPack(versionId);
    } catch (error) {
      setWrong(error instanceof Error ? error.message : 'That did not work. Try again.');
    }
    setBusy(false);
  };
  return (
    <div className="py-3">
      <div className="flex items-center gap-3">
        <Peg look="plain" />
        {children}
        <button type="button" className="button" disabled={busy} onClick={() => void keep()}>
          {busy ? 'Keeping …' : 'Keep here'}
        </button>
      </div>
      {wrong && (
        <p role="alert" className="mt-2 text-brick">
          {wrong}
        </p>
      )}
    </div>
  );
}

import { Camera, ChevronLeft, Compass, ListChecks, Rows3, Scaling } from 'lucide-react';
import { useEffect, useMemo, useState } from 'react';
import type { Display } from '@/paving/length';
import { CoursesTab } from './CoursesTab';
import { ChecksTab } from './ChecksTab';
import { NotesTab } from './NotesTab';
import { packEntries, packFloor, packRecord, type PackEntry, type PackFloor } from './pack-floor';
import type { KeptPack, PhonePerson } from './phone-store';
import { SetOutTab } from './SetOutTab';
import { useShownIn } from './shown-in';
import { SizesTab } from './SizesTab';
import { useSite } from './site-state';
import { Superseded } from './Superseded';
import { SyncLine } from './SyncLine';
import { ThemeButton } from './ThemeButton';

const TABS = [
  ['set-out', 'Set out', Compass],
  ['courses', 'Courses', Rows3],
  ['checks', 'Checks', ListChecks],
  ['notes', 'Notes', Camera],
  ['sizes', 'Sizes', Scaling],
] as const;
type Tab = (typeof TABS)[number][0];

/** What every tab is given. */
export interface TabProps {
  readonly kept: KeptPack;
  readonly floor: PackFloor;
  readonly entries: readonly PackEntry[];
  readonly record: ReturnType<typeof packRecord>;
  readonly display: Display;
}

const tabOf = (hash: string): Tab => TABS.find(([tab]) => `#${tab}` === hash)?.[0] ?? 'courses';

const useTab = (): Tab => {
  const [tab, setTab] = useState(() => tabOf(location.hash));
  useEffect(() => {
    const read = () => setTab(tabOf(location.hash));
    window.addEventListener('hashchange', read);
    return () => window.removeEventListener('hashchange', read);
  }, []);
  return tab;
};

/** One issued version on the phone, its work in five parts. */
export function PackView({ kept, person }: { kept: KeptPack; person: PhonePerson }) {
  const { pack, versionId } = kept;
  const waiting = useSite((state) => state.waiting);
  const tab = useTab();
  const [display, switchDisplay] = useShownIn(pack.document.display);
  const floor = packFloor(versionId, pack.document);
  const entries = useMemo(() => packEntries(kept, waiting, person), [kept, waiting, person]);
  const record = useMemo(() => packRecord(entries), [entries]);
  const props: TabProps = { kept, floor, entries, record, display };

  useEffect(() => {
    document.title = `${pack.projectName}, version ${pack.number} · Evenlay`;
  }, [pack.projectName, pack.number]);

  return (
    <div className="flex min-h-dvh flex-col">
      <header className="border-b border-graphite">
        <div className="flex items-stretch">
          <a
            className="flex min-h-[52px] min-w-11 items-center px-3 text-lg no-underline"
            href="/site"
            aria-label="All plans"
          >
            <ChevronLeft size={24} aria-hidden />
          </a>
          <div className="min-w-0 flex-1 border-l border-stone-300 px-3 py-1.5">
            <h1 className="truncate text-[1.05rem] leading-tight">{pack.projectName}</h1>
            <p className="truncate text-sm text-slate">
              {pack.layoutName}, version {pack.number}
            </p>
          </div>
          <button
            type="button"
            className="button button-quiet min-w-14 shrink-0"
            aria-label={display === 'metric' ? 'Show feet and inches' : 'Show millimetres'}
            onClick={switchDisplay}
          >
            {display === 'metric' ? 'mm' : 'ft in'}
          </button>
          <ThemeButton />
        </div>
      </header>
      <Superseded pack={pack} />
      <SyncLine keptAt={kept.keptAt} />
      <div className="mx-auto w-full max-w-3xl flex-1 px-4 pt-4 pb-24" key={tab}>
        {tab === 'set-out' && <SetOutTab {...props} />}
        {tab === 'courses' && <CoursesTab {...props} />}
        {tab === 'checks' && <ChecksTab {...props} />}
        {tab === 'notes' && <NotesTab {...props} />}
        {tab === 'sizes' && <SizesTab {...props} />}
      </div>
      <nav
        aria-label="Parts of the work"
        className="fixed inset-x-0 bottom-0 z-30 border-t border-graphite bg-stone-50 pb-[env(safe-area-inset-bottom)]"
      >
        <ul className="mx-auto flex max-w-3xl">
          {TABS.map(([name, words, Icon]) => (
            <li key={name} className="flex-1">
              <a
                href={`#${name}`}
                aria-current={tab === name ? 'page' : undefined}
                className={`flex min-h-14 flex-col items-center justify-center gap-0.5 border-t-[3px] text-[0.86rem] no-underline ${
                  tab === name
                    ? 'border-line font-bold text-line'
                    : 'border-transparent text-graphite'
                }`}
              >
                <Icon size={20} aria-hidden />
                {words}
              </a>
            </li>
          ))}
        </ul>
      </nav>
    </div>
  );
}

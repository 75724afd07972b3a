import { QueryClient, QueryClientProvider, useMutation } from '@tanstack/react-query';
import { Keyboard, Maximize2, Redo2, Undo2, ZoomIn, ZoomOut } from 'lucide-react';
import { useEffect, useMemo, useRef, useState } from 'react';
import { useStore } from 'zustand';
import type { DraftSaved, DraftState, SaveDraft } from '@/api-types/layouts';
import { BOND_NAMES } from '@/paving/bond-edits';
import { DraftPresence } from '../live/DraftPresence';
import { api } from '../ui/api';
import { Mark } from '../ui/Mark';
import { Segmented } from '../ui/Segmented';
import { createDraftSync, type DraftSync } from './draft-sync';
import { DrawEntry, type DrawEntryHandle } from './DrawEntry';
import FloorStage, { zoomToFit } from './FloorStage';
import { GapRibbon } from './GapRibbon';
import { KeyList } from './KeyList';
import { LayoutDrop, LayoutFiles, LayoutRefused, useLayoutOpening } from './LayoutFiles';
import { createFitService } from './fit/fit-service';
import { BondPanel } from './panels/BondPanel';
import { GroundPanel } from './panels/GroundPanel';
import { FitPanel } from './panels/FitPanel';
import { LevelsPanel } from './panels/LevelsPanel';
import { SetOutPanel } from './panels/SetOutPanel';
import { TakeOffPanel } from './panels/TakeOffPanel';
import { UnitPanel } from './panels/UnitPanel';
import { useVersions, VersionsPanel } from './panels/VersionsPanel';
import { PegString, STEP_NAMES } from './PegString';
import { SaveVersion } from './SaveVersion';
import { SyncBanner, SyncNote } from './SyncNote';
import { TableProvider, useShownFloor, useTable, useTableStore } from './table-context';
import { displaySwitched, keyActed, redo, undo, zoomBy } from './table-keys';
import { createTableStore } from './table-store';

interface Props {
  readonly draft: DraftState;
  readonly personId: string;
}

/** The drafting table of one layout. */
export default function DraftingTable({ draft, personId }: Props) {
  const [queries] = useState(
    () => new QueryClient({ defaultOptions: { queries: { networkMode: 'always', retry: 1 } } }),
  );
  return (
    <QueryClientProvider client={queries}>
      <Table draft={draft} personId={personId} />
    </QueryClientProvider>
  );
}

function Table({ draft, personId }: Props) {
  const [table] = useState(() => createTableStore(draft.document));
  const { mutateAsync } = useMutation({
    networkMode: 'always',
    mutationFn: (body: SaveDraft) =>
      api<DraftSaved>('PUT', `/api/layouts/${draft.layoutId}/draft`, body),
  });
  const send = useRef(mutateAsync);
  useEffect(() => {
    send.current = mutateAsync;
  });
  const sync = useMemo(
    () => createDraftSync(table, draft, personId, (body) => send.current(body)),
    [table, draft, personId],
  );
  const [ready, setReady] = useState(false);

  useEffect(() => {
    let stop: (() => void) | null = null;
    let gone = false;
    void sync.restore().then(() => {
      if (gone) return;
      stop = sync.start();
      setReady(true);
    });
    return () => {
      gone = true;
      stop?.();
    };
  }, [sync]);

  return (
    <TableProvider store={table} layoutId={draft.layoutId}>
      <Board draft={draft} personId={personId} sync={sync} ready={ready} />
    </TableProvider>
  );
}

function Board({
  draft,
  personId,
  sync,
  ready,
}: {
  draft: DraftState;
  personId: string;
  sync: DraftSync;
  ready: boolean;
}) {
  const table = useTableStore();
  const step = useTable((state) => state.step);
  const display = useTable((state) => state.document.display);
  const edited = useTable((state) => state.document);
  const [keys, setKeys] = useState(false);
  const [saving, setSaving] = useState(false);
  const entry = useRef<DrawEntryHandle>(null);
  const versions = useVersions(draft.layoutId);
  const number = (versions.data?.[0]?.number ?? 0) + 1;
  const files = useLayoutOpening();
  const open = keys || saving || files.refused !== null;
  const [fit] = useState(() => createFitService(table));
  // The fit is worked out only while somebody looks at it.
  useEffect(() => (step === 'fit' ? fit.start() : undefined), [fit, step]);

  useEffect(() => {
    const onKey = (event: KeyboardEvent) => {
      const target = event.target as HTMLElement;
      const typing = target.matches(
        'input:not([type=checkbox]):not([type=radio]), textarea, select',
      );
      const command = event.ctrlKey || event.metaKey;
      if (open || event.defaultPrevented) return;
      if (typing && !(command && event.key.toLowerCase() === 's')) return;
      // Enter and Space press the button that has the focus; arrows move within radio buttons and sliders.
      const pressing =
        target.matches('button, a, summary') && (event.key === 'Enter' || event.key === ' ');
      const within = target.matches('[type=radio], [role=slider]') && event.key.startsWith('Arrow');
      if (pressing || within) return;
      const acted = keyActed(table, event, {
        showKeys: () => setKeys(true),
        saveVersion: () => setSaving(true),
        typeLength: (text) => entry.current?.type(text),
      });
      if (acted) event.preventDefault();
    };
    window.addEventListener('keydown', onKey);
    return () => window.removeEventListener('keydown', onKey);
  }, [table, open]);

  return (
    <div className="flex min-h-0 flex-1 flex-col" data-testid="table" data-ready={ready}>
      <Strip draft={draft} sync={sync} number={number} onSave={() => setSaving(true)} />
      <SyncBanner sync={sync} personId={personId} />
      <DraftPresence
        projectId={draft.projectId}
        layoutId={draft.layoutId}
        document={edited}
        newestVersion={versions.data?.[0]?.number ?? 0}
        onNewVersion={versions.refetch}
      />
      <div className="flex min-h-0 flex-1 flex-col md:flex-row">
        <div className="order-3 border-t border-stone-300 md:order-1 md:border-t-0 md:border-r">
          <PegString />
        </div>
        <div className="order-1 flex min-h-0 min-w-0 flex-[1_1_46%] flex-col md:order-2 md:flex-1">
          <LayoutDrop onFile={(file) => void files.open(file)}>
            <Floor />
            <DrawEntry ref={entry} />
            <CanvasButtons onKeys={() => setKeys(true)} />
          </LayoutDrop>
          <div className="border-t border-graphite">
            <GapRibbon />
          </div>
        </div>
        <aside
          key={step}
          aria-label={STEP_NAMES[step]}
          className="relative order-4 min-h-0 flex-[1_1_40%] overflow-y-auto border-t border-graphite px-5 pt-3 pb-8 md:order-3 md:w-[21.5rem] md:flex-none md:border-t-0 md:border-l md:pt-5"
        >
          <div className="mb-3 flex items-center justify-between gap-3">
            <h1 className="text-[1.3rem]">{STEP_NAMES[step]}</h1>
            <div className="w-32 text-sm">
              <Segmented
                label="Lengths"
                hideLabel
                value={display}
                options={[
                  ['metric', 'mm'],
                  ['imperial', 'ft in'],
                ]}
                onChange={() => displaySwitched(table)}
              />
            </div>
          </div>
          {step === 'ground' && <GroundPanel />}
          {step === 'unit' && <UnitPanel />}
          {step === 'bond' && <BondPanel />}
          {step === 'fit' && <FitPanel fit={fit} />}
          {step === 'levels' && <LevelsPanel />}
          {step === 'takeOff' && <TakeOffPanel />}
          {step === 'setOut' && <SetOutPanel />}
          {step === 'versions' && (
            <>
              <VersionsPanel layoutId={draft.layoutId} sync={sync} onSave={() => setSaving(true)} />
              <div className="mt-6">
                <LayoutFiles name={draft.layoutName} onFile={(file) => void files.open(file)} />
              </div>
            </>
          )}
        </aside>
      </div>
      <Said />
      <KeyList open={keys} onClose={() => setKeys(false)} />
      <LayoutRefused refused={files.refused} onClose={files.dismiss} />
      <SaveVersion
        open={saving}
        onClose={() => setSaving(false)}
        layoutId={draft.layoutId}
        number={number}
        sync={sync}
      />
    </div>
  );
}

function Strip({
  draft,
  sync,
  number,
  onSave,
}: {
  draft: DraftState;
  sync: DraftSync;
  number: number;
  onSave: () => void;
}) {
  const turn = useShownFloor().document.placement.turn;
  const cells: [string, React.ReactNode][] = [
    [
      'Project',
      <a key="project" className="hover:text-line" href={`/projects/${draft.projectId}`}>
        {draft.projectName}
      </a>,
    ],
    ['Layout', draft.layoutName],
    [
      draft.basedOn ? `Draft, from version ${draft.basedOn.number}` : 'Draft',
      <SyncNote key="sync" sync={sync} />,
    ],
    ['Turn', `${Number(turn.toFixed(2))}°`],
  ];
  return (
    <header className="flex items-stretch border-b border-graphite">
      <a
        href="/projects"
        className="flex items-center gap-2 px-4 text-lg font-bold md:pr-8"
        aria-label="Evenlay, your projects"
      >
        <Mark />
        <span className="hidden lg:inline">Evenlay</span>
      </a>
      <dl className="flex min-w-0 flex-1 items-stretch overflow-hidden">
        {cells.map(([label, value], n) => (
          <div
            key={label}
            className={`${n === 2 ? 'shrink-0' : 'min-w-0'} flex-col justify-center border-l border-stone-300 px-3 py-1.5 md:px-5 ${n === 1 || n === 3 ? 'hidden md:flex' : 'flex'}`}
          >
            <dt className="truncate text-[0.72rem] text-slate">{label}</dt>
            <dd className="truncate font-semibold">{value}</dd>
          </div>
        ))}
      </dl>
      <div className="flex items-center px-3">
        <button type="button" className="button button-primary whitespace-nowrap" onClick={onSave}>
          <span>
            Save<span className="hidden sm:inline"> version {number}</span>
          </span>
        </button>
      </div>
    </header>
  );
}

function Floor() {
  const { document, report, problems } = useShownFloor();
  const label = report
    ? `Drawing of the floor: ${BOND_NAMES[document.bond.kind].toLowerCase()} bond, ${report.wholeUnits} whole units, turn ${document.placement.turn}°. Use the keys; question mark lists them.`
    : `Drawing of the ground. It cannot be laid yet: ${problems[0]?.message ?? ''}`;
  return <FloorStage label={label} />;
}

function CanvasButtons({ onKeys }: { onKeys: () => void }) {
  const table = useTableStore();
  const past = useStore(table.temporal, (state) => state.pastStates.length);
  const future = useStore(table.temporal, (state) => state.futureStates.length);
  const buttons = [
    ['Undo', Undo2, () => undo(table), past === 0],
    ['Redo', Redo2, () => redo(table), future === 0],
    ['Zoom in', ZoomIn, () => zoomBy(table, 1.25), false],
    ['Zoom out', ZoomOut, () => zoomBy(table, 0.8), false],
    ['Zoom to fit', Maximize2, () => zoomToFit(table), false],
    ['Keys', Keyboard, onKeys, false],
  ] as const;
  return (
    <div className="absolute right-2 bottom-2 flex border md:right-3 md:bottom-3 border border-stone-300 bg-stone-50">
      {buttons.map(([label, Icon, act, disabled]) => (
        <button
          key={label}
          type="button"
          aria-label={label}
          title={label}
          disabled={disabled}
          onClick={act}
          className={`flex size-9 items-center justify-center hover:bg-stone-100 disabled:text-stone-300 pointer-coarse:size-11 ${['Keys', 'Zoom in', 'Zoom out'].includes(label) ? 'max-md:hidden' : ''}`}
        >
          <Icon size={17} aria-hidden />
        </button>
      ))}
    </div>
  );
}

/** What was done, said plainly: shown for a while, and read aloud. */
function Said() {
  const said = useTable((state) => state.said);
  const [shown, setShown] = useState('');
  useEffect(() => {
    if (!said) return;
    setShown(said);
    const timer = setTimeout(() => setShown(''), 6000);
    return () => clearTimeout(timer);
  }, [said]);
  return (
    <>
      <p id="table-said" role="status" className="sr-only">
        {said}
      </p>
      {shown && (
        <p
          aria-hidden="true"
          className="pointer-events-none fixed top-[3.4rem] left-1/2 z-30 max-w-[90vw] -translate-x-1/2 bg-graphite px-4 py-1.5 font-semibold text-stone-50"
        >
          {shown}
        </p>
      )}
    </>
  );
}

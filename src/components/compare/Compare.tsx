import { useQuery } from '@tanstack/react-query';
import { useCallback, useEffect, useMemo, useState } from 'react';
import type { Role } from '@/api-types/people';
import type { VersionDetail } from '@/api-types/versions';
import type { Point } from '@/geometry/point';
import { floorComparison, type FloorComparison } from '@/paving/comparison';
import type { Laying } from '@/paving/laying';
import { cameraFitted, type Camera } from '../drafting/camera';
import { floorOf } from '../drafting/floor';
import { useFloorPainter } from '../floor-window/floor-painter';
import { FloorWindow, ZoomButtons, type Painter, type Picture } from '../floor-window/FloorWindow';
import { groundBox } from '../floor-window/ground-box';
import { PointedAt } from '../floor-window/PointedAt';
import { PinMarks } from '../comments/PinMarks';
import { useThreads } from '../comments/threads';
import { useLiveRefresh } from '../live/live-refresh';
import { api } from '../ui/api';
import { Queries } from '../ui/Queries';
import { Segmented } from '../ui/Segmented';
import { STATE_WORDS } from '../ui/version-words';
import { Wrong } from '../ui/Wrong';
import { compareLink, type CompareView } from './compare-link';
import { CompareCosts } from './CompareCosts';
import { CompareTable } from './CompareTable';
import { paintOverlaid, paintSideMarks } from './comparison-picture';
import { differenceHeading, differenceSentence, figureRows } from './difference-words';
import { FateKey } from './FateKey';
import { VersionString, type PegLayout } from './VersionString';

interface Props {
  readonly a: VersionDetail;
  readonly b: VersionDetail;
  readonly layouts: readonly PegLayout[];
  readonly view: CompareView | null;
  readonly role: Role;
}

/** Below this width one floor over the other is shown first, px. */
const NARROW_PX = 700;

export default function Compare(props: Props) {
  return (
    <Queries>
      <Comparing {...props} />
    </Queries>
  );
}

function Comparing({ a: firstA, b: firstB, layouts, view: firstView, role }: Props) {
  const [ids, setIds] = useState({ from: firstA.id, to: firstB.id });
  const [view, setView] = useState<CompareView>(
    () => firstView ?? (window.innerWidth < NARROW_PX ? 'over' : 'side'),
  );
  const a = useVersion(ids.from, firstA);
  const b = useVersion(ids.to, firstB);
  useLiveRefresh(firstA.projectId);
  useEffect(() => {
    window.history.replaceState(null, '', compareLink(ids.from, ids.to, view));
  }, [ids, view]);
  const both = a.data && b.data ? { a: a.data, b: b.data } : null;
  useStripFollows(a.data, b.data);
  return (
    <div className="mx-auto flex max-w-[96rem] flex-col gap-7 px-5 py-6 lg:px-12">
      {both ? (
        <Both
          key={`${both.a.id} ${both.b.id}`}
          {...both}
          several={layouts.length > 1}
          view={view}
          onView={setView}
          role={role}
        />
      ) : (
        <div className="min-h-96">
          {a.error || b.error ? (
            <Wrong
              error={a.error ?? b.error}
              again={() => void Promise.all([a.refetch(), b.refetch()])}
            />
          ) : (
            <p className="text-slate">Laying the floor …</p>
          )}
        </div>
      )}
      <section aria-label="Pick two versions" className="border-t border-stone-300 pt-5">
        <VersionString
          layouts={layouts}
          {...ids}
          onPick={(side, id) => setIds((now) => ({ ...now, [side]: id }))}
        />
      </section>
    </div>
  );
}

const useVersion = (id: string, first: VersionDetail) =>
  useQuery({
    queryKey: ['version', id],
    queryFn: () => api<VersionDetail>('GET', `/api/versions/${id}`),
    initialData: id === first.id ? first : undefined,
    staleTime: Infinity,
  });

/** The strip over the page and the window's title are the page's own; they must name what is compared now. */
function useStripFollows(a: VersionDetail | undefined, b: VersionDetail | undefined) {
  useEffect(() => {
    const cell = document.querySelector('[data-cell=layout]');
    if (!cell || !a || !b) return;
    const one = a.layoutId === b.layoutId;
    cell.textContent = one ? a.layoutName : `${a.layoutName}, ${b.layoutName}`;
    if (cell.previousElementSibling)
      cell.previousElementSibling.textContent = one ? 'Layout' : 'Layouts';
    document.title = `Compare ${a.number} and ${b.number}, ${a.projectName} · Evenlay`;
  }, [a, b]);
}

interface BothProps {
  readonly a: VersionDetail;
  readonly b: VersionDetail;
  readonly several: boolean;
  readonly view: CompareView;
  readonly onView: (view: CompareView) => void;
  readonly role: Role;
}

function Both({ a, b, several, view, onView, role }: BothProps) {
  const { display } = b.document;
  const laid = useMemo(() => {
    const [layingA, layingB] = [floorOf(a.document).laying, floorOf(b.document).laying];
    if (!layingA || !layingB) return null;
    return {
      a: layingA,
      b: layingB,
      comparison: floorComparison(layingA, layingB, [a.figures, b.figures]),
    };
  }, [a, b]);
  const named = (version: VersionDetail) =>
    several && a.layoutId !== b.layoutId
      ? `version ${version.number} of ${version.layoutName}`
      : `version ${version.number}`;
  const mayAnswer = role === 'client' && b.state === 'shared';

  if (!laid)
    return (
      <p className="text-brick">One of these versions can no longer be laid out to compare.</p>
    );
  const { comparison } = laid;
  return (
    <>
      <header className="flex flex-wrap items-start justify-between gap-x-8 gap-y-3">
        <div className="max-w-4xl">
          <h1>{differenceHeading(a.document, b.document, comparison)}</h1>
          <p className="mt-1 text-lg text-slate" data-testid="difference">
            {differenceSentence(
              { name: named(a), document: a.document },
              { name: named(b), document: b.document },
              comparison.figures,
              comparison,
              display,
            )}
          </p>
        </div>
        <div className="flex flex-wrap items-center gap-2">
          <CopyLink a={a.id} b={b.id} view={view} />
          {mayAnswer && (
            <>
              <a className="button" href={`/versions/${b.id}#ask`}>
                Ask for a change
              </a>
              <a className="button button-primary" href={`/versions/${b.id}#accept`}>
                Accept version {b.number}
              </a>
            </>
          )}
        </div>
      </header>
      <div className="grid gap-x-10 gap-y-7 lg:grid-cols-[minmax(0,1fr)_22rem]">
        <div className="min-w-0">
          <Floors a={a} b={b} laid={laid} view={view} onView={onView} />
        </div>
        <div>
          <CompareTable
            rows={figureRows(a.document, b.document, comparison.figures, display)}
            a={
              several && a.layoutId !== b.layoutId ? `${a.layoutName}, ${a.number}` : `${a.number}`
            }
            b={
              several && a.layoutId !== b.layoutId ? `${b.layoutName}, ${b.number}` : `${b.number}`
            }
          />
          <CompareCosts a={a.id} b={b.id} names={[`Version ${a.number}`, `Version ${b.number}`]} />
        </div>
      </div>
    </>
  );
}

interface Laid {
  readonly a: Laying;
  readonly b: Laying;
  readonly comparison: FloorComparison;
}

interface FloorsProps {
  readonly a: VersionDetail;
  readonly b: VersionDetail;
  readonly laid: Laid;
  readonly view: CompareView;
  readonly onView: (view: CompareView) => void;
}

/** Both floors, under one camera. */
function Floors({ a, b, laid, view, onView }: FloorsProps) {
  const [look, setLook] = useState<Camera | null>(null);
  const [share, setShare] = useState(0.5);
  const [marks, setMarks] = useState(false);
  const box = useMemo(() => groundBox([a.document, b.document]), [a, b]);
  const zoom = (factor: number) =>
    setLook((from) => {
      const frame = document.querySelector('[data-floor-window]')!.getBoundingClientRect();
      const start = from ?? cameraFitted(box, frame, 22);
      return { ...start, scale: start.scale * factor };
    });
  return (
    <>
      <div className="mb-3 flex flex-wrap items-end justify-between gap-3">
        <div className="w-64">
          <Segmented
            label="Look at them"
            hideLabel
            value={view}
            onChange={onView}
            options={[
              ['side', 'Side by side'],
              ['over', 'Overlaid'],
            ]}
          />
        </div>
        {view === 'side' && (
          <label className="flex min-h-9 items-center gap-2">
            <input
              type="checkbox"
              className="size-5 accent-line"
              checked={marks}
              onChange={(event) => setMarks(event.target.checked)}
            />
            Mark what differs
          </label>
        )}
        <ZoomButtons onZoom={zoom} onFit={() => setLook(null)} />
      </div>
      {view === 'side' ? (
        <SideBySide {...{ a, b, laid, box, look, marks }} onLook={setLook} />
      ) : (
        <Overlaid {...{ a, b, laid, box, look, share }} onLook={setLook} onShare={setShare} />
      )}
      {(view === 'over' || marks) && (
        <div className="mt-3">
          <FateKey units={laid.comparison} from={sideName(a, b, a)} to={sideName(a, b, b)} />
        </div>
      )}
    </>
  );
}

const sideName = (a: VersionDetail, b: VersionDetail, one: VersionDetail) =>
  a.layoutId === b.layoutId ? `version ${one.number}` : `${one.layoutName}, version ${one.number}`;

interface PaneProps {
  readonly a: VersionDetail;
  readonly b: VersionDetail;
  readonly laid: Laid;
  readonly box: ReturnType<typeof groundBox>;
  readonly look: Camera | null;
  readonly onLook: (look: Camera | null) => void;
}

function SideBySide({ a, b, laid, box, look, onLook, marks }: PaneProps & { marks: boolean }) {
  const [pointed, setPointed] = useState<Point | null>(null);
  const { comparison } = laid;
  const sides = [
    { version: a, laying: laid.a, fates: comparison.fateOfA, alone: 'gone' },
    { version: b, laying: laid.b, fates: comparison.fateOfB, alone: 'new' },
  ] as const;
  return (
    <div className="grid gap-5 sm:grid-cols-2">
      {sides.map((side, n) => (
        <OneSide
          key={n}
          {...side}
          title={sideName(a, b, side.version)}
          marks={marks}
          box={box}
          look={look}
          onLook={onLook}
          pointed={pointed}
          onPoint={setPointed}
        />
      ))}
    </div>
  );
}

/** The ground's own, with some room round it, and never a strip. */
const windowAspect = ({ minX, maxX, minY, maxY }: PaneProps['box']): number =>
  Math.min(2, Math.max(0.8, (maxX - minX) / Math.max(1, maxY - minY)));

function OneSide({
  version,
  laying,
  fates,
  alone,
  title,
  marks,
  box,
  look,
  onLook,
  pointed,
  onPoint,
}: {
  version: VersionDetail;
  laying: Laying;
  fates: Uint8Array;
  alone: 'gone' | 'new';
  title: string;
  marks: boolean;
  box: PaneProps['box'];
  look: Camera | null;
  onLook: (look: Camera | null) => void;
  pointed: Point | null;
  onPoint: (at: Point | null) => void;
}) {
  const over = useCallback(
    (picture: Picture) => {
      if (marks) paintSideMarks(picture, laying, fates, alone);
    },
    [marks, laying, fates, alone],
  );
  const paint = useFloorPainter(version.document, over);
  const threads = useThreads(version.id);
  return (
    <section aria-label={title}>
      <div className="flex items-baseline justify-between gap-3 border-b border-graphite pb-1.5">
        <h2 className="text-[1.1rem]">
          <a className="hover:text-line" href={`/versions/${version.id}`}>
            {title.charAt(0).toUpperCase() + title.slice(1)}
          </a>
        </h2>
        <span className="truncate text-slate">
          {version.label}
          <span className="sr-only">, {STATE_WORDS[version.state]}</span>
        </span>
      </div>
      <div
        className="max-h-[max(18rem,calc(100dvh-27rem))] min-h-56"
        style={{ aspectRatio: windowAspect(box) }}
        data-floor-window
      >
        <FloorWindow
          box={box}
          look={look}
          onLook={onLook}
          paint={paint}
          onPoint={onPoint}
          testId={`side-${alone}`}
          label={`${title}: ${version.figures.wholeUnits} whole units.`}
          over={(place) => (
            <>
              <PinMarks
                threads={threads.data ?? []}
                place={place}
                href={(id) => `/versions/${version.id}?thread=${id}`}
              />
              <PointedAt at={pointed && place(pointed)} />
            </>
          )}
        />
      </div>
    </section>
  );
}

function Overlaid({
  a,
  b,
  laid,
  box,
  look,
  onLook,
  share,
  onShare,
}: PaneProps & { share: number; onShare: (share: number) => void }) {
  const paint = useCallback<Painter>(
    (picture) => paintOverlaid(picture, laid.a, laid.b, laid.comparison, share),
    [laid, share],
  );
  const { kept, moved, gone, added } = laid.comparison;
  return (
    <div>
      <div
        className="h-[min(80vw,26rem)] border-y border-stone-300 sm:h-[clamp(20rem,calc(100dvh-28rem),48rem)]"
        data-floor-window
      >
        <FloorWindow
          box={box}
          look={look}
          onLook={onLook}
          paint={paint}
          testId="overlaid"
          label={`${sideName(a, b, b)} laid over ${sideName(a, b, a)}: ${kept} units kept, ${moved} moved, ${gone} gone, ${added} new.`}
        />
      </div>
      <div className="mt-2 grid grid-cols-[auto_1fr_auto] items-center gap-3">
        <button type="button" className="button button-quiet" onClick={() => onShare(0)}>
          {sideName(a, b, a)}
        </button>
        <input
          type="range"
          min="0"
          max="1"
          step="0.01"
          value={share}
          onChange={(event) => onShare(Number(event.target.value))}
          aria-label={`From ${sideName(a, b, a)} to ${sideName(a, b, b)}`}
          aria-valuetext={`${Math.round(share * 100)} per cent of the way`}
          className="h-11 w-full min-w-0 accent-line"
        />
        <button type="button" className="button button-quiet" onClick={() => onShare(1)}>
          {sideName(a, b, b)}
        </button>
      </div>
    </div>
  );
}

function CopyLink({ a, b, view }: { a: string; b: string; view: CompareView }) {
  const [said, setSaid] = useState('');
  const link = () => new URL(compareLink(a, b, view), window.location.href).href;
  const copy = async () => {
    try {
      await navigator.clipboard.writeText(link());
      setSaid('Link copied. Whoever may see both versions can open it.');
    } catch {
      setSaid(`Copy this link: ${link()}`);
    }
  };
  return (
    <>
      <span role="status" className="max-w-72 text-sm break-words text-slate empty:hidden">
        {said}
      </span>
      <button type="button" className="button" onClick={() => void copy()}>
        Copy the link
      </button>
    </>
  );
}

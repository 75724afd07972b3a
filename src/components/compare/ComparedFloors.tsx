import { useCallback, useMemo, useState } from 'react';
import type { VersionDetail } from '@/api-types/versions';
import type { Point } from '@/geometry/point';
import type { FloorComparison } from '@/paving/comparison';
import type { Laying } from '@/paving/laying';
import { PinMarks } from '../comments/PinMarks';
import { useThreads } from '../comments/threads';
import { cameraFitted, type Camera } from '../drafting/camera';
import { useFloorPainter } from '../floor-window/floor-painter';
import { FloorWindow, ZoomButtons, type Painter, type Picture } from '../floor-window/FloorWindow';
import { groundBox } from '../floor-window/ground-box';
import { PointedAt } from '../floor-window/PointedAt';
import { Segmented } from '../ui/Segmented';
import { STATE_WORDS } from '../ui/version-words';
import type { CompareView } from './compare-link';
import { paintOverlaid, paintSideMarks } from './comparison-picture';
import { FateKey } from './FateKey';

/** Two versions laid, and what became of each unit. */
export interface LaidVersions {
  readonly a: Laying;
  readonly b: Laying;
  readonly comparison: FloorComparison;
}

interface FloorsProps {
  readonly a: VersionDetail;
  readonly b: VersionDetail;
  readonly laid: LaidVersions;
  readonly view: CompareView;
  readonly onView: (view: CompareView) => void;
}

/** Both floors, under one camera. */
export function ComparedFloors({ a, b, laid, view, onView }: FloorsProps) {
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
  readonly laid: LaidVersions;
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

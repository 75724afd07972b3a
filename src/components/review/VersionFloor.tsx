import { useState } from 'react';
import type { Thread } from '@/api-types/comments';
import type { VersionDetail } from '@/api-types/versions';
import type { Point } from '@/geometry/point';
import { cameraFitted, type Camera } from '../drafting/camera';
import { PinMarks } from '../comments/PinMarks';
import { useFloorPainter } from '../floor-window/floor-painter';
import { FloorWindow, ZoomButtons } from '../floor-window/FloorWindow';
import { groundBox } from '../floor-window/ground-box';
import { Segmented } from '../ui/Segmented';
import FloorView from '../version/FloorView';

interface Props {
  readonly version: VersionDetail;
  /** Begin with the figured drawing. */
  readonly figured: boolean;
  readonly threads: readonly Thread[];
  readonly drafts: readonly Point[];
  readonly picked: string | null;
  readonly onPick: (thread: string) => void;
  /** A spot is being picked. */
  readonly onSpot: ((at: Point) => void) | null;
  readonly onLeaveSpot: () => void;
}

/** Room for the buttons below the floor, px. */
const FOOT_PX = 48;

/** A version's floor, as it will look or with its figures, and the pins on it. */
export function VersionFloor(props: Props) {
  const { version, threads, drafts, picked, onPick, onSpot, onLeaveSpot } = props;
  const [figured, setFigured] = useState(props.figured);
  const [look, setLook] = useState<Camera | null>(null);
  const paint = useFloorPainter(version.document);
  const box = groundBox([version.document]);
  // Spots are picked on the floor itself; the figures would be in the way.
  const drawn = figured && !onSpot && drafts.length === 0 && !picked;
  const zoom = (factor: number) =>
    setLook((from) => {
      const frame = document.querySelector('[data-version-floor]')!.getBoundingClientRect();
      const start = from ?? cameraFitted(box, frame, 22, FOOT_PX);
      return { ...start, scale: start.scale * factor };
    });
  return (
    <div className="relative h-full w-full" data-version-floor>
      {drawn ? (
        <FloorView version={version} />
      ) : (
        <FloorWindow
          box={box}
          look={look}
          onLook={setLook}
          paint={paint}
          foot={FOOT_PX}
          onSpot={onSpot}
          testId="version-floor"
          label={`Version ${version.number}, ${version.label}: ${version.report.wholeUnits} whole units on the ground.`}
          over={(place) => (
            <PinMarks
              threads={threads}
              place={place}
              picked={picked}
              onPick={onPick}
              drafts={drafts}
            />
          )}
        />
      )}
      {onSpot && (
        <div
          role="status"
          className="absolute inset-x-0 top-0 flex items-center justify-between gap-3 border-b border-line bg-stone-50 px-4 py-2"
        >
          <span className="font-semibold text-line">Press the spot that you mean.</span>
          <button type="button" className="button button-quiet" onClick={onLeaveSpot}>
            Leave it
          </button>
        </div>
      )}
      <div className="absolute bottom-2 left-2 w-44 bg-stone-50 text-sm">
        <Segmented
          label="Show"
          hideLabel
          value={drawn ? 'figures' : 'floor'}
          onChange={(value) => {
            setFigured(value === 'figures');
            if (value === 'figures' && picked) onPick(picked);
          }}
          options={[
            ['floor', 'Floor'],
            ['figures', 'Measures'],
          ]}
        />
      </div>
      {!drawn && (
        <div className="absolute right-2 bottom-2">
          <ZoomButtons onZoom={zoom} onFit={() => setLook(null)} />
        </div>
      )}
    </div>
  );
}

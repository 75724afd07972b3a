import type { Point } from '@/geometry/point';
import { MM_PER_INCH } from '@/paving/length';
import { groundMiddle, placementSlid, placementTurned } from '@/paving/placement-edits';
import { cameraZoomed } from './camera';
import { zoomToFit } from './FloorStage';
import {
  cornerAdded,
  cornerRemoved,
  drawGround,
  drawingLeft,
  drawKeepOut,
  pickNudged,
  pickStepped,
} from './ground-actions';
import { placingLeft, spotNudged, spotPlacedInView, spotStepped, spotTaken } from './level-actions';
import { nudge } from './nudge';
import { datumsStarted, pointStepped, datumsLeft } from './set-out/set-out-actions';
import { STEPS, type Step, type TableStore } from './table-store';
import { chosenUnitToggled, unitChosen } from './tools/lift-unit';
import { cornerPlaced, cornerTakenBack, ringClosed, typedCorner } from './tools/draw-ring';

/** What the list of keys shows; `table-keys.ts` is where each is acted on. */
export const KEY_LIST: readonly (readonly [
  group: string,
  keys: readonly (readonly [string, string])[],
])[] = [
  [
    'Anywhere',
    [
      ['1 – 5', 'Go to a step'],
      ['Ctrl Z', 'Undo'],
      ['Ctrl Shift Z', 'Redo'],
      ['Ctrl S', 'Save a version'],
      ['+  −', 'Zoom in, zoom out'],
      ['F', 'Zoom to fit'],
      ['M', 'Metric or imperial'],
      ['Esc', 'Leave the tool'],
      ['?', 'This list'],
    ],
  ],
  [
    'Ground',
    [
      ['D', 'Draw the ground anew'],
      ['K', 'Draw a keep-out'],
      [',  .', 'Pick the corner or edge before, after'],
      ['Arrows', 'Move what is picked 1 mm (1/16″); with Shift 10 mm (1/2″)'],
      ['I', 'Put a corner into the picked edge'],
      ['Delete', 'Take the picked corner away'],
      ['S', 'Snapping on or off; hold Alt to suspend it'],
    ],
  ],
  [
    'While drawing',
    [
      ['0 – 9', 'Type the length'],
      ['Arrows', 'Draw right, up, left or down'],
      ['Enter', 'Put the corner down'],
      ['Backspace', 'Take the last corner back'],
      ['C', 'Close the ring'],
    ],
  ],
  [
    'Unit, bond and fit',
    [
      ['Arrows', 'Slide the pattern 1 mm (1/16″); with Shift 10 mm (1/2″)'],
      ['[  ]', 'Turn 1°; with Shift 15°'],
      ['L', 'Lift units, or slide the pattern; arrows choose one, Enter lifts it'],
      ['A', 'Start a row along an edge'],
    ],
  ],
  [
    'Levels',
    [
      ['N', 'Put a spot in the middle of the view'],
      [',  .', 'Pick the spot before, after'],
      ['Arrows', 'Move the picked spot 1 mm (1/16″); with Shift 10 mm (1/2″)'],
      ['Delete', 'Take the picked spot away'],
    ],
  ],
  [
    'Set-out',
    [
      ['Arrows or ,  .', 'Show how the point before, after is taped'],
      ['C', 'Choose the two corners to tape from'],
      ['Esc', 'Leave choosing, or show no point'],
    ],
  ],
];

const ARROWS: Record<string, Point> = {
  ArrowRight: [1, 0],
  ArrowUp: [0, 1],
  ArrowLeft: [-1, 0],
  ArrowDown: [0, -1],
};
const ARROW_DIRECTION: Record<string, number> = {
  ArrowRight: 0,
  ArrowUp: 90,
  ArrowLeft: 180,
  ArrowDown: 270,
};

export interface KeyActions {
  readonly showKeys: () => void;
  readonly saveVersion: () => void;
  /** Puts the cursor into the length field while drawing, with what was typed. */
  readonly typeLength: (text: string) => void;
}

export function undo(table: TableStore): void {
  table.getState().settleShown();
  table.temporal.getState().undo();
  table.getState().set({ said: 'Undone.' });
}

export function redo(table: TableStore): void {
  table.getState().settleShown();
  table.temporal.getState().redo();
  table.getState().set({ said: 'Done again.' });
}

export function zoomBy(table: TableStore, factor: number): void {
  const { camera, size, set } = table.getState();
  if (camera)
    set({ camera: cameraZoomed(camera, size, [size.width / 2, size.height / 2], factor) });
}

export function displaySwitched(table: TableStore): void {
  table.getState().edit((document) => ({
    ...document,
    display: document.display === 'metric' ? 'imperial' : 'metric',
  }));
}

/** Turns the pattern about the middle of the ground, a run of key presses being one undo step. */
export function turnNudged(table: TableStore, byDeg: number): void {
  nudge(table, (document) => ({
    ...document,
    placement: placementTurned(
      document.placement,
      document.placement.turn + byDeg,
      groundMiddle(document),
    ),
  }));
}

function escaped(table: TableStore): void {
  const { drawing, tool, preview, show, set, step } = table.getState();
  if (preview) show(null);
  else if (drawing) drawingLeft(table);
  else if (step === 'levels') {
    if (tool === 'place') placingLeft(table);
    else set({ spot: null });
  } else if (step === 'setOut') {
    if (tool === 'datum') datumsLeft(table);
    else set({ point: null, pointed: null });
  } else if (step !== 'ground' && tool !== 'slide')
    set({ tool: 'slide', holding: null, hover: null });
  else set({ pick: null, hover: null });
}

/** Acts on a key; true when it was the table's. Keys typed into fields are not passed in. */
export function keyActed(table: TableStore, event: KeyboardEvent, actions: KeyActions): boolean {
  const state = table.getState();
  const command = event.ctrlKey || event.metaKey;
  const key = event.key;

  if (command) {
    if (key.toLowerCase() === 'z') (event.shiftKey ? redo : undo)(table);
    else if (key.toLowerCase() === 'y') redo(table);
    else if (key.toLowerCase() === 's') actions.saveVersion();
    else return false;
    return true;
  }
  if (event.altKey) return false;

  if (state.drawing) {
    if (key in ARROW_DIRECTION) {
      const drawing = { ...state.drawing, directionDeg: ARROW_DIRECTION[key] };
      state.set({
        drawing: { ...drawing, next: typedCorner(drawing, drawing.next) ?? drawing.next },
      });
    } else if (key === 'Enter') {
      const { drawing } = state;
      const next =
        typedCorner(drawing, drawing.next) ??
        drawing.next ??
        (drawing.corners.length === 0 ? ([0, 0] as const) : null);
      if (next) cornerPlaced(table, next);
    } else if (key === 'Backspace') cornerTakenBack(table);
    else if (key.toLowerCase() === 'c') ringClosed(table);
    else if (/^[0-9.]$/.test(key) && state.drawing.corners.length > 0) actions.typeLength(key);
    else if (key === 'Escape') escaped(table);
    else if (key === '?') actions.showKeys();
    else if (key.toLowerCase() === 's') state.set({ snap: !state.snap });
    else return false;
    return true;
  }

  if (state.tool === 'lift' && (key in ARROWS || key === 'Enter' || key === ' ')) {
    if (key in ARROWS) unitChosen(table, ARROWS[key]);
    else chosenUnitToggled(table);
    return true;
  }

  if (state.step === 'setOut' && key in ARROWS) {
    pointStepped(table, key === 'ArrowRight' || key === 'ArrowDown' ? 1 : -1);
    return true;
  }

  if (key in ARROWS) {
    const imperial = state.document.display === 'imperial';
    const step = imperial
      ? event.shiftKey
        ? MM_PER_INCH / 2
        : MM_PER_INCH / 16
      : event.shiftKey
        ? 10
        : 1;
    const by: Point = [ARROWS[key][0] * step, ARROWS[key][1] * step];
    if (state.step === 'ground') pickNudged(table, by);
    else if (state.step === 'levels') spotNudged(table, by);
    else
      nudge(table, (document) => ({
        ...document,
        placement: placementSlid(document.placement, by),
      }));
    return true;
  }

  const acts: Record<string, () => void> = {
    '?': actions.showKeys,
    Escape: () => escaped(table),
    '+': () => zoomBy(table, 1.25),
    '=': () => zoomBy(table, 1.25),
    '-': () => zoomBy(table, 0.8),
    f: () => zoomToFit(table),
    m: () => displaySwitched(table),
  };
  STEPS.forEach((step, n) => (acts[String(n + 1)] = () => state.goTo(step)));
  const ground: Record<string, () => void> = {
    d: () => drawGround(table),
    k: () => drawKeepOut(table),
    ',': () => pickStepped(table, -1),
    '.': () => pickStepped(table, 1),
    i: () => cornerAdded(table),
    Delete: () => cornerRemoved(table),
    Backspace: () => cornerRemoved(table),
    s: () => state.set({ snap: !state.snap }),
  };
  const pattern: Record<string, () => void> = {
    '[': () => turnNudged(table, 1),
    ']': () => turnNudged(table, -1),
    '{': () => turnNudged(table, 15),
    '}': () => turnNudged(table, -15),
    l: () => state.set({ tool: state.tool === 'lift' ? 'slide' : 'lift', hover: null }),
    a: () => state.set({ tool: state.tool === 'align' ? 'slide' : 'align', hover: null }),
  };
  const take = () => state.spot !== null && spotTaken(table, state.spot);
  const levels: Record<string, () => void> = {
    n: () => spotPlacedInView(table),
    ',': () => spotStepped(table, -1),
    '.': () => spotStepped(table, 1),
    Delete: take,
    Backspace: take,
    s: () => state.set({ snap: !state.snap }),
  };
  const setOut: Record<string, () => void> = {
    ',': () => pointStepped(table, -1),
    '.': () => pointStepped(table, 1),
    c: () => datumsStarted(table),
  };
  const byStep: Partial<Record<Step, Record<string, () => void>>> = { ground, levels, setOut };
  const own = byStep[state.step] ?? pattern;
  const name = key.length === 1 ? key.toLowerCase() : key;
  const act = acts[name] ?? own[name];
  act?.();
  return act !== undefined;
}

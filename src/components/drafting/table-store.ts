import { temporal } from 'zundo';
import { createStore } from 'zustand/vanilla';
import type { Point } from '@/geometry/point';
import type { FitHold } from '@/paving/fit/fit';
import type { Address, LayoutDocument } from '@/paving/layout-document';
import { choiceKept } from '@/paving/set-out/datum-choice';
import type { CornerAddress } from '@/paving/set-out/set-out-types';
import type { Camera, ScreenSize } from './camera';
import { holdsKept } from './holds-kept';

export const STEPS = [
  'ground',
  'unit',
  'bond',
  'fit',
  'levels',
  'takeOff',
  'setOut',
  'versions',
] as const;
export type Step = (typeof STEPS)[number];

export type ToolName =
  'edit' | 'draw' | 'slide' | 'lift' | 'align' | 'hold' | 'spot' | 'place' | 'points' | 'datum';

/** What of the ground is picked: a vertex or an edge of a ring. */
export type Pick =
  | { readonly kind: 'vertex'; readonly ring: number; readonly vertex: number }
  | { readonly kind: 'edge'; readonly ring: number; readonly edge: number };

/** A ring being drawn: its corners so far, and where the next would go. */
export interface Drawing {
  readonly target: 'perimeter' | 'keepOut';
  readonly corners: readonly Point[];
  readonly next: Point | null;
  /** Typed while drawing; empty means: follow the pointer. */
  readonly lengthMm: number | null;
  readonly directionDeg: number | null;
}

/** A thin line that shows what the pointer has snapped to. */
export interface Guide {
  readonly from: Point;
  readonly to: Point;
}

/** A spot of the edge lit on the floor and on the gap ribbon alike: `s` mm along edge `edge` of ring `ring`. */
export interface Lit {
  readonly ring: number;
  readonly edge: number;
  readonly s: number;
  readonly from: 'floor' | 'ribbon';
}

/** Places being pointed at for the levels: spots one after another, where a fall leads, or which way. */
export interface Placing {
  readonly what: 'spots' | 'fallPoint' | 'fallLine' | 'fallDirection';
  /** The first of two places. */
  readonly first: Point | null;
  /** Where the pointer is. */
  readonly at: Point | null;
}

export interface TableState {
  /** The document as last settled: what undo steps through, what is saved. */
  readonly document: LayoutDocument;
  /** The document with the gesture in hand applied; settling it is one undo step. */
  readonly preview: LayoutDocument | null;
  readonly step: Step;
  readonly tool: ToolName;
  readonly pick: Pick | null;
  readonly hover: Pick | null;
  readonly drawing: Drawing | null;
  readonly guides: readonly Guide[];
  readonly lit: Lit | null;
  /** The unit chosen with the keys while lifting. */
  readonly unit: Address | null;
  readonly snap: boolean;
  /** What the fit holds the pattern to: asked of it, not part of the document. */
  readonly hold: readonly FitHold[];
  /** The hold being pointed at: a row along one edge, or the middle between two. */
  readonly holding: {
    readonly kind: 'edge' | 'between';
    readonly first: readonly [number, number] | null;
    /** Why the edge that was pointed at last will not do. */
    readonly refused?: string;
  } | null;
  /** The spot level that is picked, by its place in the list. */
  readonly spot: number | null;
  readonly placing: Placing | null;
  /** Control points of the set-out, by name: the one picked, and the one pointed at. */
  readonly point: string | null;
  readonly pointed: string | null;
  /** The first of two corners to tape from, while they are chosen. */
  readonly datumFirst: CornerAddress | null;
  readonly camera: Camera | null;
  readonly size: ScreenSize;
  /** Said to the person, and read aloud by a screen reader. */
  readonly said: string;

  /** Settles `document` as one undo step. */
  settle: (document: LayoutDocument) => void;
  /** Settles what is shown, then a change of it, each an undo step of its own. */
  edit: (change: (document: LayoutDocument) => LayoutDocument) => void;
  /** Shows `document` as the gesture in hand; null abandons it. */
  show: (document: LayoutDocument | null) => void;
  /** Settles what is shown. */
  settleShown: () => void;
  set: (change: Partial<Omit<TableState, 'document' | 'preview'>>) => void;
  goTo: (step: Step) => void;
}

/** How many steps can be undone. */
const UNDO_LIMIT = 1000;

const FIRST_TOOL: Record<Step, ToolName> = {
  ground: 'edit',
  unit: 'slide',
  bond: 'slide',
  fit: 'slide',
  levels: 'spot',
  takeOff: 'slide',
  setOut: 'points',
  versions: 'slide',
};

export function createTableStore(document: LayoutDocument) {
  const store = createStore<TableState>()(
    temporal(
      (set, get) => ({
        document,
        preview: null,
        step: 'ground',
        tool: 'edit',
        pick: null,
        hover: null,
        drawing: null,
        guides: [],
        lit: null,
        unit: null,
        snap: true,
        hold: [],
        holding: null,
        spot: null,
        placing: null,
        point: null,
        pointed: null,
        datumFirst: null,
        camera: null,
        size: { width: 0, height: 0 },
        said: '',
        settle: (next) =>
          set({ document: choiceKept(get().document, next), preview: null, guides: [] }),
        edit: (change) => {
          get().settleShown();
          const { document } = get();
          const next = choiceKept(document, change(document));
          if (next !== document) set({ document: next, guides: [] });
        },
        show: (preview) => set({ preview: preview && choiceKept(get().document, preview) }),
        settleShown: () => {
          const { preview } = get();
          if (preview) set({ document: preview, preview: null, guides: [] });
        },
        set: (change) => set(change),
        goTo: (step) => {
          get().settleShown();
          set({
            step,
            tool: FIRST_TOOL[step],
            pick: null,
            hover: null,
            drawing: null,
            holding: null,
            spot: null,
            placing: null,
            pointed: null,
            datumFirst: null,
            guides: [],
            lit: null,
          });
        },
      }),
      {
        limit: UNDO_LIMIT,
        partialize: (state) => ({ document: state.document }),
        equality: (past, now) => past.document === now.document,
      },
    ),
  );
  // Holds are not of the document, and go with its edges all the same: also when a change is undone.
  store.subscribe((now, before) => {
    const hold = holdsKept(before.document.ground, now.document.ground, now.hold);
    if (hold !== now.hold) now.set({ hold });
    // What is half pointed at begins again: its first edge may be gone.
    if (now.holding?.first && before.document.ground !== now.document.ground)
      now.set({ holding: { kind: now.holding.kind, first: null } });
  });
  return store;
}

export type TableStore = ReturnType<typeof createTableStore>;

export const shownDocument = (state: TableState): LayoutDocument => state.preview ?? state.document;

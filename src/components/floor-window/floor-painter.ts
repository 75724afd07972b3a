import { useEffect, useMemo, useRef } from 'react';
import type { Laying, UnitSet } from '@/paving/laying';
import type { LayoutDocument } from '@/paving/layout-document';
import { piecesOf } from '../drafting/cutting/shown-pieces';
import { createFloorCache, type FloorCache } from '../drafting/floor-cache';
import { floorOf } from '../drafting/floor';
import type { Painter, Picture } from './FloorWindow';
import { paintGroundLines } from './ground-lines';

const NONE: UnitSet = {
  count: 0,
  i: new Int32Array(0),
  j: new Int32Array(0),
  k: new Uint8Array(0),
  x: new Float64Array(0),
  y: new Float64Array(0),
};
const bare = new WeakMap<Laying, Laying>();

/** The laying without what is not there: units left out at the edge or lifted are of use to the draughtsman only. */
function asBuilt(laying: Laying | null): Laying | null {
  if (!laying) return null;
  let built = bare.get(laying);
  if (!built) {
    built = { ...laying, leftOut: NONE, lifted: NONE };
    bare.set(laying, built);
  }
  return built;
}

/** Paints a document's floor from a kept picture, its ground's lines, and then `over`. */
export function useFloorPainter(
  document: LayoutDocument,
  over?: (picture: Picture) => void,
): Painter {
  const cache = useRef<FloorCache | null>(null);
  const again = useRef(() => {});
  useEffect(
    () => () => {
      cache.current?.dispose();
      cache.current = null;
    },
    [],
  );
  return useMemo(
    () => (picture, askAgain) => {
      again.current = askAgain;
      cache.current ??= createFloorCache(() => again.current());
      const { ctx, camera, size, colours, pixelRatio } = picture;
      const { laying } = floorOf(document);
      const cut = piecesOf(laying);
      cache.current.paint(ctx, document, asBuilt(laying), camera, size, colours, pixelRatio, cut);
      paintGroundLines(picture, document);
      over?.(picture);
    },
    [document, over],
  );
}

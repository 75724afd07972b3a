import { X } from 'lucide-react';
import { documentEdgeName } from '@/paving/edge-names';
import { vertexBulge, documentRing, documentRingCount } from '@/paving/ground-edits';
import { useShownFloor, useTable, useTableStore } from '../table-context';
import { holdLeft, holdPointed, holdStarted, holdWords } from '../tools/hold-edge';
import type { FitService } from './fit-service';

/** Holds the start to an edge, or centres it between two, by pointing at the edges or by their names. */
export function HoldFields({ fit: _fit }: { fit: FitService }) {
  const table = useTableStore();
  const { document } = useShownFloor();
  const hold = useTable((state) => state.hold);
  const holding = useTable((state) => state.holding);
  const name = (ring: number, edge: number) => documentEdgeName(document, ring, edge);
  const lit = (ring: number, edge: number) =>
    table.getState().set({ hover: { kind: 'edge', ring, edge } });
  const edges = Array.from({ length: documentRingCount(document) }, (_, ring) =>
    documentRing(document, ring).flatMap((vertex, edge) =>
      vertexBulge(vertex) === 0 ? [[ring, edge] as const] : [],
    ),
  ).flat();
  return (
    <section aria-label="Hold">
      <h3 className="mb-2 border-b border-graphite pb-1">Hold the start</h3>
      {hold.length > 0 && (
        <ul className="mb-2 hairlines">
          {hold.map((h, n) => (
            <li key={n} className="flex items-center justify-between gap-2 text-vial-ink">
              <span className="first-letter:uppercase">{holdWords(h, name)}</span>
              <button
                type="button"
                className="button button-quiet min-w-11"
                aria-label={`Let go: ${holdWords(h, name)}`}
                onClick={() => table.getState().set({ hold: hold.filter((_, m) => m !== n) })}
              >
                <X size={16} aria-hidden />
              </button>
            </li>
          ))}
        </ul>
      )}
      {edges.length === 0 ? (
        <p className="text-sm text-slate">
          The start is held to straight edges, and this ground has none.
        </p>
      ) : holding ? (
        <div className="border-l-2 border-line pl-3">
          {holding.refused && (
            <p role="alert" className="mb-2 text-brick first-letter:uppercase">
              {holding.refused}
            </p>
          )}
          <p>
            {holding.kind === 'edge'
              ? 'Point at the edge along which a row starts.'
              : holding.first
                ? `From ${name(...holding.first)}: point at the other edge.`
                : 'Point at the first of the two edges.'}
          </p>
          <ul className="mt-2 flex flex-wrap gap-2">
            {edges.map(([ring, edge]) => (
              <li key={`${ring}.${edge}`}>
                <button
                  type="button"
                  className="button px-2"
                  disabled={holding.first?.[0] === ring && holding.first[1] === edge}
                  onClick={() => holdPointed(table, ring, edge)}
                  onPointerEnter={() => lit(ring, edge)}
                  onPointerLeave={() => table.getState().set({ hover: null })}
                  onFocus={() => lit(ring, edge)}
                  onBlur={() => table.getState().set({ hover: null })}
                >
                  {name(ring, edge)}
                </button>
              </li>
            ))}
          </ul>
          <button
            type="button"
            className="button button-quiet mt-1"
            onClick={() => holdLeft(table)}
          >
            Leave it free
          </button>
        </div>
      ) : (
        <div className="grid grid-cols-2 gap-2">
          <button
            type="button"
            className="button px-2 text-sm"
            onClick={() => holdStarted(table, 'edge')}
          >
            Row along an edge
          </button>
          <button
            type="button"
            className="button px-2 text-sm"
            onClick={() => holdStarted(table, 'between')}
          >
            Centred between two
          </button>
        </div>
      )}
    </section>
  );
}

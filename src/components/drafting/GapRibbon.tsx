import { useMemo, useRef, useState, type PointerEvent } from 'react';
import { documentRing, documentRingCount, edgeLength } from '@/paving/ground-edits';
import { documentEdgeName } from '@/paving/edge-names';
import type { LayoutDocument } from '@/paving/layout-document';
import { formatLength } from '@/paving/length';
import { PLAIN_AGGREGATE } from '../ui/drawing-colours';
import type { Floor } from './floor';
import { gapAt } from './overlay-picture';
import { useShownFloor, useTable, useTableStore } from './table-context';

/** An edge's place on the ribbon, in thousandths of its width. */
interface Span {
  readonly ring: number;
  readonly edge: number;
  readonly length: number;
  readonly from: number;
  readonly to: number;
}

const WIDTH = 1000;
const DEPTH = 60;
/** Room between one ring and the next. */
const RING_GAP = 12;
/** About the width of a character of a label, px: labels that have no room are left away. */
const CHARACTER_PX = 7;

function ribbonSpans(document: LayoutDocument): Span[] {
  const rings = Array.from({ length: documentRingCount(document) }, (_, ring) =>
    documentRing(document, ring),
  );
  const total = rings.reduce(
    (sum, ring) => sum + ring.reduce((s, _, edge) => s + edgeLength(ring, edge), 0),
    0,
  );
  const scale = (WIDTH - RING_GAP * (rings.length - 1)) / (total || 1);
  const spans: Span[] = [];
  let x = 0;
  rings.forEach((ring, index) => {
    ring.forEach((_, edge) => {
      const length = edgeLength(ring, edge);
      spans.push({ ring: index, edge, length, from: x, to: x + length * scale });
      x += length * scale;
    });
    x += RING_GAP;
  });
  return spans;
}

/** The gap along one edge as the outline of what aggregate fills, from the edge at the top downward. */
function ribbonPath(span: Span, floor: Floor, reach: number): string {
  const profile = floor.profile.find((p) => p.ring === span.ring && p.edge === span.edge);
  const x = (s: number) => span.from + (s / (span.length || 1)) * (span.to - span.from);
  const y = (gap: number) => Math.min(1, Math.max(0, gap / reach)) * DEPTH;
  const points = [`M${x(0)} 0`];
  let at = 0;
  for (const stretch of profile?.stretches ?? []) {
    if (stretch.from - at > 0.5) points.push(`L${x(at)} ${DEPTH} L${x(stretch.from)} ${DEPTH}`);
    for (const [s, gap] of stretch.line) points.push(`L${x(s)} ${y(gap)}`);
    at = stretch.to;
  }
  if (span.length - at > 0.5) points.push(`L${x(at)} ${DEPTH} L${x(span.length)} ${DEPTH}`);
  points.push(`L${x(span.length)} 0Z`);
  return points.join(' ');
}

/** The perimeter and the keep-outs unrolled, the gap drawn along them; pointing at a spot lights it on the floor. */
export function GapRibbon() {
  const table = useTableStore();
  const floor = useShownFloor();
  const lit = useTable((state) => state.lit);
  const frame = useRef<HTMLDivElement>(null);
  const [focused, setFocused] = useState(0);
  const widthPx = useTable((state) => state.size.width) - 32;
  const { document, laying } = floor;
  const { display } = document;
  const spans = useMemo(() => ribbonSpans(document), [document]);
  const reach = floor.profile[0]?.reach ?? 1;

  if (!laying)
    return (
      <div className="flex h-[5.1rem] items-center px-4 text-sm text-slate md:h-[6.6rem]">
        The gap ribbon is drawn once the floor can be laid.
      </div>
    );

  const light = (x: number) => {
    const span = spans.find((s) => x >= s.from && x <= s.to);
    if (!span) return table.getState().set({ lit: null });
    const s = ((x - span.from) / (span.to - span.from || 1)) * span.length;
    table.getState().set({ lit: { ring: span.ring, edge: span.edge, s, from: 'ribbon' } });
  };
  const point = (event: PointerEvent) => {
    const box = frame.current!.getBoundingClientRect();
    light(((event.clientX - box.left) / box.width) * WIDTH);
  };
  const litSpan = lit && spans.find((s) => s.ring === lit.ring && s.edge === lit.edge);
  const litX = litSpan
    ? litSpan.from + (lit.s / (litSpan.length || 1)) * (litSpan.to - litSpan.from)
    : null;
  const litGap = lit ? gapAt(floor, lit.ring, lit.edge, lit.s) : null;
  const label = (span: Span) => {
    const edge = floor.profile.find((p) => p.ring === span.ring && p.edge === span.edge);
    if (!edge || edge.least === null || edge.greatest === null) return 'none';
    const text = (mm: number, unit: boolean) => formatLength(mm, display, { unit });
    return Math.round(edge.least) === Math.round(edge.greatest)
      ? text(edge.least, true)
      : `${text(edge.least, false)}–${text(edge.greatest, true)}`;
  };

  return (
    <section aria-label="Gap ribbon" className="px-4 py-2">
      <div className="relative h-5 overflow-hidden text-[0.8rem]" aria-hidden="true">
        {spans.map((span) => {
          const name = documentEdgeName(document, span.ring, span.edge);
          const room = (((span.to - span.from) / WIDTH) * widthPx - 6) / CHARACTER_PX;
          return room < name.length ? null : (
            <span
              key={`${span.ring}.${span.edge}`}
              className="absolute pl-1 whitespace-nowrap text-slate"
              style={{ left: `${span.from / 10}%` }}
            >
              <b className="text-graphite">{name}</b>{' '}
              {room >= name.length + label(span).length + 1 && label(span)}
            </span>
          );
        })}
      </div>
      <div
        ref={frame}
        role="slider"
        tabIndex={0}
        aria-label="Spot of the edge"
        aria-valuemin={0}
        aria-valuemax={spans.length - 1}
        aria-valuenow={focused}
        aria-valuetext={
          spans[focused]
            ? `Edge ${documentEdgeName(document, spans[focused].ring, spans[focused].edge)}, gap ${label(spans[focused])}`
            : undefined
        }
        data-testid="gap-ribbon"
        className="relative cursor-crosshair touch-none border-t-2 border-graphite"
        onPointerDown={point}
        onPointerMove={point}
        onPointerLeave={() => table.getState().set({ lit: null })}
        onKeyDown={(event) => {
          const by = event.key === 'ArrowRight' ? 1 : event.key === 'ArrowLeft' ? -1 : 0;
          if (!by) return;
          event.preventDefault();
          event.stopPropagation();
          const next = (focused + by + spans.length) % spans.length;
          setFocused(next);
          light((spans[next].from + spans[next].to) / 2);
        }}
        onBlur={() => table.getState().set({ lit: null })}
      >
        <svg
          viewBox={`0 0 ${WIDTH} ${DEPTH}`}
          preserveAspectRatio="none"
          className="block h-11 w-full md:h-[4.2rem]"
          aria-hidden="true"
        >
          {spans.map((span) => (
            <path
              key={`${span.ring}.${span.edge}`}
              d={ribbonPath(span, floor, reach)}
              fill={document.aggregate?.colour ?? PLAIN_AGGREGATE}
              stroke="var(--slate)"
              strokeWidth="1"
              vectorEffect="non-scaling-stroke"
            />
          ))}
          {spans.map((span) => (
            <path
              key={`t${span.ring}.${span.edge}`}
              d={`M${span.from} 0V${DEPTH}`}
              stroke="var(--stone-300)"
              strokeWidth="1"
              vectorEffect="non-scaling-stroke"
            />
          ))}
          {litX !== null && (
            <path
              d={`M${litX} 0V${DEPTH}`}
              stroke="var(--line)"
              strokeWidth="2"
              vectorEffect="non-scaling-stroke"
            />
          )}
        </svg>
        {litX !== null && (
          <span
            className="pointer-events-none absolute bottom-1 bg-line px-1.5 text-sm font-semibold whitespace-nowrap text-on-line"
            style={litX > 850 ? { right: `${100 - litX / 10}%` } : { left: `${litX / 10}%` }}
          >
            {documentEdgeName(document, lit!.ring, lit!.edge)}{' '}
            {litGap === null ? 'no unit within reach' : formatLength(litGap, display)}
          </span>
        )}
      </div>
    </section>
  );
}

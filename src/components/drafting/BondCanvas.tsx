import { useRef, useState, type PointerEvent } from 'react';
import type { Point } from '@/geometry/point';
import { documentUnit } from '@/paving/bond';
import type { Bond, LayoutDocument } from '@/paving/layout-document';
import { PLAIN_AGGREGATE, PLAIN_UNIT } from '../ui/drawing-colours';
import { useShownFloor, useTableStore } from './table-context';

type Custom = Extract<Bond, { kind: 'custom' }>;
type Held = { readonly kind: 'unit'; readonly index: number } | { readonly kind: 'a' | 'b' };

/** Repeats drawn about the one that is edited. */
const REPEATS = [-2, -1, 0, 1, 2];

const cornersAt = (document: LayoutDocument, bond: Custom, index: number, shift: Point): string => {
  const entry = bond.motif[index];
  const unit = documentUnit(document, entry.unit);
  const radians = (entry.turn * Math.PI) / 180;
  const [cos, sin] = [Math.cos(radians), Math.sin(radians)];
  return [
    [-1, -1],
    [1, -1],
    [1, 1],
    [-1, 1],
  ]
    .map(([p, q]) => {
      const [x, y] = [(p * unit.length) / 2, (q * unit.width) / 2];
      return `${entry.at[0] + shift[0] + x * cos - y * sin},${-(entry.at[1] + shift[1] + x * sin + y * cos)}`;
    })
    .join(' ');
};

/** A bond of one's own on a small canvas: drag its units, and the ends of the two steps by which it repeats. */
export function BondCanvas({ bond }: { bond: Custom }) {
  const table = useTableStore();
  const { document } = useShownFloor();
  const svg = useRef<SVGSVGElement>(null);
  const [held, setHeld] = useState<{ held: Held; from: Point; before: Custom } | null>(null);
  // The picture keeps its frame while something is dragged in it.
  const frame = (held?.before ?? bond) as Custom;
  const xs = [0, frame.a[0], frame.b[0], ...frame.motif.map((m) => m.at[0])];
  const ys = [0, frame.a[1], frame.b[1], ...frame.motif.map((m) => m.at[1])];
  const largest = Math.max(
    ...frame.motif.map((m) => {
      const unit = documentUnit(document, m.unit);
      return Math.hypot(unit.length, unit.width);
    }),
  );
  const side =
    Math.max(Math.max(...xs) - Math.min(...xs), Math.max(...ys) - Math.min(...ys)) + 1.5 * largest;
  const middle: Point = [
    (Math.max(...xs) + Math.min(...xs)) / 2,
    (Math.max(...ys) + Math.min(...ys)) / 2,
  ];

  const pointOf = (event: PointerEvent): Point => {
    const box = svg.current!.getBoundingClientRect();
    return [
      middle[0] + ((event.clientX - box.left) / box.width - 0.5) * side,
      middle[1] - ((event.clientY - box.top) / box.height - 0.5) * side,
    ];
  };
  const take = (what: Held) => (event: PointerEvent) => {
    event.preventDefault();
    svg.current!.setPointerCapture(event.pointerId);
    setHeld({ held: what, from: pointOf(event), before: bond });
  };
  const move = (event: PointerEvent) => {
    if (!held) return;
    const to = pointOf(event);
    const moved = ([x, y]: readonly [number, number]): [number, number] => [
      Math.round(x + to[0] - held.from[0]),
      Math.round(y + to[1] - held.from[1]),
    ];
    const { before, held: what } = held;
    const next: Custom =
      what.kind === 'unit'
        ? {
            ...before,
            motif: before.motif.map((m, n) => (n === what.index ? { ...m, at: moved(m.at) } : m)),
          }
        : { ...before, [what.kind]: moved(before[what.kind]) };
    const { document: settled, show } = table.getState();
    show({ ...settled, bond: next });
  };
  const let_go = () => {
    if (!held) return;
    setHeld(null);
    table.getState().settleShown();
  };

  const arrow = (name: 'a' | 'b') => (
    <g key={name}>
      <line
        x1={0}
        y1={0}
        x2={bond[name][0]}
        y2={-bond[name][1]}
        stroke="var(--line)"
        strokeWidth={side / 130}
      />
      <circle
        cx={bond[name][0]}
        cy={-bond[name][1]}
        r={side / 26}
        fill="var(--stone-50)"
        stroke="var(--line)"
        strokeWidth={side / 130}
        className="cursor-move"
        onPointerDown={take({ kind: name })}
      />
      <text
        x={bond[name][0]}
        y={-bond[name][1]}
        fontSize={side / 20}
        textAnchor="middle"
        dominantBaseline="central"
        fill="var(--line)"
        className="pointer-events-none"
      >
        {name}
      </text>
    </g>
  );
  return (
    <svg
      ref={svg}
      viewBox={`${middle[0] - side / 2} ${-middle[1] - side / 2} ${side} ${side}`}
      className="block aspect-square w-full touch-none border border-stone-300"
      style={{ background: document.aggregate?.colour ?? PLAIN_AGGREGATE }}
      role="img"
      aria-label="The bond as it repeats; its figures are in the fields below"
      data-testid="bond-canvas"
      onPointerMove={move}
      onPointerUp={let_go}
      onPointerCancel={let_go}
    >
      {REPEATS.flatMap((i) =>
        REPEATS.flatMap((j) =>
          bond.motif.map((m, index) => {
            const own = i === 0 && j === 0;
            const shift: Point = [i * bond.a[0] + j * bond.b[0], i * bond.a[1] + j * bond.b[1]];
            return (
              <polygon
                key={`${i}.${j}.${index}`}
                points={cornersAt(document, bond, index, shift)}
                fill={documentUnit(document, m.unit).colour ?? PLAIN_UNIT}
                fillOpacity={own ? 1 : 0.55}
                stroke={own ? 'var(--graphite)' : 'var(--slate)'}
                strokeWidth={side / (own ? 150 : 300)}
                className={own ? 'cursor-move' : 'pointer-events-none'}
                onPointerDown={own ? take({ kind: 'unit', index }) : undefined}
              />
            );
          }),
        ),
      )}
      {arrow('a')}
      {arrow('b')}
    </svg>
  );
}

import { useState } from 'react';
import type { LayoutDocument } from '@/paving/layout-document';
import { formatMass, formatWorkedVolume } from '@/takeoff/measures';
import { formatMoney } from '@/takeoff/money';
import type { TakeOff } from '@/takeoff/take-off';
import { PLAIN_AGGREGATE, PLAIN_UNIT } from '../../ui/drawing-colours';
import { Segmented } from '../../ui/Segmented';

type By = 'mass' | 'volume' | 'cost';

interface Bar {
  readonly id: string;
  readonly name: string;
  readonly size: number;
  /** Part of the size that is there once it is laid; the rest is air that compacts away. */
  readonly firm: number;
  readonly words: string;
  readonly fill: string;
}

function bars(takeOff: TakeOff, by: By, document: LayoutDocument): Bar[] {
  const { display } = document;
  const fillOf = (lines: readonly string[]): string => {
    const [kind, id, tone] = lines[0].split(':');
    if (kind === 'units') {
      const unit = document.units.find((candidate) => candidate.id === id);
      return tone === 'second-tone' && document.tones
        ? document.tones.second
        : (unit?.colour ?? PLAIN_UNIT);
    }
    if (kind === 'fill') return document.aggregate?.colour ?? PLAIN_AGGREGATE;
    return kind === 'layer' && id === 'bedding' ? 'var(--stone-300)' : 'var(--slate)';
  };
  if (by === 'volume') {
    return takeOff.lines.flatMap(({ id, name, volume }) =>
      volume
        ? [
            {
              id,
              name,
              size: Math.max(volume.loose, volume.inPlace),
              firm: volume.inPlace,
              words: `${formatWorkedVolume(volume.inPlace, display)} in place, ${formatWorkedVolume(volume.loose, display)} loose`,
              fill: fillOf([id]),
            },
          ]
        : [],
    );
  }
  return takeOff.orders.flatMap(({ id, name, lines, massKg, costMinor }) => {
    const size = by === 'mass' ? massKg : costMinor;
    if (size === null || size <= 0) return [];
    const words = by === 'mass' ? formatMass(size, display) : formatMoney(size, takeOff.currency!);
    return [{ id, name, size, firm: size, words, fill: fillOf(lines) }];
  });
}

/** What the floor takes, side by side: what is heavy, what is bulky, what is dear. */
export function TakeOffBars({ takeOff, document }: { takeOff: TakeOff; document: LayoutDocument }) {
  const [asked, setBy] = useState<By>('mass');
  const priced = takeOff.costMinor !== null && takeOff.costMinor > 0;
  const by = asked === 'cost' && !priced ? 'mass' : asked;
  const shown = bars(takeOff, by, document);
  const most = Math.max(...shown.map(({ size }) => size), 1e-9);
  return (
    <section aria-label="What it takes, in bars">
      <Segmented
        label="Compare by"
        value={by}
        options={[
          ['mass', 'Weight'],
          ['volume', 'Volume'],
          ...(priced ? ([['cost', 'Cost']] as const) : []),
        ]}
        onChange={setBy}
      />
      <ul className="mt-3 space-y-2">
        {shown.map(({ id, name, size, firm, words, fill }) => (
          <li key={id}>
            <div className="flex items-baseline justify-between gap-3 text-sm">
              <span className="min-w-0 truncate">{name}</span>
              {by !== 'volume' && <span className="font-semibold whitespace-nowrap">{words}</span>}
            </div>
            <div aria-hidden="true" className="mt-0.5 h-3.5">
              <div
                className="h-full border border-slate"
                style={{ width: `${Math.max(0.6, (size / most) * 100)}%` }}
              >
                <div
                  className="h-full"
                  style={{ width: `${(firm / size) * 100}%`, background: fill }}
                />
              </div>
            </div>
            {by === 'volume' && <p className="text-[0.82rem] text-slate">{words}</p>}
          </li>
        ))}
      </ul>
      {by === 'volume' && (
        <p className="mt-2 text-[0.82rem] text-slate">
          Filled: as it lies in the ground. The open end: what it is more while loose.
        </p>
      )}
      {by === 'cost' && takeOff.unpriced.length > 0 && (
        <p className="mt-2 text-[0.82rem] text-slate">
          {takeOff.unpriced.length === 1
            ? 'One thing has'
            : `${takeOff.unpriced.length} things have`}{' '}
          no price yet and no bar.
        </p>
      )}
    </section>
  );
}

import { formatMoney } from '@/takeoff/money';

export interface CostBar {
  readonly id: string;
  readonly name: string;
  readonly minor: number;
}

/** What parts cost, as bars of one scale with their figures beside them; the largest first. */
export function CostBars({
  bars,
  currency,
  label,
}: {
  bars: readonly CostBar[];
  currency: string;
  label: string;
}) {
  const shown = bars.filter(({ minor }) => minor > 0).sort((a, b) => b.minor - a.minor);
  const greatest = Math.max(1, ...shown.map(({ minor }) => minor));
  if (shown.length === 0) return null;
  return (
    <ul aria-label={label} className="space-y-2">
      {shown.map(({ id, name, minor }) => (
        <li key={id}>
          <div className="flex items-baseline justify-between gap-4">
            <span className="min-w-0 truncate">{name}</span>
            <span className="font-semibold whitespace-nowrap">{formatMoney(minor, currency)}</span>
          </div>
          <div
            aria-hidden
            className="mt-0.5 h-2 bg-slate"
            style={{ width: `${Math.max(0.5, (minor / greatest) * 100)}%` }}
          />
        </li>
      ))}
    </ul>
  );
}

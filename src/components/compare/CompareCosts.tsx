import { useQuery } from '@tanstack/react-query';
import type { VersionCost } from '@/api-types/version-cost';
import { formatMoney } from '@/takeoff/money';
import { api } from '../ui/api';
import { Wrong } from '../ui/Wrong';

interface Row {
  readonly name: string;
  readonly a: number | null;
  readonly b: number | null;
  /** Where there is no sum. */
  readonly none: string;
}

const useCost = (id: string) =>
  useQuery({
    queryKey: ['version-cost', id],
    queryFn: () => api<VersionCost>('GET', `/api/versions/${id}/cost`),
  });

/** What two versions come to, for those who may know. */
export function CompareCosts({
  a,
  b,
  names,
}: {
  a: string;
  b: string;
  names: readonly [string, string];
}) {
  const [one, other] = [useCost(a), useCost(b)];
  const error = one.error ?? other.error;
  if (error)
    return (
      <Wrong
        error={error}
        again={() => void Promise.all([one.refetch(), other.refetch()])}
        className="mt-5"
      />
    );
  if (!one.data || !other.data) return null;
  return <CostRows a={one.data} b={other.data} names={names} />;
}

/** Bars of one scale with their figures; nothing where nothing is known. */
function CostRows({
  a,
  b,
  names,
}: {
  a: VersionCost;
  b: VersionCost;
  names: readonly [string, string];
}) {
  if (a.currency !== b.currency) return null;
  const money = (minor: number) => formatMoney(minor, a.currency);
  const rows = (
    [
      {
        name: 'Materials cost',
        a: a.materialsMinor,
        b: b.materialsMinor,
        none: 'not known',
      },
      {
        name: 'Quoted, with tax',
        a: a.quotedMinor,
        b: b.quotedMinor,
        none: 'no quote sent',
      },
    ] satisfies Row[]
  ).filter((row) => row.a !== null || row.b !== null);
  if (rows.length === 0) return null;
  const greatest = Math.max(1, ...rows.flatMap((row) => [row.a ?? 0, row.b ?? 0]));
  const incomplete =
    (a.materialsMinor !== null && !a.complete) || (b.materialsMinor !== null && !b.complete);
  const change = ({ a: from, b: to }: Row) => {
    if (from === null || to === null) return '';
    if (from === to) return 'the same';
    return `${to > from ? '+' : '−'}${money(Math.abs(to - from))}`;
  };
  return (
    <section aria-label="What they come to" className="mt-5" data-testid="costs">
      <h2 className="border-b border-graphite pb-1 text-base">What they come to</h2>
      {rows.map((row) => (
        <div key={row.name} className="mt-3">
          <p className="flex justify-between gap-4">
            <span>{row.name}</span>
            <strong>{change(row)}</strong>
          </p>
          {([row.a, row.b] as const).map((minor, n) => (
            <div key={names[n]} className="mt-1 flex items-center gap-3">
              <span className="w-24 shrink-0 truncate text-sm text-slate">{names[n]}</span>
              {minor === null ? (
                <span className="text-sm text-slate">{row.none}</span>
              ) : (
                <>
                  <span className="min-w-0 flex-1" aria-hidden>
                    <span
                      className={`block h-2 ${n === 0 ? 'border border-slate' : 'bg-slate'}`}
                      style={{ width: `${Math.max(1, (minor / greatest) * 100)}%` }}
                    />
                  </span>
                  <span className="whitespace-nowrap">{money(minor)}</span>
                </>
              )}
            </div>
          ))}
        </div>
      ))}
      {incomplete && (
        <p className="mt-2 text-sm text-slate">
          Not everything that they take has a price, so materials cost more than this.
        </p>
      )}
    </section>
  );
}

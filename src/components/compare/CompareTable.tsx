import type { FigureRow } from './difference-words';

/** Figures of two versions with their differences. */
export function CompareTable({ rows, a, b }: { rows: readonly FigureRow[]; a: string; b: string }) {
  return (
    <div>
      <table className="w-full" data-testid="figures">
        <caption className="sr-only">Figures of both versions and their differences</caption>
        <thead>
          <tr className="border-b border-graphite text-sm text-slate">
            <th scope="col" className="py-1.5 text-left font-normal">
              <span className="sr-only">Figure</span>
            </th>
            <th scope="col" className="py-1.5 pl-2 text-right font-normal">
              {a}
            </th>
            <th scope="col" className="py-1.5 pl-2 text-right font-normal">
              {b}
            </th>
            <th scope="col" className="py-1.5 pl-2 text-right font-normal">
              change
            </th>
          </tr>
        </thead>
        <tbody className="hairlines border-b border-stone-300">
          {rows.map((row) => (
            <tr key={row.name}>
              <th scope="row" className="py-2 pr-1 text-left font-normal">
                {row.name}
              </th>
              <td className="py-2 pl-2 text-right break-words">{row.a}</td>
              <td className="py-2 pl-2 text-right break-words">{row.b}</td>
              <td className="py-2 pl-2 text-right font-bold whitespace-nowrap">{row.change}</td>
            </tr>
          ))}
        </tbody>
      </table>
      <p className="mt-2 text-sm text-slate">
        The least gap is from a unit to the edge. Play is how far the whole floor may drift while it
        is being laid before a unit stands too near to the edge.
      </p>
    </div>
  );
}

import { formatArea } from '@/paving/area';
import { formatCount } from '@/paving/count';
import type { Display } from '@/paving/length';
import type { FloorCost } from '@/takeoff/cutting-cost';
import { formatMass, formatRun } from '@/takeoff/measures';
import { formatMoney } from '@/takeoff/money';
import { formatMinutes } from '@/takeoff/saw-time';
import type { CutFloor } from './cut-worker';

const NO_PRICE = 'no price yet';
const NO_RATE = 'no rate yet';

/** Both floors in figures, side by side. */
export function CostTable({
  floor,
  display,
  hourCurrency,
}: {
  floor: CutFloor;
  display: Display;
  /** What an hour is paid in where there is no price list yet; null where costs are not for the reader. */
  hourCurrency: string | null;
}) {
  const { cut, comparison } = floor;
  const { whole, cut: sawn, currency } = comparison;
  const money = (minor: number | null) => {
    const paidIn = currency ?? hourCurrency;
    return minor === null || paidIn === null ? NO_PRICE : formatMoney(minor, paidIn);
  };
  const row = (
    name: string,
    text: (cost: FloorCost) => string,
  ): readonly [string, string, string] => [name, text(whole), text(sawn)];
  const rows: readonly (readonly [string, string, string])[] = [
    row('Units to buy', ({ units }) => formatCount(units)),
    ['of them to saw', '–', formatCount(sawn.sawnUnits)],
    ['Pieces laid', '–', formatCount(sawn.pieces)],
    ['under a third', '–', formatCount(cut.underThird)],
    row('Left for aggregate', ({ aggregate }) => formatArea(aggregate, display)),
    row('Thrown away', ({ waste }) => (waste === 0 ? '–' : formatArea(waste, display))),
    ['weighing about', '–', formatMass(sawn.wasteKg, display)],
    row('To saw', ({ sawLength }) => (sawLength === 0 ? '–' : formatRun(sawLength, display))),
    ['Cuts', '–', formatCount(sawn.cuts)],
    row('Time at the saw', ({ sawMinutes }) =>
      sawMinutes === 0 ? '–' : `${formatMinutes(sawMinutes)}`,
    ),
    row('Materials', ({ materialsMinor }) => money(materialsMinor)),
    row('Hours at the saw', ({ labourMinor, sawMinutes }) => {
      if (sawMinutes === 0) return '–';
      return labourMinor === null ? NO_RATE : money(labourMinor);
    }),
  ];
  const unpriced = [...new Set([...whole.unpriced, ...sawn.unpriced])];
  return (
    <div>
      <table className="w-full text-right text-[0.93rem]">
        <thead className="text-sm text-slate">
          <tr className="border-b border-graphite">
            <th scope="col" className="py-1 text-left font-normal">
              From this start
            </th>
            <th scope="col" className="font-normal">
              whole
            </th>
            <th scope="col" className="font-normal">
              cut
            </th>
          </tr>
        </thead>
        <tbody className="hairlines">
          {rows.map(([name, one, other]) => (
            <tr key={name}>
              <th
                scope="row"
                className={`py-1 text-left font-normal ${/^[a-z]/.test(name) ? 'pl-3 text-slate' : ''}`}
              >
                {name}
              </th>
              {[one, other].map((text, n) => (
                <td
                  key={n}
                  className={`py-1 pl-2 whitespace-nowrap ${text === NO_PRICE || text === NO_RATE ? 'text-sm text-slate' : 'font-semibold'}`}
                >
                  {text}
                </td>
              ))}
            </tr>
          ))}
        </tbody>
      </table>
      {sawn.labourMinor === null && hourCurrency !== null && sawn.sawMinutes > 0 && (
        <p className="mt-1 text-sm text-slate">
          What an hour costs is not said yet.{' '}
          <a className="link" href="/catalogue/prices">
            Say it once for the firm
          </a>
          , or type one below for this device.
        </p>
      )}
      {currency === null && (
        <p className="mt-1 text-sm text-slate">
          Prices come from your firm’s catalogue, once there are some in it.
        </p>
      )}
      {currency !== null && unpriced.length > 0 && (
        <p className="mt-1 text-sm text-slate">
          Without a price yet: {unpriced.join(', ')}. Prices are chosen or typed at Take-off.
        </p>
      )}
      {currency !== null && unpriced.length === 0 && (
        <p className="mt-1 text-sm text-slate">
          Materials are all that the take-off orders, with spares and whole packs.
        </p>
      )}
    </div>
  );
}

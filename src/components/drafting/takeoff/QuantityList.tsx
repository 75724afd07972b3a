import { formatAmount, formatMass } from '@/takeoff/measures';
import type { TakeOff, TakeOffGroup } from '@/takeoff/take-off';
import { useTable } from '../table-context';
import { AssumptionRow } from './AssumptionRow';
import { Opening } from './Opening';

const GROUPS: readonly (readonly [TakeOffGroup, string])[] = [
  ['units', 'Units'],
  ['fill', 'Joints, voids and margin'],
  ['layers', 'Layers under the units'],
  ['earth', 'Earth'],
  ['sundries', 'Around and under'],
];

/** What the floor itself takes, in groups, each line opening to its formula and its figures. */
export function QuantityList({ takeOff }: { takeOff: TakeOff }) {
  const display = useTable((state) => state.document.display);
  return (
    <section aria-label="What the floor takes">
      <h3 className="border-b border-graphite pb-1">What the floor takes</h3>
      {GROUPS.map(([group, title]) => {
        const lines = takeOff.lines.filter((line) => line.group === group);
        if (lines.length === 0) return null;
        return (
          <div key={group} className="mt-2">
            <h4 className="text-sm text-slate">{title}</h4>
            <ul className="hairlines">
              {lines.map((line) => (
                <Opening
                  key={line.id}
                  name={line.name}
                  figure={formatAmount(line.amount, line.measure, display)}
                  under={line.massKg !== null && <span>{formatMass(line.massKg, display)}</span>}
                >
                  <p className="text-[0.9rem]">{line.formula}.</p>
                  <ul className="mt-1 hairlines">
                    {line.assumptions.map((assumption) => (
                      <AssumptionRow key={assumption.name} assumption={assumption} />
                    ))}
                  </ul>
                </Opening>
              ))}
            </ul>
          </div>
        );
      })}
      <p className="mt-2 text-[0.82rem] text-slate">
        Figures are rounded to be read; sums are made before rounding.
      </p>
    </section>
  );
}

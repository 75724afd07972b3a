import { levelFigure } from '@/paving/level-text';
import { earthOf } from '../earth';
import { useShownFloor } from '../table-context';

/** Levels at pegs: what a string, a board and a digger go by. */
export function PegTable() {
  const floor = useShownFloor();
  const earth = earthOf(floor);
  if (!earth) return null;
  const { display } = floor.document;
  const figure = (mm: number | null) => (mm === null ? '–' : levelFigure(mm, display));
  return (
    <section aria-label="Levels at pegs">
      <table className="w-full text-right text-[0.92rem] [&_td]:py-1 [&_td]:pl-2">
        <caption className="border-b border-graphite pb-1 text-left text-base font-bold">
          Levels at pegs{display === 'metric' && ', mm'}
        </caption>
        <thead className="text-sm text-slate">
          <tr>
            <th scope="col" className="py-1 text-left font-normal">
              Peg
            </th>
            <th scope="col" className="font-normal">
              finish
            </th>
            <th scope="col" className="font-normal">
              base
            </th>
            <th scope="col" className="font-normal">
              dig to
            </th>
            <th scope="col" className="font-normal">
              ground
            </th>
          </tr>
        </thead>
        <tbody className="hairlines">
          {earth.pegs.map(({ name, finish, base, formation, existing }) => (
            <tr key={name}>
              <th scope="row" className="py-1 text-left font-semibold">
                {name}
              </th>
              <td>{figure(finish)}</td>
              <td>{figure(base)}</td>
              <td>{figure(formation)}</td>
              <td>{figure(existing)}</td>
            </tr>
          ))}
        </tbody>
      </table>
      <p className="mt-1 text-sm text-slate">
        From the top of the edge; − is below it. Measure down from a string at the datum.
      </p>
    </section>
  );
}

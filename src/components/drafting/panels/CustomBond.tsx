import { Plus, Trash2 } from 'lucide-react';
import { motifExtended, unitAdded } from '@/paving/bond-edits';
import type { Bond, MotifEntry } from '@/paving/layout-document';
import { LengthField } from '../../ui/LengthField';
import { NumberField } from '../../ui/NumberField';
import { BondCanvas } from '../BondCanvas';
import { gapRefused, stepRefused } from '../field-limits';
import { useShownFloor, useTableStore } from '../table-context';

type Custom = Extract<Bond, { kind: 'custom' }>;

/** One's own bond: the two steps by which it repeats, and the units of one repeat. */
export function CustomBond({ bond }: { bond: Custom }) {
  const table = useTableStore();
  const { document } = useShownFloor();
  const { display } = document;
  const edit = (part: Partial<Custom>) =>
    table.getState().edit((now) => ({ ...now, bond: { ...(now.bond as Custom), ...part } }));
  const entry = (index: number, part: Partial<MotifEntry>) =>
    edit({ motif: bond.motif.map((m, n) => (n === index ? { ...m, ...part } : m)) });
  return (
    <section aria-label="Own bond" className="space-y-3">
      <BondCanvas bond={bond} />
      <p className="text-sm text-slate">
        Drag the units, and the ends a and b of the two steps by which they repeat.
      </p>
      {(['a', 'b'] as const).map((name) => (
        <div key={name}>
          <p className="field-label">
            Repeats {name === 'a' ? 'along the course (a)' : 'from course to course (b)'}
          </p>
          <div className="grid grid-cols-2 gap-2">
            {([0, 1] as const).map((axis) => (
              <LengthField
                key={axis}
                label={`Step ${name}, ${axis === 0 ? 'across' : 'up'}`}
                refuse={stepRefused(display)}
                mm={bond[name][axis]}
                display={display}
                onLength={(mm) =>
                  edit({
                    [name]: axis === 0 ? [mm, bond[name][1]] : [bond[name][0], mm],
                  } as Partial<Custom>)
                }
              />
            ))}
          </div>
        </div>
      ))}
      <p className="field-label">Units of one repeat: middle across, up, and turn</p>
      <ul className="space-y-2">
        {bond.motif.map((m, index) => (
          <li key={index} className="grid grid-cols-[1fr_1fr_4.2rem_auto] items-end gap-1">
            {document.units.length > 1 && (
              <select
                className="field col-span-4"
                aria-label={`Unit ${index + 1}`}
                value={m.unit}
                onChange={(event) => entry(index, { unit: event.target.value })}
              >
                {document.units.map((unit) => (
                  <option key={unit.id} value={unit.id}>
                    {unit.name}
                  </option>
                ))}
              </select>
            )}
            <LengthField
              label={`Unit ${index + 1} across`}
              hideLabel
              refuse={stepRefused(display)}
              mm={m.at[0]}
              display={display}
              onLength={(mm) => entry(index, { at: [mm, m.at[1]] })}
            />
            <LengthField
              label={`Unit ${index + 1} up`}
              hideLabel
              refuse={stepRefused(display)}
              mm={m.at[1]}
              display={display}
              onLength={(mm) => entry(index, { at: [m.at[0], mm] })}
            />
            <NumberField
              label={`Unit ${index + 1} turn`}
              hideLabel
              value={m.turn}
              suffix="°"
              refuse={(v) => (Math.abs(v) > 360 ? 'Up to 360°.' : null)}
              onNumber={(turn) => entry(index, { turn })}
            />
            <button
              type="button"
              className="button button-quiet"
              disabled={bond.motif.length === 1}
              aria-label={`Remove unit ${index + 1}`}
              onClick={() => edit({ motif: bond.motif.filter((_, n) => n !== index) })}
            >
              <Trash2 size={16} aria-hidden />
            </button>
          </li>
        ))}
      </ul>
      <button
        type="button"
        className="button w-full"
        disabled={bond.motif.length >= 64}
        onClick={() => table.getState().edit(motifExtended)}
      >
        <Plus size={16} aria-hidden /> One more unit
      </button>
      {document.units.length === 1 && (
        <button
          type="button"
          className="button w-full"
          onClick={() => table.getState().edit(unitAdded)}
        >
          <Plus size={16} aria-hidden /> A second size
        </button>
      )}
      <LengthField
        label="Joint, for reading the gaps"
        mm={bond.joint ?? 0}
        display={display}
        refuse={gapRefused(display)}
        onLength={(joint) => edit({ joint })}
      />
    </section>
  );
}

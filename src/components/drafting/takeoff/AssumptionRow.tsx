import type { LayoutDocument } from '@/paving/layout-document';
import { GROUND_KINDS, MATERIAL_KINDS } from '@/paving/materials';
import { assumptionRefused, assumptionSet } from '@/takeoff/assumption-edits';
import { GROUND_DEFAULTS, MATERIAL_DEFAULTS } from '@/takeoff/material-kinds';
import { KG_PER_POUND, POUNDS_PER_CUBIC_FOOT } from '@/takeoff/measures';
import type { Assumption } from '@/takeoff/take-off';
import { LengthField } from '../../ui/LengthField';
import { NumberField } from '../../ui/NumberField';
import { useTable, useTableStore } from '../table-context';

/** How a number is typed: its unit, and how many of the document's own make one of it. */
function typedUnit(as: Assumption['as'], display: LayoutDocument['display']) {
  const metric = display === 'metric';
  if (as === 'density')
    return metric
      ? { suffix: '\u202fkg/m³', size: 1, decimals: 0 }
      : { suffix: '\u202flb/ft³', size: POUNDS_PER_CUBIC_FOOT, decimals: 1 };
  if (as === 'mass')
    return metric
      ? { suffix: '\u202fkg', size: 1, decimals: 1 }
      : { suffix: '\u202flb', size: KG_PER_POUND, decimals: 1 };
  return { suffix: as === 'percent' ? '\u202f%' : '', size: 1, decimals: 3 };
}

const KIND_OPTIONS = {
  material: MATERIAL_KINDS.map((kind) => [kind, MATERIAL_DEFAULTS[kind].name] as const),
  ground: GROUND_KINDS.map((kind) => [kind, GROUND_DEFAULTS[kind].name] as const),
};

/** A value that was reckoned with: where it comes from, and a field to type a better one. */
export function AssumptionRow({ assumption }: { assumption: Assumption }) {
  const table = useTableStore();
  const document = useTable((state) => state.document);
  const { name, value, source, as, raw, field, own } = assumption;
  const { display } = document;
  const change = (next: number | string | undefined) =>
    table.getState().edit((now) => assumptionSet(now, field!, next));
  const refuse = (next: number) => assumptionRefused(document, field!, next);
  const unit = typedUnit(as, display);
  const editor = () => {
    if (!field || as === null) return <span className="font-semibold">{value}</span>;
    if (as === 'material' || as === 'ground') {
      const options = KIND_OPTIONS[as];
      return (
        <select
          aria-label={name}
          className="field"
          value={options.find(([, label]) => label === value)?.[0]}
          onChange={(event) => change(event.target.value)}
        >
          {options.map(([kind, label]) => (
            <option key={kind} value={kind}>
              {label}
            </option>
          ))}
        </select>
      );
    }
    if (as === 'length')
      return (
        <LengthField
          label={name}
          hideLabel
          mm={raw}
          display={display}
          refuse={refuse}
          onLength={change}
        />
      );
    return (
      <NumberField
        label={name}
        hideLabel
        value={Number((raw! / unit.size).toFixed(unit.decimals))}
        suffix={unit.suffix}
        refuse={(typed) => refuse(typed * unit.size)}
        onNumber={(typed) => change(typed * unit.size)}
      />
    );
  };
  return (
    <li className="grid grid-cols-[1fr_9.5rem] items-center gap-x-3 gap-y-0.5 py-1.5">
      <span className="text-sm">{name}</span>
      <span className="text-right">{editor()}</span>
      <span className="col-span-2 text-[0.82rem] text-slate">
        {own ? 'Your own figure.' : `From: ${source}.`}{' '}
        {own && field && (
          <button
            type="button"
            className="link pointer-coarse:inline-flex pointer-coarse:min-h-11 pointer-coarse:items-center"
            onClick={() => change(undefined)}
          >
            Put the usual back
          </button>
        )}
      </span>
    </li>
  );
}

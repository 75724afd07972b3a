import { useState } from 'react';
import type { CatalogueItem } from '@/api-types/catalogue';
import { unitChanged, mainUnitId } from '@/paving/bond-edits';
import { GREATEST_UNIT_MM, type LayoutDocument, type Unit } from '@/paving/layout-document';
import { formatLength, formatSize } from '@/paving/length';
import { STARTER_CATALOGUE, type CatalogueUnit } from '@/paving/starter-catalogue';
import { LengthField } from '../../ui/LengthField';
import { Segmented } from '../../ui/Segmented';
import { PLAIN_UNIT } from '../../ui/drawing-colours';
import { CatalogueChoice } from '../CatalogueChoice';
import { sizeWithin } from '../field-limits';
import { FloorFigures } from '../FloorFigures';
import { useShownFloor, useTable, useTableStore } from '../table-context';

/** The longest side that a catalogue picture shows at full size, mm. */
const PICTURE_MM = 900;

function UnitPicture({ unit }: { unit: Pick<Unit, 'length' | 'width' | 'colour'> }) {
  const scale = 54 / PICTURE_MM;
  const [width, height] = [Math.max(5, unit.length * scale), Math.max(4, unit.width * scale)];
  return (
    <svg width="56" height="38" viewBox="0 0 56 38" aria-hidden="true" className="shrink-0">
      <rect
        x={28 - width / 2}
        y={19 - height / 2}
        width={width}
        height={height}
        fill={unit.colour ?? PLAIN_UNIT}
        stroke="var(--slate)"
        strokeWidth="0.8"
      />
    </svg>
  );
}

export function UnitPanel() {
  const table = useTableStore();
  const document = useTable((state) => state.document);
  const { display } = useShownFloor().document;
  const [system, setSystem] = useState<CatalogueUnit['system']>(display);
  const id = mainUnitId(document.bond);
  const others = document.units.filter((unit) => unit.id !== id && usedIds(document).has(unit.id));

  const change = (unitId: string, part: Partial<Omit<Unit, 'id'>>) => {
    let said: string | null = null;
    table.getState().edit((now) => {
      const changed = unitChanged(now, unitId, part);
      said = changed.said;
      return changed.document;
    });
    if (said) table.getState().set({ said });
  };
  const unit = document.units.find((candidate) => candidate.id === id)!;
  const chosen = (item: CatalogueUnit) =>
    (['length', 'width', 'thickness'] as const).every(
      (side) => Math.abs(item[side] - unit[side]) < 0.01,
    );

  return (
    <div className="space-y-5">
      <FloorFigures brief />
      <CatalogueChoice
        kind="unit"
        label="From your catalogue"
        chosen={unit.catalogueId}
        picture={(item) => (
          <UnitPicture
            unit={{
              length: item.length!,
              width: item.width!,
              ...(item.colour ? { colour: item.colour } : {}),
            }}
          />
        )}
        onChoose={(item) => change(id, unitOfItem(item))}
      />
      <section aria-label="Sizes in the trade">
        <Segmented
          label="Sizes in the trade"
          value={system}
          options={[
            ['metric', 'Metric'],
            ['imperial', 'Inches'],
          ]}
          onChange={setSystem}
        />
        <ul className="mt-2 max-h-80 overflow-y-auto border-y border-stone-300 hairlines">
          {STARTER_CATALOGUE.filter((item) => item.system === system).map((item) => (
            <li key={item.name}>
              <button
                type="button"
                aria-pressed={chosen(item)}
                className={`flex min-h-12 w-full items-center gap-3 px-2 py-1 text-left hover:bg-stone-100 ${
                  chosen(item) ? 'bg-line-wash font-semibold text-line' : ''
                }`}
                onClick={() => {
                  const { system: _system, ...sizes } = item;
                  change(id, { ...sizes, ...NOT_OF_CATALOGUE });
                }}
              >
                <UnitPicture unit={item} />
                <span className="flex-1">{item.name}</span>
                <span className="text-right text-sm text-slate">
                  {formatLength(item.thickness, item.system, { decimals: 1 })} thick
                </span>
              </button>
            </li>
          ))}
        </ul>
      </section>
      <UnitFields key={id} unit={unit} heading="This unit" change={(part) => change(id, part)} />
      {others.map((other) => (
        <UnitFields
          key={other.id}
          unit={other}
          heading="Second unit"
          change={(part) => change(other.id, part)}
        />
      ))}
    </div>
  );
}

/** What a unit of the catalogue is on the floor; what the catalogue does not know is left to be worked out. */
const unitOfItem = (item: CatalogueItem): Omit<Unit, 'id'> => ({
  name: item.name,
  length: item.length!,
  width: item.width!,
  thickness: item.thickness!,
  colour: item.colour ?? undefined,
  tolerance: item.tolerance ?? undefined,
  mass: item.massKg ?? undefined,
  catalogueId: item.id,
});

/** A unit of some other size is none of the catalogue's. */
const NOT_OF_CATALOGUE = { catalogueId: undefined, mass: undefined, tolerance: undefined } as const;

/** Names that say no more than the size: the catalogue's, and those made from it. */
const sizeNamed = (name: string): boolean =>
  name.startsWith('Own ') ||
  name.startsWith('Square ') ||
  STARTER_CATALOGUE.some((item) => item.name === name);

function usedIds({ bond }: LayoutDocument): Set<string> {
  if (bond.kind === 'custom') return new Set(bond.motif.map((entry) => entry.unit));
  return new Set(bond.kind === 'pinwheel' ? [bond.unit, bond.small] : [bond.unit]);
}

function UnitFields({
  unit,
  heading,
  change,
}: {
  unit: Unit;
  heading: string;
  change: (part: Partial<Omit<Unit, 'id'>>) => void;
}) {
  const { document } = useShownFloor();
  const { display } = document;
  return (
    <section aria-label={heading} className="space-y-2">
      <h3 className="border-b border-graphite pb-1">{heading}</h3>
      <div>
        <label className="field-label" htmlFor={`name-${unit.id}`}>
          Name
        </label>
        <input
          id={`name-${unit.id}`}
          key={unit.name}
          className="field"
          defaultValue={unit.name}
          maxLength={80}
          onBlur={(event) => {
            const name = event.target.value.trim();
            if (name && name !== unit.name) change({ name });
            else event.target.value = unit.name;
          }}
          onKeyDown={(event) => event.key === 'Enter' && event.currentTarget.blur()}
        />
      </div>
      <div className="grid grid-cols-3 gap-2">
        {(['length', 'width', 'thickness'] as const).map((side) => (
          <LengthField
            key={side}
            label={{ length: 'Length', width: 'Width', thickness: 'Thickness' }[side]}
            mm={unit[side]}
            display={display}
            refuse={sizeWithin(display, GREATEST_UNIT_MM)}
            onLength={(mm) => {
              const next = unitChanged(document, unit.id, { [side]: mm }).document.units.find(
                (other) => other.id === unit.id,
              )!;
              const name = `Own ${formatSize(next.length, next.width, display)}`;
              // A name that somebody gave stays; one that only said the size says the new one.
              const renamed = side !== 'thickness' && sizeNamed(unit.name) ? { name } : {};
              change({ [side]: mm, ...renamed, ...(unit.catalogueId ? NOT_OF_CATALOGUE : {}) });
            }}
          />
        ))}
      </div>
      <div className="flex items-center justify-between">
        <label className="field-label mb-0" htmlFor={`colour-${unit.id}`}>
          Colour
        </label>
        <input
          id={`colour-${unit.id}`}
          type="color"
          className="h-11 w-16 border border-slate"
          key={unit.colour}
          defaultValue={unit.colour ?? PLAIN_UNIT}
          onBlur={(event) =>
            event.target.value !== unit.colour && change({ colour: event.target.value })
          }
        />
      </div>
    </section>
  );
}

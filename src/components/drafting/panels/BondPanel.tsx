import { BOND_KINDS, BOND_NAMES, bondChosen, mainUnit } from '@/paving/bond-edits';
import { documentUnit } from '@/paving/bond';
import type { Aggregate, BondKind, LayoutDocument, Tones } from '@/paving/layout-document';
import { LengthField } from '../../ui/LengthField';
import { NumberField } from '../../ui/NumberField';
import { Segmented } from '../../ui/Segmented';
import { PLAIN_AGGREGATE } from '../../ui/drawing-colours';
import { BondPicture } from '../BondPicture';
import { CatalogueChoice } from '../CatalogueChoice';
import { gapRefused } from '../field-limits';
import { FloorFigures } from '../FloorFigures';
import { useShownFloor, useTable, useTableStore } from '../table-context';
import { CustomBond } from './CustomBond';

/** A bond that the unit in hand cannot be laid in is pictured with one that can. */
const TWO_TO_ONE = { length: 200, width: 100 };
const SQUARE = { length: 400, width: 400 };

function pictured(document: LayoutDocument, kind: BondKind): LayoutDocument {
  const chosen = bondChosen(document, kind);
  if (chosen.ok) return chosen.document;
  const unit = { ...mainUnit(document), ...(kind === 'pinwheel' ? SQUARE : TWO_TO_ONE) };
  const plain: LayoutDocument = {
    ...document,
    units: [unit],
    bond: { kind: 'stack', unit: unit.id, joint: 0 },
  };
  const again = bondChosen(plain, kind);
  return again.ok ? again.document : plain;
}

export function BondPanel() {
  const table = useTableStore();
  const { document, problems } = useShownFloor();
  const settled = useTable((state) => state.document);
  return (
    <div className="space-y-5">
      <FloorFigures brief />
      <div
        role="radiogroup"
        aria-label="Bond"
        className="grid grid-cols-4 gap-x-2 gap-y-3 max-md:grid-cols-4"
      >
        {BOND_KINDS.map((kind) => {
          const choice = bondChosen(settled, kind);
          const chosen = settled.bond.kind === kind;
          return (
            <button
              key={kind}
              type="button"
              role="radio"
              aria-checked={chosen}
              disabled={!choice.ok}
              title={choice.ok ? undefined : choice.message}
              className={`text-left text-sm ${chosen ? 'font-bold text-line' : ''} disabled:opacity-45`}
              onClick={() => {
                table.getState().edit((now) => {
                  const next = bondChosen(now, kind);
                  return next.ok ? next.document : now;
                });
              }}
            >
              <span
                className={`block ${chosen ? 'outline-3 outline-line' : 'outline-1 outline-stone-300'}`}
              >
                {problems.length > 0 && chosen ? (
                  <span className="flex aspect-square items-center justify-center bg-brick-wash text-xs">
                    does not fit
                  </span>
                ) : (
                  <BondPicture document={pictured(chosen ? document : settled, kind)} />
                )}
              </span>
              <span className="mt-1 block text-[0.8rem] tracking-tight">{BOND_NAMES[kind]}</span>
            </button>
          );
        })}
      </div>
      <UnfitBonds document={settled} />
      <BondFields />
      <TonesFields />
      <AggregateFields />
    </div>
  );
}

function UnfitBonds({ document }: { document: LayoutDocument }) {
  const unfit = BOND_KINDS.map((kind) => [kind, bondChosen(document, kind)] as const).filter(
    ([, choice]) => !choice.ok,
  );
  if (unfit.length === 0) return null;
  return (
    <ul className="text-sm text-slate">
      {unfit.map(([kind, choice]) => (
        <li key={kind}>
          <b>{BOND_NAMES[kind]}.</b> {!choice.ok && choice.message}
        </li>
      ))}
    </ul>
  );
}

function BondFields() {
  const table = useTableStore();
  const { document } = useShownFloor();
  const { bond, display } = document;
  const edit = (part: object) =>
    table
      .getState()
      .edit((now) => ({ ...now, bond: { ...now.bond, ...part } as LayoutDocument['bond'] }));

  if (bond.kind === 'custom') return <CustomBond bond={bond} />;
  const unit = documentUnit(document, bond.unit);
  return (
    <section aria-label="Joint and shift" className="grid grid-cols-2 gap-2">
      {bond.kind === 'stepping' ? (
        <>
          {([0, 1] as const).map((axis) => {
            const side = axis === 0 ? unit.length : unit.width;
            return (
              <LengthField
                key={axis}
                label={axis === 0 ? 'Gap along the course' : 'Gap between courses'}
                mm={bond.pitch[axis] - side}
                display={display}
                refuse={(mm) =>
                  mm <= 0 ? 'Stepping units must not touch.' : gapRefused(display)(side + mm)
                }
                onLength={(mm) =>
                  edit({
                    pitch: axis === 0 ? [side + mm, bond.pitch[1]] : [bond.pitch[0], side + mm],
                  })
                }
              />
            );
          })}
        </>
      ) : (
        <LengthField
          label="Joint"
          mm={bond.joint}
          display={display}
          refuse={gapRefused(display)}
          onLength={(joint) => edit({ joint })}
        />
      )}
      {(bond.kind === 'running' || bond.kind === 'stepping') && (
        <NumberField
          label="Shift from course to course"
          value={bond.shift * 100}
          suffix=" %"
          refuse={(value) => (value < 0 || value >= 100 ? 'From 0 to below 100 %.' : null)}
          onNumber={(value) => edit({ shift: value / 100 })}
        />
      )}
      {(bond.kind === 'basket' || bond.kind === 'herringbone') && (
        <p className="self-end text-sm text-slate">
          In {bond.kind} the joint must make the unit twice as long as wide.
        </p>
      )}
    </section>
  );
}

const RULES: readonly (readonly [Tones['rule'], string])[] = [
  ['single', 'One'],
  ['alternate', 'In turn'],
  ['course', 'Courses'],
  ['random', 'Mixed'],
];

function TonesFields() {
  const table = useTableStore();
  const { document } = useShownFloor();
  const tones: Tones = document.tones ?? { rule: 'single', second: '#b9b3a6', share: 0.5, seed: 1 };
  const edit = (part: Partial<Tones>) =>
    table.getState().edit((now) => ({ ...now, tones: { ...tones, ...part } }));
  return (
    <section aria-label="Tones" className="space-y-2">
      <Segmented
        label="Tones"
        value={tones.rule}
        options={RULES}
        onChange={(rule) => edit({ rule })}
      />
      {tones.rule !== 'single' && (
        <div className="flex items-center justify-between">
          <label className="field-label mb-0" htmlFor="second-tone">
            Second tone
          </label>
          <input
            id="second-tone"
            type="color"
            className="h-11 w-16 border border-slate"
            key={tones.second}
            defaultValue={tones.second}
            onBlur={(event) =>
              event.target.value !== tones.second && edit({ second: event.target.value })
            }
          />
        </div>
      )}
      {tones.rule === 'random' && (
        <div className="grid grid-cols-2 gap-2">
          <NumberField
            label="Share of the second"
            value={tones.share * 100}
            suffix=" %"
            refuse={(value) => (value < 0 || value > 100 ? 'From 0 to 100 %.' : null)}
            onNumber={(value) => edit({ share: value / 100 })}
          />
          <button
            type="button"
            className="button self-end"
            onClick={() => edit({ seed: (tones.seed % 999_999) + 1 })}
          >
            Mix again
          </button>
        </div>
      )}
    </section>
  );
}

const AGGREGATES: readonly (readonly [name: string, colour: string])[] = [
  ['Golden gravel', '#d9c8a2'],
  ['Grey chippings', '#b9bab6'],
  ['Buff sand', '#e0d2ae'],
  ['Red granite', '#c39a86'],
  ['Dark slate', '#7f878a'],
];

function AggregateFields() {
  const table = useTableStore();
  const { document } = useShownFloor();
  const now: Aggregate = document.aggregate ?? { name: 'Golden gravel', colour: PLAIN_AGGREGATE };
  return (
    <section aria-label="Aggregate">
      <p className="field-label">Aggregate in joints, voids and margin</p>
      <div className="flex flex-wrap gap-2">
        {AGGREGATES.map(([name, colour]) => (
          <button
            key={name}
            type="button"
            aria-pressed={now.name === name}
            className="button min-h-11 gap-2 px-2 text-sm font-normal"
            onClick={() => table.getState().edit((d) => ({ ...d, aggregate: { name, colour } }))}
          >
            <span
              className="inline-block size-5 border border-slate"
              style={{ background: colour }}
            />
            {name}
          </button>
        ))}
      </div>
      <div className="mt-4">
        <CatalogueChoice
          kind="aggregate"
          label="or from your catalogue"
          chosen={now.catalogueId}
          picture={(item) => (
            <span
              className="inline-block size-5 shrink-0 border border-slate"
              style={{ background: item.colour ?? PLAIN_AGGREGATE }}
            />
          )}
          onChoose={(item) =>
            table.getState().edit((d) => ({
              ...d,
              aggregate: {
                name: item.name,
                colour: item.colour ?? d.aggregate?.colour ?? PLAIN_AGGREGATE,
                catalogueId: item.id,
              },
            }))
          }
        />
      </div>
    </section>
  );
}

import { useMemo } from 'react';
import { bondPattern, documentUnit } from '@/paving/bond';
import { creep, measureProblem, type Creep, type UnitMeasure } from '@/paving/creep/creep';
import { layFloor } from '@/paving/laying';
import { Length } from '../ui/Length';
import { LengthField } from '../ui/LengthField';
import { NumberField } from '../ui/NumberField';
import { CreepFigures } from './CreepFigures';
import type { TabProps } from './PackView';
import { laidNumbers } from './pack-floor';
import { Refitting } from './Refitting';
import { useMeasures, type Measured } from './measures';

/** Units laid tight that are measured together, unless the crew says otherwise. */
const TEN = 10;

/** Units that run large or small: what it comes to, whether the joints take it, and the rest of the floor fitted anew. */
export function SizesTab(props: TabProps) {
  const { kept, floor, record, display } = props;
  const { document } = kept.pack;
  // The words of the reckoning follow the tape in hand; the figures do not change.
  const laying = useMemo(() => layFloor({ ...document, display }), [document, display]);
  const [measured, setMeasured] = useMeasures(kept.versionId);
  const measures = measuresOf(measured);
  const wrong = measures.length > 0 ? measureProblem(laying.document, measures) : null;
  const found = useMemo(
    (): Creep | null =>
      measures.length > 0 && wrong === null
        ? creep(laying, { measures, laid: laidNumbers(floor, record) }, floor.setOut)
        : null,
    // The measures are made anew at each drawing; what they were made from is not.
    [laying, floor, record, measured, wrong],
  );
  const units = [...new Set(bondPattern(document).motif.map(({ unit }) => unit))].map((id) =>
    documentUnit(document, id),
  );
  const change = (unit: string, side: 'length' | 'width', part: Partial<Measured>) => {
    const key = `${unit}/${side}`;
    const before = measured[key] ?? { count: TEN, total: null };
    setMeasured({ ...measured, [key]: { ...before, ...part } });
  };
  return (
    <section aria-label="Sizes">
      <h2>Do the units run large or small?</h2>
      <p className="mt-1 text-slate">
        Lay ten units tight on flat ground, side against side without a joint, and measure from the
        first side to the last.
      </p>
      {units.map((unit) => (
        <fieldset key={unit.id} className="mt-4 border-t border-graphite pt-2">
          <legend className="pr-2 font-bold">{unit.name}</legend>
          {(unit.length === unit.width
            ? (['length'] as const)
            : (['length', 'width'] as const)
          ).map((side) => {
            const own = measured[`${unit.id}/${side}`] ?? { count: TEN, total: null };
            return (
              <div key={side} className="mt-2 grid grid-cols-[5.5rem_minmax(0,1fr)] gap-3">
                <NumberField
                  label="Units"
                  value={own.count}
                  onNumber={(count) => change(unit.id, side, { count })}
                  refuse={(count) =>
                    Number.isInteger(count) && count >= 1 && count <= 1000
                      ? null
                      : 'Type a whole number from 1 to 1000.'
                  }
                />
                <LengthField
                  label={
                    unit.length === unit.width ? 'They come to' : `By their ${side} they come to`
                  }
                  mm={own.total}
                  display={display}
                  onLength={(total) => change(unit.id, side, { total })}
                />
                <p className="col-span-2 text-sm text-slate">
                  As drawn: <Length mm={own.count * unit[side]} display={display} decimals={1} />
                </p>
              </div>
            );
          })}
        </fieldset>
      ))}
      {wrong && (
        <p role="alert" className="mt-3 border-l-4 border-brick bg-brick-wash py-1 pl-3 text-brick">
          {wrong}
        </p>
      )}
      {found && (
        <>
          <CreepFigures found={found} display={display} />
          <Refitting {...props} laying={laying} measures={measures} />
        </>
      )}
      {!found && !wrong && (
        <p className="mt-5 text-slate">
          What each course grows by, whether the joints can take it, and where the field would end
          stand here as soon as a length is typed.
        </p>
      )}
    </section>
  );
}

const measuresOf = (measured: Readonly<Record<string, Measured>>): UnitMeasure[] =>
  Object.entries(measured).flatMap(([key, { count, total }]) => {
    const [unit, side] = key.split(/\/(?=[^/]*$)/);
    return total === null ? [] : [{ unit, side: side as 'length' | 'width', count, total }];
  });

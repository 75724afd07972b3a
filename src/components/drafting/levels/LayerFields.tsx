import { useMemo } from 'react';
import { documentBuildUp, GREATEST_LAYER_MM, type BuildUp } from '@/paving/build-up';
import { leastBaseWords, NOMINAL_BEDDING_MM, SOURCES } from '@/paving/build-up-advice';
import { buildUpChanged } from '@/paving/level-edits';
import { formatLength } from '@/paving/length';
import { layerSection } from '@/sheets/layer-section';
import { buildUpDepth, thickestUnit } from '@/takeoff/earth-cells';
import { LengthField } from '../../ui/LengthField';
import { Segmented } from '../../ui/Segmented';
import { SheetPicture } from '../../ui/SheetPicture';
import { lengthWithin } from '../field-limits';
import { useShownFloor, useTableStore } from '../table-context';

const PICTURE = { left: 1, top: 1, right: 83, bottom: 59 };

/** The layers from the unit down, with what is published for them, and their section. */
export function LayerFields() {
  const table = useTableStore();
  const { document } = useShownFloor();
  const { display } = document;
  const buildUp = documentBuildUp(document);
  const change = (part: Partial<BuildUp>) =>
    table.getState().edit((now) => buildUpChanged(now, part));
  const shown = (mm: number) => formatLength(mm, display, { decimals: 1 });
  const section = useMemo(() => layerSection(document, PICTURE, 'section', 'screen'), [document]);
  const field = (name: 'bedding' | 'base' | 'overdig', label: string, hint: string) => (
    <div>
      <LengthField
        label={label}
        mm={buildUp[name]}
        display={display}
        refuse={lengthWithin(display, 0, GREATEST_LAYER_MM)}
        onLength={(mm) => change({ [name]: mm })}
      />
      <p className="mt-1 text-sm text-slate">{hint}</p>
    </div>
  );
  const check = (name: 'geotextile' | 'frost', label: string) => (
    <label className="flex min-h-11 items-center gap-2">
      <input
        type="checkbox"
        className="size-5 shrink-0 accent-line"
        checked={buildUp[name]}
        onChange={(event) => change({ [name]: event.target.checked })}
      />
      {label}
    </label>
  );
  return (
    <section aria-label="Layers" className="space-y-3">
      <h2 className="border-b border-graphite pb-1 text-base">Layers</h2>
      <SheetPicture
        commands={section.commands}
        width={84}
        height={60}
        label={`The layers against the edge: unit ${shown(thickestUnit(document))}, bedding ${shown(buildUp.bedding)}, base ${shown(buildUp.base)}${buildUp.geotextile ? ', geotextile' : ''}; ${shown(buildUpDepth(document))} in all.`}
      />
      <Segmented
        label="What goes over it"
        value={buildUp.use}
        options={[
          ['foot', 'People on foot'],
          ['driveway', 'Cars'],
        ]}
        onChange={(use) => change({ use })}
      />
      <div className="grid grid-cols-2 gap-3">
        {field('bedding', 'Bedding', `${shown(NOMINAL_BEDDING_MM)} is published.`)}
        {field(
          'base',
          'Base, compacted',
          `At least ${leastBaseWords(buildUp.use, display)} is published.`,
        )}
      </div>
      {check('geotextile', 'A geotextile between base and ground')}
      {check('frost', 'The ground freezes in winter')}
      {field(
        'overdig',
        'Dig and base go on beyond the edge by',
        'Nothing inside an edge that stands. For one set on the base, the larger of 150 mm (6") and the base is published.',
      )}
      <p className="text-sm text-slate">
        Published in: {SOURCES.tolerances}. Local codes and licensed practice come first.
      </p>
    </section>
  );
}

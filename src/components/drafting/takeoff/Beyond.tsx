import { assumptionRefused, assumptionSet, sparesRuled } from '@/takeoff/assumption-edits';
import { NumberField } from '../../ui/NumberField';
import { Segmented } from '../../ui/Segmented';
import { useTable, useTableStore } from '../table-context';

const USUAL_PERCENT = 5;

/** What is ordered beyond what the floor takes, and whether an edging is bought. */
export function Beyond() {
  const table = useTableStore();
  const document = useTable((state) => state.document);
  const spares = document.order?.spares ?? { rule: 'percent' as const, value: USUAL_PERCENT };
  const set = (field: readonly string[], value: number | boolean | undefined) =>
    table.getState().edit((now) => assumptionSet(now, field, value));
  const refuse = (field: readonly string[]) => (value: number) =>
    assumptionRefused(document, field, value);
  return (
    <section aria-label="Beyond what is laid" className="space-y-3">
      <h3 className="border-b border-graphite pb-1">Beyond what is laid</h3>
      <div className="grid grid-cols-[1fr_7rem] items-end gap-2">
        <Segmented
          label="Spare units"
          value={spares.rule}
          options={[
            ['percent', 'Per cent'],
            ['count', 'So many'],
          ]}
          onChange={(rule) => table.getState().edit((now) => sparesRuled(now, rule))}
        />
        <NumberField
          label={spares.rule === 'percent' ? 'Of each kind' : 'Of each kind and tone'}
          hideLabel
          value={spares.value}
          suffix={spares.rule === 'percent' ? '\u202f%' : ''}
          refuse={refuse(['order', 'spares', 'value'])}
          onNumber={(value) => set(['order', 'spares', 'value'], value)}
        />
      </div>
      <div className="grid grid-cols-[1fr_7rem] items-center gap-2">
        <span className="text-sm text-slate">Stone and sand, for what is spilled</span>
        <NumberField
          label="Stone and sand beyond what is worked out"
          hideLabel
          value={document.order?.extra ?? USUAL_PERCENT}
          suffix={'\u202f%'}
          refuse={refuse(['order', 'extra'])}
          onNumber={(value) => set(['order', 'extra'], value)}
        />
      </div>
      <label className="flex min-h-11 items-center gap-3">
        <input
          type="checkbox"
          className="size-5 accent-(--line)"
          checked={document.materials?.edging?.wanted ?? false}
          onChange={(event) =>
            set(['materials', 'edging', 'wanted'], event.target.checked ? true : undefined)
          }
        />
        Buy an edging for the perimeter
      </label>
    </section>
  );
}

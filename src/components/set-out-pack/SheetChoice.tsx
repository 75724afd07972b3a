import { SHEET_NAMES } from '@/sheets/pack';
import { SHEET_KINDS, type NumberedSheet, type SheetKind } from '@/sheets/sheet-draft';

/** Which kinds of sheet to take: each with what it is for and how many sheets it has. */
export function SheetChoice({
  sheets,
  chosen,
  onChoose,
}: {
  readonly sheets: readonly NumberedSheet[];
  readonly chosen: ReadonlySet<SheetKind>;
  readonly onChoose: (chosen: ReadonlySet<SheetKind>) => void;
}) {
  const kinds = SHEET_KINDS.filter((kind) => sheets.some((sheet) => sheet.kinds.includes(kind)));
  const change = (kind: SheetKind) => {
    const next = new Set(chosen);
    if (!next.delete(kind)) next.add(kind);
    onChoose(next);
  };
  return (
    <fieldset>
      <legend className="field-label">Sheets</legend>
      <div className="hairlines border-y border-stone-300">
        {kinds.map((kind) => {
          const count = sheets.filter((sheet) => sheet.kinds.includes(kind)).length;
          return (
            <label
              key={kind}
              className="flex cursor-pointer items-start gap-3 py-2 max-md:min-h-11"
            >
              <input
                type="checkbox"
                className="mt-1 size-4 shrink-0 accent-graphite"
                checked={chosen.has(kind)}
                onChange={() => change(kind)}
              />
              <span className="min-w-0 flex-1">
                <span className="font-semibold">{SHEET_NAMES[kind].name}</span>
                <span className="block text-sm text-slate">{SHEET_NAMES[kind].use}</span>
              </span>
              <span className="text-slate">{count === 1 ? '1 sheet' : `${count} sheets`}</span>
            </label>
          );
        })}
      </div>
    </fieldset>
  );
}

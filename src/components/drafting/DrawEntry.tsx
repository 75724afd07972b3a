import { forwardRef, useImperativeHandle, useRef, useState } from 'react';
import { formatLength, parseLength } from '@/paving/length';
import { edgeRefused } from './field-limits';
import { useTable, useTableStore } from './table-context';
import { cornerPlaced, ringClosed, typedCorner } from './tools/draw-ring';

export interface DrawEntryHandle {
  type(text: string): void;
}

/** Length and direction of the side being drawn, typed while drawing. */
export const DrawEntry = forwardRef<DrawEntryHandle>(function DrawEntry(_, ref) {
  const table = useTableStore();
  const drawing = useTable((state) => state.drawing);
  const display = useTable((state) => state.document.display);
  const [length, setLength] = useState('');
  const [direction, setDirection] = useState('');
  const [wrong, setWrong] = useState<string | null>(null);
  const field = useRef<HTMLInputElement>(null);

  const take = (lengthText: string, directionText: string) => {
    const now = table.getState().drawing;
    if (!now) return;
    const parsed = lengthText.trim() === '' ? null : parseLength(lengthText, display);
    const bare = directionText.replace(/[°\s]/g, '').replace(',', '.').replace('−', '-');
    const angle = bare === '' ? null : Number(bare);
    const fault =
      (parsed && (parsed.ok ? edgeRefused(parsed.mm) : parsed.message)) ??
      (angle !== null && !Number.isFinite(angle)
        ? 'Type the direction in degrees, such as 90.'
        : null);
    setWrong(fault);
    // A direction given with an arrow key holds while the field for it is empty.
    const kept = directionText === '' ? now.directionDeg : null;
    const next = {
      ...now,
      lengthMm: !fault && parsed?.ok ? parsed.mm : null,
      directionDeg: angle !== null && Number.isFinite(angle) ? angle : kept,
    };
    table.getState().set({ drawing: { ...next, next: typedCorner(next, now.next) ?? now.next } });
  };
  useImperativeHandle(ref, () => ({
    type(text) {
      setLength(text);
      take(text, direction);
      field.current?.focus();
    },
  }));
  if (!drawing) return null;
  const last = drawing.corners.at(-1);
  const live =
    last && drawing.next ? Math.hypot(drawing.next[0] - last[0], drawing.next[1] - last[1]) : null;
  const angle =
    last && drawing.next
      ? (Math.atan2(drawing.next[1] - last[1], drawing.next[0] - last[0]) * 180) / Math.PI
      : null;
  const place = () => {
    const now = table.getState().drawing;
    if (!now) return;
    const next =
      typedCorner(now, now.next) ??
      now.next ??
      (now.corners.length === 0 ? ([0, 0] as const) : null);
    if (wrong || !next) return;
    setLength('');
    setDirection('');
    cornerPlaced(table, next);
  };
  return (
    <form
      className="absolute top-2 left-2 z-10 flex max-w-[calc(100%-1rem)] flex-wrap md:top-3 md:left-3 items-end gap-2 border border-line bg-stone-50 p-2"
      aria-label="The side being drawn"
      onSubmit={(event) => {
        event.preventDefault();
        place();
      }}
      onKeyDown={(event) => {
        if (event.key === 'Escape') (event.target as HTMLElement).blur();
      }}
    >
      <label className="block w-28 md:w-32">
        <span className="field-label">Length</span>
        <input
          ref={field}
          className="field text-right"
          autoComplete="off"
          value={length}
          disabled={!last}
          placeholder={live === null ? '' : formatLength(live, display)}
          onChange={(event) => {
            setLength(event.target.value);
            take(event.target.value, direction);
          }}
        />
      </label>
      <label className="block w-20 md:w-24">
        <span className="field-label">Direction</span>
        <input
          className="field text-right"
          autoComplete="off"
          inputMode="decimal"
          value={direction}
          disabled={!last}
          placeholder={angle === null ? '' : `${Number(angle.toFixed(1))}°`}
          onChange={(event) => {
            setDirection(event.target.value);
            take(length, event.target.value);
          }}
        />
      </label>
      <button type="submit" className="button" disabled={wrong !== null}>
        Put corner
      </button>
      <button
        type="button"
        className="button button-primary max-md:hidden"
        disabled={drawing.corners.length < 3}
        onClick={() => ringClosed(table)}
      >
        Close
      </button>
      {wrong && <p className="w-full text-sm text-brick">{wrong}</p>}
    </form>
  );
});

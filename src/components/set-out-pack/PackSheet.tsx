import { useEffect, useMemo, useRef, useState, type CSSProperties } from 'react';
import type { NumberedSheet } from '@/sheets/sheet-draft';
import { drawingSvg } from '@/sheets/svg-sink';

/** The page of paper that a sheet is printed on: sheets of one pack lie and stand. */
export const pageName = ({ width, height }: Pick<NumberedSheet, 'width' | 'height'>): string =>
  `sheet-${Math.round(width)}-${Math.round(height)}`;

/** One sheet on screen, drawn once it comes near: a pack may have dozens. */
export function PackSheet({
  sheet,
  number,
  of,
  printing,
}: {
  readonly sheet: NumberedSheet;
  readonly number: number;
  readonly of: number;
  /** On paper every sheet is drawn, near or not. */
  readonly printing: boolean;
}) {
  const box = useRef<HTMLDivElement>(null);
  const [near, setNear] = useState(false);
  useEffect(() => {
    const watch = new IntersectionObserver(
      (entries) => {
        if (entries.some(({ isIntersecting }) => isIntersecting)) setNear(true);
      },
      { rootMargin: '800px' },
    );
    watch.observe(box.current!);
    return () => watch.disconnect();
  }, []);
  const title = `Sheet ${number} of ${of}: ${sheet.type}`;
  const shown = near || printing;
  const svg = useMemo(() => (shown ? drawingSvg(sheet, { title }) : ''), [shown, sheet, title]);
  return (
    <figure
      className="mx-auto mb-8 w-full max-w-[85rem] print:m-0 print:max-w-none"
      data-sheet-page={pageName(sheet)}
      style={{ page: pageName(sheet) }}
    >
      <figcaption className="mb-1 flex justify-between gap-4 text-slate print:hidden">
        <span>{sheet.type}</span>
        <span>
          {number} / {of}
        </span>
      </figcaption>
      <div
        ref={box}
        role="img"
        aria-label={title}
        data-sheet
        style={
          {
            aspectRatio: `${sheet.width} / ${sheet.height}`,
            '--sheet-width': `${sheet.width}mm`,
            '--sheet-height': `${sheet.height}mm`,
          } as CSSProperties
        }
        className="border border-stone-300 bg-white [&>svg]:block [&>svg]:h-auto [&>svg]:w-full"
        dangerouslySetInnerHTML={{ __html: svg }}
      />
    </figure>
  );
}

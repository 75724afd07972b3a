import { useEffect, useMemo, useRef, useState } from 'react';
import type { NumberedSheet } from '@/sheets/sheet-draft';
import { drawingSvg } from '@/sheets/svg-sink';

/** One sheet on screen, drawn once it comes near: a pack may have dozens. */
export function PackSheet({
  sheet,
  number,
  of,
}: {
  readonly sheet: NumberedSheet;
  readonly number: number;
  readonly of: number;
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
  const svg = useMemo(() => (near ? drawingSvg(sheet, { title }) : ''), [near, sheet, title]);
  return (
    <figure className="mx-auto mb-8 w-full max-w-[85rem]">
      <figcaption className="mb-1 flex justify-between gap-4 text-slate">
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
        style={{ aspectRatio: `${sheet.width} / ${sheet.height}` }}
        className="border border-stone-300 bg-white [&>svg]:block [&>svg]:h-auto [&>svg]:w-full"
        dangerouslySetInnerHTML={{ __html: svg }}
      />
    </figure>
  );
}

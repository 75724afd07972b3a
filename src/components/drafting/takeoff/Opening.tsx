import { ChevronRight } from 'lucide-react';
import type { ReactNode } from 'react';

/** A line with its figure that opens to how it came about. */
export function Opening({
  name,
  figure,
  under,
  children,
}: {
  name: string;
  figure: string;
  under?: ReactNode;
  children: ReactNode;
}) {
  return (
    <li>
      <details className="group">
        <summary className="grid min-h-11 list-none grid-cols-[auto_1fr_auto] items-center gap-x-2 py-1.5 hover:bg-stone-100 [&::-webkit-details-marker]:hidden">
          <ChevronRight
            size={16}
            aria-hidden
            className="shrink-0 text-slate group-open:rotate-90"
          />
          <span className="min-w-0 text-[0.95rem]">{name}</span>
          <span className="max-w-[10.5rem] text-right font-semibold">{figure}</span>
          {under && (
            <span className="col-span-2 col-start-2 flex justify-end gap-3 text-sm text-slate">
              {under}
            </span>
          )}
        </summary>
        <div className="mb-2 border-l-2 border-stone-300 pl-3">{children}</div>
      </details>
    </li>
  );
}

import { Dialog as Base } from '@base-ui/react/dialog';
import { X } from 'lucide-react';
import { useRef, type ReactNode } from 'react';

interface Props {
  readonly open: boolean;
  readonly onClose: () => void;
  readonly title: string;
  readonly children: ReactNode;
  readonly wide?: boolean;
}

/** A dialog in the look of the house: a ruled sheet over a dimmed page. */
export function Dialog({ open, onClose, title, children, wide }: Props) {
  const sheet = useRef<HTMLDivElement>(null);
  return (
    <Base.Root open={open} onOpenChange={(next) => !next && onClose()}>
      <Base.Portal>
        <Base.Backdrop className="fixed inset-0 z-40 bg-graphite/40 dark:bg-stone-50/60" />
        <Base.Popup
          initialFocus={() =>
            sheet.current?.querySelector<HTMLElement>('input, textarea, select') ?? true
          }
          className={`fixed top-1/2 left-1/2 z-50 flex max-h-[92dvh] w-[calc(100vw-1.5rem)] -translate-x-1/2 -translate-y-1/2 flex-col border border-graphite bg-stone-50 outline-none ${wide ? 'max-w-4xl' : 'max-w-lg'}`}
        >
          <div className="flex items-center justify-between border-b border-graphite px-5 py-2">
            <Base.Title className="text-[1.15rem] font-bold">{title}</Base.Title>
            <Base.Close className="button button-quiet" aria-label="Close">
              <X size={18} aria-hidden />
            </Base.Close>
          </div>
          <div ref={sheet} tabIndex={0} className="overflow-y-auto px-5 py-4">
            {children}
          </div>
        </Base.Popup>
      </Base.Portal>
    </Base.Root>
  );
}

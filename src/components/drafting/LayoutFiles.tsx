import { FolderOpen, Save } from 'lucide-react';
import { useState, type DragEvent, type ReactNode } from 'react';
import { Dialog } from '../ui/Dialog';
import { LayoutFileButton } from '../ui/LayoutFileButton';
import { layoutOfFile, layoutSaved } from '../ui/layout-files';
import { zoomToFit } from './FloorStage';
import { useTableStore } from './table-context';

/** What was wrong with a file, by its name. */
interface Refused {
  readonly name: string;
  readonly reasons: readonly string[];
}

/** Puts a file's floor on the table as one undo step; what is wrong with it is said and nothing changes. */
export function useLayoutOpening() {
  const table = useTableStore();
  const [refused, setRefused] = useState<Refused | null>(null);
  const open = async (file: File) => {
    const read = await layoutOfFile(file);
    if (!read.ok) return setRefused({ name: file.name, reasons: read.reasons });
    const { edit, set } = table.getState();
    set({ pick: null, drawing: null, unit: null, spot: null, point: null });
    edit(() => read.document);
    zoomToFit(table);
    set({ said: `“${file.name}” is on the table. Undo brings back what was there.` });
  };
  return { open, refused, dismiss: () => setRefused(null) };
}

/** Takes layout files that are dropped on what is inside. */
export function LayoutDrop({
  onFile,
  children,
}: {
  onFile: (file: File) => void;
  children: ReactNode;
}) {
  const [over, setOver] = useState(false);
  const carriesFiles = (event: DragEvent) => event.dataTransfer.types.includes('Files');
  return (
    <div
      className="relative min-h-0 flex-1"
      onDragOver={(event) => {
        if (!carriesFiles(event)) return;
        event.preventDefault();
        setOver(true);
      }}
      onDragLeave={(event) => {
        if (!event.currentTarget.contains(event.relatedTarget as Node | null)) setOver(false);
      }}
      onDrop={(event) => {
        if (!carriesFiles(event)) return;
        event.preventDefault();
        setOver(false);
        const [file] = event.dataTransfer.files;
        if (file) onFile(file);
      }}
    >
      {children}
      {over && (
        <p className="pointer-events-none absolute inset-2 flex items-center justify-center border-2 border-dashed border-line bg-stone-50/85 p-4 text-center font-semibold">
          Drop a layout file here to put it on the table
        </p>
      )}
    </div>
  );
}

/** Why a file was not opened. */
export function LayoutRefused({
  refused,
  onClose,
}: {
  refused: Refused | null;
  onClose: () => void;
}) {
  return (
    <Dialog open={refused !== null} onClose={onClose} title="This file was not opened">
      <p className="wrap-anywhere">“{refused?.name}” cannot be put on the table:</p>
      <ul className="mt-2 list-disc space-y-1 pl-5" role="alert">
        {refused?.reasons.map((words) => (
          <li key={words}>{words}</li>
        ))}
      </ul>
      <p className="mt-3 text-slate">What is on the table stays as it is.</p>
    </Dialog>
  );
}

/** The layout as a file: opened here, and saved from here. */
export function LayoutFiles({ name, onFile }: { name: string; onFile: (file: File) => void }) {
  const table = useTableStore();
  return (
    <section aria-label="Layout file" className="border-t border-graphite pt-3">
      <h2 className="text-base">Layout file</h2>
      <p className="mt-1 text-sm text-slate">
        The floor alone, without versions and prices, to keep or to hand on. Opening one replaces
        the floor on the table, in one step that Undo takes back. You can also drop it on the floor.
      </p>
      <div className="mt-2 flex flex-wrap gap-2">
        <LayoutFileButton onFile={onFile}>
          <FolderOpen size={16} aria-hidden /> Open a layout file
        </LayoutFileButton>
        <button
          type="button"
          className="button"
          onClick={() => layoutSaved(table.getState().document, name)}
        >
          <Save size={16} aria-hidden /> Save as a layout file
        </button>
      </div>
    </section>
  );
}

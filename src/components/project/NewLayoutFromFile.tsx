import { useMutation } from '@tanstack/react-query';
import { useState } from 'react';
import type { LayoutSummary } from '@/api-types/layouts';
import { api, type ApiError } from '../ui/api';
import { LayoutFileButton } from '../ui/LayoutFileButton';
import { layoutNameOf, layoutOfFile } from '../ui/layout-files';
import { Queries } from '../ui/Queries';

/** A new layout out of a layout file, named after it. */
export default function NewLayoutFromFile({ projectId }: { projectId: string }) {
  return (
    <Queries>
      <FromFile projectId={projectId} />
    </Queries>
  );
}

function FromFile({ projectId }: { projectId: string }) {
  const [wrong, setWrong] = useState<{ name: string; reasons: readonly string[] } | null>(null);
  const make = useMutation<LayoutSummary | null, ApiError, File>({
    networkMode: 'always',
    mutationFn: async (file) => {
      setWrong(null);
      const read = await layoutOfFile(file);
      if (!read.ok) {
        setWrong({ name: file.name, reasons: read.reasons });
        return null;
      }
      return api('POST', `/api/projects/${projectId}/layouts`, {
        name: layoutNameOf(file),
        document: read.document,
      });
    },
    onSuccess: (layout) => {
      if (layout) location.assign(`/layouts/${layout.id}`);
    },
  });
  return (
    <div className="mt-4 border-t border-stone-300 pt-4">
      <LayoutFileButton disabled={make.isPending} onFile={make.mutate}>
        {make.isPending ? 'Opening …' : 'Open a layout file'}
      </LayoutFileButton>
      <p className="mt-1 text-sm text-slate">
        It becomes a layout of this project, named after the file. One is saved from the drafting
        table, under Versions.
      </p>
      {wrong && (
        <div role="alert" className="mt-2 border-t-2 border-brick bg-brick-wash px-3 py-2">
          <p className="wrap-anywhere">“{wrong.name}” was not opened:</p>
          <ul className="mt-1 list-disc pl-5">
            {wrong.reasons.map((words) => (
              <li key={words}>{words}</li>
            ))}
          </ul>
        </div>
      )}
      {make.error && (
        <p role="alert" className="mt-2 text-brick">
          {make.error.message}
        </p>
      )}
    </div>
  );
}

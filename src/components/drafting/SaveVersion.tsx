import { useMutation, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import type { SaveVersion as SaveVersionBody, VersionDetail } from '@/api-types/versions';
import { formatLength } from '@/paving/length';
import { api, ApiError } from '../ui/api';
import { Dialog } from '../ui/Dialog';
import type { DraftSync } from './draft-sync';
import { FloorProblems } from './FloorFigures';
import { useSettledFloor, useTableStore } from './table-context';

interface Props {
  readonly open: boolean;
  readonly onClose: () => void;
  readonly layoutId: string;
  readonly number: number;
  readonly sync: DraftSync;
}

const newRequestId = () =>
  crypto.randomUUID?.() ?? `${Date.now()}-${Math.random().toString(36).slice(2)}`;

/** Freezes the draft as the next version, once the server holds all of it. */
export function SaveVersion({ open, onClose, layoutId, number, sync }: Props) {
  const table = useTableStore();
  const floor = useSettledFloor();
  const queries = useQueryClient();
  const [label, setLabel] = useState('');
  const [note, setNote] = useState('');
  // Sent again after a lost answer, the same id gets the version that the first try made.
  const [requestId, setRequestId] = useState(newRequestId);

  const save = useMutation({
    networkMode: 'always',
    mutationFn: async () => {
      const baseRevision = await sync.flush();
      if (baseRevision === null)
        throw new ApiError(
          0,
          null,
          'The draft has not reached the server yet, so there is nothing to freeze. It is kept on this device.',
        );
      const body: SaveVersionBody = { baseRevision, label: label.trim(), note, requestId };
      return api<VersionDetail>('POST', `/api/layouts/${layoutId}/versions`, body);
    },
    onSuccess: async (version) => {
      const { report } = version;
      const gap =
        report.leastGap === null
          ? ''
          : `, ${formatLength(report.leastGap, version.document.display)} least gap`;
      table.getState().goTo('versions');
      table
        .getState()
        .set({ said: `Version ${version.number} saved. ${report.wholeUnits} whole units${gap}.` });
      setLabel('');
      setNote('');
      setRequestId(newRequestId());
      await queries.invalidateQueries({ queryKey: ['versions', layoutId] });
      onClose();
    },
  });

  return (
    <Dialog open={open} onClose={onClose} title={`Save version ${number}`}>
      {floor.problems.length > 0 ? (
        <FloorProblems />
      ) : (
        <form
          className="space-y-4"
          onSubmit={(event) => {
            event.preventDefault();
            save.mutate();
          }}
        >
          <p className="text-slate">
            A version is frozen as it stands: drawing, figures and date. It can’t be altered or
            deleted afterwards.
          </p>
          <div>
            <label className="field-label" htmlFor="version-label">
              Label
            </label>
            <input
              id="version-label"
              className="field"
              value={label}
              maxLength={80}
              required
              autoFocus
              placeholder="Most slabs"
              onChange={(event) => setLabel(event.target.value)}
            />
          </div>
          <div>
            <label className="field-label" htmlFor="version-note">
              Note
            </label>
            <textarea
              id="version-note"
              className="field min-h-24"
              value={note}
              maxLength={4000}
              onChange={(event) => setNote(event.target.value)}
            />
          </div>
          {save.error && (
            <p role="alert" className="text-brick">
              {save.error.message}
            </p>
          )}
          <button type="submit" className="button button-primary w-full" disabled={save.isPending}>
            {save.isPending ? 'Saving …' : `Save version ${number}`}
          </button>
        </form>
      )}
    </Dialog>
  );
}

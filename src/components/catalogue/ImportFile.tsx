import { useMutation } from '@tanstack/react-query';
import { useId, useState } from 'react';
import type { ImportOutlook } from '@/api-types/catalogue';
import { formatCount } from '@/paving/count';
import { ApiError } from '../ui/api';
import { Dialog } from '../ui/Dialog';
import { KIND_WORDS } from './catalogue-words';

const send = async (file: File, how: 'look' | 'take'): Promise<ImportOutlook> => {
  let response: Response;
  try {
    response = await fetch(`/api/catalogue/import?how=${how}`, {
      method: 'POST',
      headers: { 'content-type': 'text/csv' },
      body: file,
    });
  } catch {
    throw new ApiError(0, null, 'The server could not be reached. Nothing was read in; try again.');
  }
  const answer = await response.json().catch(() => null);
  if (!response.ok)
    throw new ApiError(response.status, answer, answer?.detail ?? 'That did not work. Try again.');
  return answer as ImportOutlook;
};

const things = (n: number, what: string) => `${formatCount(n)} ${what}${n === 1 ? '' : 's'}`;

const outlookWords = ({ added, changed, same }: ImportOutlook) =>
  `${things(added, 'new item')}, ${things(changed, 'changed item')}, ${formatCount(same)} as ${same === 1 ? 'it is' : 'they are'}`;

/** Reads a file into the catalogue: first shown what it would do, then all of it or nothing. */
export function ImportFile({
  open,
  onClose,
  onTaken,
}: {
  open: boolean;
  onClose: () => void;
  onTaken: (said: string) => void;
}) {
  const id = useId();
  const [file, setFile] = useState<File | null>(null);
  const look = useMutation<ImportOutlook, ApiError, File>({
    networkMode: 'always',
    mutationFn: (chosen) => send(chosen, 'look'),
  });
  const close = () => {
    setFile(null);
    look.reset();
    take.reset();
    onClose();
  };
  const take = useMutation<ImportOutlook, ApiError, File>({
    networkMode: 'always',
    mutationFn: (chosen) => send(chosen, 'take'),
    onSuccess: (outlook) => {
      if (!outlook.taken) return;
      onTaken(`The file is read in: ${outlookWords(outlook)}.`);
      close();
    },
  });
  const outlook = take.data ?? look.data;
  const error = take.error ?? look.error;
  return (
    <Dialog open={open} onClose={close} title="Read in a file" wide>
      <p>
        A CSV file whose first line names the columns: Kind, Name, Supplier, Pack, Pack holds,
        Measure, Price, Length, Width, Thickness and the others of{' '}
        <a className="link" href="/api/catalogue/export" download="catalogue.csv">
          the catalogue’s own file
        </a>
        . An item is known again by its reference, or by its name and supplier.
      </p>
      <div className="mt-3 max-w-md">
        <label htmlFor={id} className="field-label">
          File
        </label>
        <input
          id={id}
          type="file"
          accept=".csv,.txt,.tsv,text/csv,text/plain"
          className="field"
          onChange={(event) => {
            const chosen = event.target.files?.[0] ?? null;
            take.reset();
            look.reset();
            setFile(chosen);
            if (chosen) look.mutate(chosen);
          }}
        />
      </div>
      {look.isPending && <p className="mt-3 text-slate">Reading the file …</p>}
      {error && (
        <p role="alert" className="mt-3 text-brick">
          {error.message}
        </p>
      )}
      {outlook && file && (
        <>
          {outlook.problemCount > 0 ? (
            <Problems outlook={outlook} />
          ) : (
            <Rows outlook={outlook} name={file.name} />
          )}
          {outlook.unknownColumns.length > 0 && (
            <p className="mt-3 text-sm text-slate">
              Passed over, since these headings mean nothing here:{' '}
              {outlook.unknownColumns.join(', ')}.
            </p>
          )}
          <div className="mt-4 flex flex-wrap gap-2">
            <button
              type="button"
              className="button button-primary"
              disabled={
                outlook.problemCount > 0 || take.isPending || outlook.added + outlook.changed === 0
              }
              onClick={() => take.mutate(file)}
            >
              {take.isPending ? 'Reading it in …' : 'Read it in'}
            </button>
            <button type="button" className="button button-quiet" onClick={close}>
              Not now
            </button>
          </div>
        </>
      )}
    </Dialog>
  );
}

function Problems({ outlook }: { outlook: ImportOutlook }) {
  const { problems, problemCount } = outlook;
  return (
    <section aria-label="What is wrong" className="mt-4">
      <p role="alert" className="font-semibold text-brick">
        {things(problemCount, 'thing')} to put right. Nothing was read in.
      </p>
      <div className="mt-2 max-h-72 overflow-auto border-y border-stone-300">
        <table className="w-full">
          <thead>
            <tr className="border-b border-graphite text-left text-sm text-slate">
              <th scope="col" className="py-1 pr-4 text-right font-normal">
                Line
              </th>
              <th scope="col" className="py-1 pr-4 font-normal">
                Column
              </th>
              <th scope="col" className="py-1 font-normal">
                Why
              </th>
            </tr>
          </thead>
          <tbody className="hairlines">
            {problems.map(({ line, column, message }, n) => (
              <tr key={n}>
                <td className="py-1 pr-4 text-right align-top font-semibold">{line}</td>
                <td className="py-1 pr-4 align-top">{column ?? 'the row'}</td>
                <td className="py-1 wrap-anywhere">{message}</td>
              </tr>
            ))}
          </tbody>
        </table>
      </div>
      {problemCount > problems.length && (
        <p className="mt-1 text-sm text-slate">
          The first {problems.length} of them. Put these right and read the file again.
        </p>
      )}
    </section>
  );
}

const WHAT = { add: 'new', change: 'changed', same: 'as it is' } as const;

function Rows({ outlook, name }: { outlook: ImportOutlook; name: string }) {
  const { rows, added, changed, same, newSuppliers } = outlook;
  return (
    <section aria-label="What it would do" className="mt-4">
      <p className="font-semibold">
        {name}: {outlookWords(outlook)}.
      </p>
      {newSuppliers.length > 0 && (
        <p className="mt-1">
          New suppliers, by name only: {newSuppliers.slice(0, 10).join(', ')}
          {newSuppliers.length > 10 && ` and ${newSuppliers.length - 10} more`}.
        </p>
      )}
      <ul className="mt-2 max-h-72 hairlines overflow-auto border-y border-stone-300">
        {rows.map((row) => (
          <li key={row.line} className="flex flex-wrap items-baseline gap-x-3 py-1">
            <span className="w-20 shrink-0 text-sm text-slate">{WHAT[row.what]}</span>
            <span className={row.what === 'same' ? 'text-slate' : 'font-semibold'}>{row.name}</span>
            <span className="text-sm text-slate">
              {[KIND_WORDS[row.kind], ...row.changes].join(' · ')}
            </span>
          </li>
        ))}
      </ul>
      {added + changed + same > rows.length && (
        <p className="mt-1 text-sm text-slate">The first {rows.length} of them.</p>
      )}
    </section>
  );
}

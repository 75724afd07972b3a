import { useState } from 'react';
import { levelsChanged } from '@/paving/level-edits';
import { documentLevels, GREATEST_SPOTS, spotClashes } from '@/paving/levels';
import type { BareUnit } from '@/paving/cell-list';
import { parseSpotList, type SpotListProblem } from '@/paving/spot-list';
import { Dialog } from '../../ui/Dialog';
import { LengthField } from '../../ui/LengthField';
import { Segmented } from '../../ui/Segmented';
import { zoomToFit } from '../FloorStage';
import { useTable, useTableStore } from '../table-context';

const MOST_PROBLEMS = 12;

/** A list of spots pasted or opened: read as a whole, or refused line by line. */
export function SpotPaste({ open, onClose }: { open: boolean; onClose: () => void }) {
  return (
    <Dialog open={open} onClose={onClose} title="Paste a list of spots">
      {open && <PasteForm onClose={onClose} />}
    </Dialog>
  );
}

function PasteForm({ onClose }: { onClose: () => void }) {
  const table = useTableStore();
  const document = useTable((state) => state.document);
  const { display } = document;
  const { spots: had } = documentLevels(document);
  const [text, setText] = useState('');
  const [bare, setBare] = useState<BareUnit>(display === 'metric' ? 'mm' : 'in');
  const [datum, setDatum] = useState(0);
  const [keep, setKeep] = useState<'add' | 'replace'>(had.length > 0 ? 'replace' : 'add');
  const [problems, setProblems] = useState<readonly SpotListProblem[]>([]);

  const take = () => {
    const parsed = parseSpotList(text, { display, bare, datum });
    if (!parsed.ok) return setProblems(parsed.problems);
    const spots = keep === 'replace' ? [...parsed.spots] : [...had, ...parsed.spots];
    const clash = spotClashes(spots)[0];
    if (clash) {
      return setProblems([
        {
          line: parsed.lines[clash[1] - had.length],
          message: `is the same place as spot ${clash[0] + 1}, which the floor has already. Leave it out, or replace the spots there are.`,
        },
      ]);
    }
    if (spots.length > GREATEST_SPOTS) {
      return setProblems([
        {
          line: 1,
          message: `makes ${spots.length} spots in all; a floor may have ${GREATEST_SPOTS}.`,
        },
      ]);
    }
    table.getState().edit((now) => levelsChanged(now, { spots }));
    table.getState().set({
      spot: null,
      said: `${parsed.spots.length === 1 ? 'One spot' : `${parsed.spots.length} spots`} taken from the list.`,
    });
    zoomToFit(table);
    onClose();
  };

  return (
    <div className="space-y-4">
      <p>
        One spot to a line: across, up, level; a name before them if you like. Headings are read too
        (name, x, y, level). Cells are parted by commas, semicolons or tabs, as a spreadsheet copies
        them.
      </p>
      <div>
        <label className="field-label" htmlFor="spot-list">
          The list
        </label>
        <textarea
          id="spot-list"
          className="field h-44 font-mono text-[0.9rem]"
          spellCheck={false}
          placeholder={'A, 0, 0, -40\nB, 6400, 0, -260\nC, 3200, 1500, -120'}
          value={text}
          onChange={(event) => {
            setText(event.target.value);
            setProblems([]);
          }}
        />
        <label className="link mt-1 inline-flex min-h-11 cursor-pointer items-center">
          Open a file instead
          <input
            type="file"
            accept=".csv,.txt,text/csv,text/plain"
            className="sr-only"
            onChange={async (event) => {
              const [file] = event.target.files ?? [];
              if (file) setText(await file.text());
              setProblems([]);
            }}
          />
        </label>
      </div>
      {problems.length > 0 && (
        <div role="alert" className="border-t-2 border-brick bg-brick-wash px-3 py-2">
          <p className="font-semibold">
            {problems.length === 1 ? 'One line' : `${problems.length} lines`} cannot be read.
            Nothing was taken yet.
          </p>
          <ul className="mt-1 space-y-1">
            {problems.slice(0, MOST_PROBLEMS).map(({ line, message }) => (
              <li key={`${line} ${message}`}>
                <b>Line {line}</b> {message}
              </li>
            ))}
            {problems.length > MOST_PROBLEMS && <li>and {problems.length - MOST_PROBLEMS} more</li>}
          </ul>
        </div>
      )}
      <div className="grid gap-4 sm:grid-cols-2">
        <Segmented
          label="A bare number is in"
          value={bare}
          options={
            display === 'metric'
              ? [
                  ['mm', 'millimetres'],
                  ['m', 'metres'],
                ]
              : [
                  ['in', 'inches'],
                  ['ft', 'feet'],
                ]
          }
          onChange={setBare}
        />
        <LengthField
          label="The list calls the edge’s top"
          mm={datum}
          display={display}
          onLength={setDatum}
        />
      </div>
      {had.length > 0 && (
        <Segmented
          label={`The floor has ${had.length} ${had.length === 1 ? 'spot' : 'spots'}`}
          value={keep}
          options={[
            ['replace', 'Replace them'],
            ['add', 'Add to them'],
          ]}
          onChange={setKeep}
        />
      )}
      <div className="flex justify-end gap-2">
        <button type="button" className="button" onClick={onClose}>
          Cancel
        </button>
        <button type="button" className="button button-primary" onClick={take}>
          Take the spots
        </button>
      </div>
    </div>
  );
}

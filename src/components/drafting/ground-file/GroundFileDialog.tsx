import { useMemo, useState } from 'react';
import { formatArea } from '@/paving/area';
import type { BareUnit } from '@/paving/cell-list';
import type { GroundFile, Outline } from '@/paving/ground-file/outline';
import type { LayoutDocument } from '@/paving/layout-document';
import { formatLength, type Display } from '@/paving/length';
import { Dialog } from '../../ui/Dialog';
import { Segmented } from '../../ui/Segmented';
import { problemSubject } from '../FloorFigures';
import { zoomToFit } from '../FloorStage';
import { planPath, planView, PLAN_WIDE } from '../plan-view';
import { useTable, useTableStore } from '../table-context';

type Reader = typeof import('@/paving/ground-file/ground-file');
type Checker = typeof import('@/paving/ring-validation');

/** An outline of the ground from a file: points, a DXF drawing or GeoJSON. */
export function GroundFileDialog({ open, onClose }: { open: boolean; onClose: () => void }) {
  return (
    <Dialog open={open} onClose={onClose} title="Open the edge from a file" wide>
      {open && <FileSheet onClose={onClose} />}
    </Dialog>
  );
}

/** What has been opened, as text: it is read anew when the unit is said. */
interface Opened {
  readonly name: string;
  readonly text: string;
  readonly reader: Reader;
  readonly checker: Checker;
}

/** Larger files are no outline of a floor. */
const GREATEST_BYTES = 20_000_000;

function FileSheet({ onClose }: { onClose: () => void }) {
  const display = useTable((state) => state.document.display);
  const [opened, setOpened] = useState<Opened | null>(null);
  const [wrong, setWrong] = useState<string | null>(null);
  const [typed, setTyped] = useState('');
  const [bare, setBare] = useState<BareUnit>(display === 'metric' ? 'm' : 'ft');

  const read = async (name: string, text: string) => {
    setWrong(null);
    try {
      // What reads drawings is only fetched once there is one.
      const [reader, checker] = await Promise.all([
        import('@/paving/ground-file/ground-file'),
        import('@/paving/ring-validation'),
      ]);
      setOpened({ name, text, reader, checker });
    } catch {
      setWrong('What reads files could not be fetched. Try again once there is signal.');
    }
  };
  const choose = async (file: File | undefined) => {
    if (!file) return;
    if (file.size > GREATEST_BYTES)
      return setWrong(
        `${file.name} is larger than 20 MB. Save the outline of the floor alone, without the rest of the drawing.`,
      );
    await read(file.name, await file.text());
  };
  const file = useMemo(
    () => opened && opened.reader.groundFile(opened.name, opened.text, { display, bare }),
    [opened, display, bare],
  );

  return (
    <div className="space-y-4">
      {!(file?.ok && opened) && (
        <>
          <p>
            A list of corners (CSV: across, up, one corner to a line, in order round the edge), a
            DXF drawing with the edge as a closed line, or GeoJSON from a map.
          </p>
          <label
            className="button w-full cursor-pointer border-dashed py-6 has-focus-visible:outline-2 has-focus-visible:outline-line"
            onDragOver={(event) => event.preventDefault()}
            onDrop={(event) => {
              event.preventDefault();
              void choose(event.dataTransfer.files[0]);
            }}
          >
            Choose a file, or drop it here
            <input
              type="file"
              accept=".csv,.txt,.dxf,.geojson,.json"
              className="sr-only"
              onChange={(event) => {
                void choose(event.target.files?.[0]);
                event.target.value = '';
              }}
            />
          </label>
          <div>
            <label className="field-label" htmlFor="ground-points">
              Or paste a list of corners
            </label>
            <textarea
              id="ground-points"
              className="field h-32 font-mono text-[0.9rem]"
              spellCheck={false}
              placeholder={'A, 0, 0\nB, 7.2, 0\nC, 7.2, 3.1'}
              value={typed}
              onChange={(event) => setTyped(event.target.value)}
            />
            <button
              type="button"
              className="button mt-2"
              disabled={typed.trim() === ''}
              onClick={() => void read('', typed)}
            >
              Read the list
            </button>
          </div>
        </>
      )}
      {(wrong ?? (file && !file.ok)) && (
        <div role="alert" className="border-t-2 border-brick bg-brick-wash px-3 py-2">
          {wrong && <p>{wrong}</p>}
          {file && !file.ok && (
            <>
              <p className="font-semibold">Nothing was taken.</p>
              {file.messages.slice(0, MOST_MESSAGES).map((message) => (
                <p key={message}>{message}</p>
              ))}
              {file.messages.length > MOST_MESSAGES && (
                <p>and {file.messages.length - MOST_MESSAGES} more</p>
              )}
            </>
          )}
        </div>
      )}
      {file && (file.ok ? file.stated === null : readsBare(opened)) && (
        <Segmented
          label="A bare number in the file is in"
          value={bare}
          options={[
            ['mm', 'millimetres'],
            ['m', 'metres'],
            ['in', 'inches'],
            ['ft', 'feet'],
          ]}
          onChange={setBare}
        />
      )}
      {file?.ok && opened && (
        <Outlines
          key={`${opened.name} ${opened.text.length}`}
          {...{ file, opened, display, onClose }}
          onAnother={() => setOpened(null)}
        />
      )}
    </div>
  );
}

const MOST_MESSAGES = 8;

/** True where what a bare number means may be why a file was refused. */
const readsBare = (opened: Opened | null): boolean =>
  opened !== null && opened.reader.groundFileKind(opened.name, opened.text) === 'points';

/** Shown as one may take it: which outline is the edge, and which are keep-outs. */
function Outlines({
  file,
  opened: { reader, checker },
  display,
  onClose,
  onAnother,
}: {
  file: Extract<GroundFile, { ok: true }>;
  opened: Opened;
  display: Display;
  onClose: () => void;
  onAnother: () => void;
}) {
  const table = useTableStore();
  const document = useTable((state) => state.document);
  const [edgeAt, setEdgeAt] = useState(0);
  const [left, setLeft] = useState<ReadonlySet<number> | null>(null);
  const edge = file.outlines[edgeAt];
  const within = reader.outlinesWithin(file.outlines, edge);
  const leftOut = left ?? leftAtFirst(file.outlines, within, reader);
  const taken = within.filter((outline) => !leftOut.has(file.outlines.indexOf(outline)));
  const ground = useMemo(() => reader.outlineGround(edge, taken), [reader, edge, taken]);
  const problems = useMemo(() => checker.ringProblems(ground), [checker, ground]);
  const size = outlineSize(edge, reader);

  const take = () => {
    table
      .getState()
      .edit(({ survey: _, ...now }): LayoutDocument => ({ ...now, ground, lifted: [] }));
    table.getState().set({
      pick: null,
      hover: null,
      said: 'The ground is taken from the file. Undo brings back the one before.',
    });
    zoomToFit(table);
    onClose();
  };

  return (
    <div className="gap-6 md:grid md:grid-cols-2">
      <OutlinePicture {...{ file, edge, taken, reader }} />
      <div className="mt-4 space-y-4 md:mt-0">
        <dl className="grid grid-cols-[auto_1fr] gap-x-4 gap-y-1">
          <dt className="text-slate">Across and up</dt>
          <dd data-testid="outline-size">
            {formatLength(size.across, display)} × {formatLength(size.up, display)}
          </dd>
          <dt className="text-slate">Area of the edge</dt>
          <dd>{formatArea(Math.abs(checker.vertexRingArea(edge.ring)) / 1e6, display)}</dd>
          <dt className="text-slate">Measured in</dt>
          <dd>{file.stated ?? 'what is said above'}</dd>
        </dl>
        {oddSize(size) ? (
          <p
            role="alert"
            className="border-l-4 border-amber bg-amber-wash px-3 py-2"
            data-testid="odd-size"
          >
            A floor is hardly ever as {oddSize(size)} as that. The unit is probably wrong:{' '}
            {file.stated === null
              ? 'choose another above.'
              : 'look at how the drawing was saved, or choose another outline.'}
          </p>
        ) : (
          <p className="text-slate">
            If the size cannot be right, the unit is wrong: check one side against a tape.
          </p>
        )}
        {file.outlines.length > 1 && (
          <label className="block">
            <span className="field-label">The edge is</span>
            <select
              className="field"
              value={edgeAt}
              onChange={(event) => {
                setEdgeAt(Number(event.target.value));
                setLeft(null);
              }}
            >
              {file.outlines.map((outline, n) => (
                <option key={n} value={n}>
                  {outlineWords(outline, n, display, checker)}
                </option>
              ))}
            </select>
          </label>
        )}
        {within.length > 0 && (
          <fieldset>
            <legend className="field-label">Keep-outs inside it</legend>
            {within.map((outline) => {
              const n = file.outlines.indexOf(outline);
              return (
                <label key={n} className="flex min-h-11 items-center gap-2">
                  <input
                    type="checkbox"
                    className="size-5 accent-line"
                    checked={!leftOut.has(n)}
                    onChange={() => {
                      const next = new Set(leftOut);
                      if (!next.delete(n)) next.add(n);
                      setLeft(next);
                    }}
                  />
                  {outlineWords(outline, n, display, checker)}
                </label>
              );
            })}
          </fieldset>
        )}
        {file.notes.map((note) => (
          <p key={note} className="text-slate">
            {note}
          </p>
        ))}
        {problems.length > 0 && (
          <div className="border-t-2 border-amber bg-amber-wash px-3 py-2">
            <p className="font-semibold">It cannot be laid as it is.</p>
            {problems.slice(0, 3).map(({ path, message }) => (
              <p key={message}>
                {problemSubject({ ...document, ground }, path)} {message}.
              </p>
            ))}
            <p>
              You can take it all the same: the place is marked on the table, to be mended there.
            </p>
          </div>
        )}
        <div className="flex flex-wrap justify-end gap-2 border-t border-graphite pt-3">
          <button type="button" className="button button-quiet mr-auto" onClick={onAnother}>
            Another file
          </button>
          <button type="button" className="button button-primary" onClick={take}>
            Use this ground
          </button>
        </div>
      </div>
    </div>
  );
}

/** More outlines than this inside an edge are no keep-outs, but whatever else is drawn there. */
const MOST_KEEP_OUTS = 12;

/** Which of the outlines inside an edge are left out until somebody says otherwise: those within another, or all of too many. */
function leftAtFirst(
  outlines: readonly Outline[],
  within: readonly Outline[],
  reader: Reader,
): ReadonlySet<number> {
  const inner =
    within.length > MOST_KEEP_OUTS
      ? within
      : within.flatMap((outline) => reader.outlinesWithin(within, outline));
  return new Set(inner.map((outline) => outlines.indexOf(outline)));
}

function outlineWords(outline: Outline, n: number, display: Display, checker: Checker): string {
  const area = formatArea(Math.abs(checker.vertexRingArea(outline.ring)) / 1e6, display);
  return `${outline.name || `Outline ${n + 1}`}, ${area}`;
}

function outlineSize(outline: Outline, reader: Reader) {
  const points = reader.outlineChords(outline);
  const xs = points.map(([x]) => x);
  const ys = points.map(([, y]) => y);
  return {
    across: Math.max(...xs) - Math.min(...xs),
    up: Math.max(...ys) - Math.min(...ys),
  };
}

/** Floors are seldom wider than this or narrower than that, mm: common practice. */
const HARDLY = { wider: 300_000, narrower: 300 };

/** How a size is odd for a floor, as it is where a drawing's unit was mistaken; null where it is not. */
function oddSize({ across, up }: { across: number; up: number }): 'large' | 'small' | null {
  if (Math.max(across, up) > HARDLY.wider) return 'large';
  return Math.max(across, up) < HARDLY.narrower ? 'small' : null;
}

/** Outlines drawn beyond this number are left out of the picture. */
const MOST_DRAWN = 300;

function OutlinePicture({
  file,
  edge,
  taken,
  reader,
}: {
  file: Extract<GroundFile, { ok: true }>;
  edge: Outline;
  taken: readonly Outline[];
  reader: Reader;
}) {
  const { height, at } = planView(reader.outlineChords(edge));
  const path = (outline: Outline) => planPath(reader.outlineChords(outline).map(at));
  return (
    <svg
      viewBox={`0 0 ${PLAN_WIDE} ${height.toFixed(0)}`}
      className="block w-full self-start border border-stone-300 bg-stone-50"
      role="img"
      aria-label={`The edge${taken.length > 0 ? ` with ${taken.length === 1 ? 'one keep-out' : `${taken.length} keep-outs`}` : ''}`}
    >
      {file.outlines.slice(0, MOST_DRAWN).map((outline, n) => (
        <path key={n} d={path(outline)} className="fill-none stroke-stone-300" strokeWidth={1} />
      ))}
      <path d={path(edge)} className="fill-stone-100 stroke-graphite" strokeWidth={2} />
      {taken.map((outline, n) => (
        <path
          key={n}
          d={path(outline)}
          className="fill-stone-50 stroke-graphite"
          strokeWidth={1.4}
        />
      ))}
    </svg>
  );
}

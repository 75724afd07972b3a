import '../version/sheet-fonts.css';
import { useEffect, useRef, useState } from 'react';
import { flushSync } from 'react-dom';
import type { SheetPack } from '@/api-types/sheet-pack';
import type { PaperName } from '@/sheets/paper';
import { PAPER_NAMES } from '@/sheets/paper';
import { SHEET_KINDS, type SheetKind } from '@/sheets/sheet-draft';
import { failureWords } from '../ui/failure-words';
import { download } from '../ui/download';
import { planFileName } from '../version/plan-file-name';
import { PackNotes } from './PackNotes';
import { PackSheet, pageName } from './PackSheet';
import { SheetChoice } from './SheetChoice';
import { Stopped, packPdf, packSvg } from './pack-files';
import { usePackSheets } from './use-pack-sheets';

type Making =
  | { readonly kind: 'idle' }
  | { readonly kind: 'making'; readonly what: string; readonly share: number | null }
  | { readonly kind: 'failed'; readonly message: string };

/** The set-out pack of a version: choose paper and sheets, look at them, take them away. */
export default function PackView({ pack }: { readonly pack: SheetPack }) {
  const { version } = pack;
  const whole = pack.sheets === 'all';
  const [paper, setPaper] = useState<PaperName | 'auto'>('auto');
  const [chosen, setChosen] = useState<ReadonlySet<SheetKind>>(new Set(SHEET_KINDS));
  const [making, setMaking] = useState<Making>({ kind: 'idle' });
  const [said, setSaid] = useState('');
  const stopped = useRef(false);
  const { drawn, hand, again } = usePackSheets(pack, paper);
  const all = drawn.kind === 'drawn' ? drawn.sheets : [];
  const taken = all
    .map((sheet, n) => ({ sheet, number: n + 1 }))
    .filter(({ sheet }) => sheet.kinds.some((kind) => chosen.has(kind)));
  const title = `${version.projectName}, ${version.layoutName}, version ${version.number}`;
  const name = planFileName(version);
  const busy = making.kind === 'making';

  const [printing, setPrinting] = useState(false);
  // Printed by the browser's own command too: what is not drawn yet is drawn before it looks.
  useEffect(() => {
    const before = () => flushSync(() => setPrinting(true));
    const after = () => setPrinting(false);
    window.addEventListener('beforeprint', before);
    window.addEventListener('afterprint', after);
    return () => {
      window.removeEventListener('beforeprint', before);
      window.removeEventListener('afterprint', after);
    };
  }, []);
  const print = () => {
    flushSync(() => setPrinting(true));
    window.print();
  };
  const pages = [...new Map(taken.map(({ sheet }) => [pageName(sheet), sheet])).entries()];

  const make = async (what: string, run: () => Promise<string>) => {
    stopped.current = false;
    setSaid('');
    setMaking({ kind: 'making', what, share: null });
    try {
      setSaid(await run());
      setMaking({ kind: 'idle' });
    } catch (error) {
      if (error instanceof Stopped) {
        setSaid(`Stopped: no ${what} was made.`);
        return setMaking({ kind: 'idle' });
      }
      const message = `The ${what} could not be made. ${failureWords(error)} Try again.`;
      setMaking({ kind: 'failed', message });
    }
  };
  const takePdf = () =>
    make('PDF', async () => {
      const told = (share: number) => setMaking({ kind: 'making', what: 'PDF', share });
      const about = { title: `${title}, set-out pack`, author: version.firmName };
      const blob = await packPdf(
        taken.map(({ sheet }) => sheet),
        about,
        told,
        () => stopped.current,
      );
      download(blob, `${name}-set-out.pdf`);
      return `The PDF is made: ${sheetCount(taken.length)}.`;
    });
  const takeSvg = () =>
    make('SVG', async () => {
      const { blob, file } = await packSvg(taken, all.length, title, name);
      download(blob, file);
      return taken.length === 1
        ? 'The SVG is made.'
        : `The SVG files are made: ${sheetCount(taken.length)} in one archive.`;
    });
  const takeText = (what: string, type: string, ending: string, text: () => Promise<string>) =>
    make(what, async () => {
      download(new Blob([await text()], { type }), `${name}${ending}`);
      return `The ${what} is made.`;
    });

  return (
    <div className="lg:flex lg:items-start print:block">
      <style>
        {pages
          .map(
            ([page, { width, height }]) =>
              `@page ${page} { size: ${width}mm ${height}mm; margin: 0 }`,
          )
          .join(' ')}
      </style>
      <div className="print:hidden space-y-5 border-b border-stone-300 p-5 lg:sticky lg:top-0 lg:max-h-dvh lg:w-96 lg:shrink-0 lg:overflow-y-auto lg:border-r lg:border-b-0">
        <h1>{whole ? 'Set-out pack' : 'Plan'}</h1>
        <PackNotes pack={pack} />
        <div>
          <label htmlFor="pack-paper" className="field-label">
            Paper
          </label>
          <select
            id="pack-paper"
            className="field w-full max-md:min-h-11"
            value={paper}
            disabled={busy}
            onChange={(event) => setPaper(event.target.value as PaperName | 'auto')}
          >
            <option value="auto">Smallest that shows the plan well</option>
            {PAPER_NAMES.map((one) => (
              <option key={one} value={one}>
                {one}
              </option>
            ))}
          </select>
        </div>
        {whole && drawn.kind === 'drawn' && (
          <SheetChoice sheets={all} chosen={chosen} onChoose={setChosen} />
        )}
        <div className="flex flex-wrap gap-2">
          <button
            type="button"
            className="button button-primary max-md:min-h-11"
            disabled={busy || taken.length === 0}
            onClick={() => void takePdf()}
          >
            Download PDF
          </button>
          <button
            type="button"
            className="button max-md:min-h-11"
            disabled={busy || taken.length === 0}
            onClick={print}
          >
            Print
          </button>
          <button
            type="button"
            className="button max-md:min-h-11"
            disabled={busy || taken.length === 0}
            onClick={() => void takeSvg()}
          >
            SVG
          </button>
          {whole && (
            <>
              <button
                type="button"
                className="button max-md:min-h-11"
                disabled={busy}
                onClick={() =>
                  void takeText('DXF', 'application/dxf', '.dxf', () => hand.current!.dxf(pack))
                }
              >
                DXF
              </button>
              <button
                type="button"
                className="button max-md:min-h-11"
                disabled={busy}
                onClick={() =>
                  void takeText('list of points', 'text/csv', '-points.csv', () =>
                    hand.current!.points(pack),
                  )
                }
              >
                Points as CSV
              </button>
              <button
                type="button"
                className="button max-md:min-h-11"
                disabled={busy}
                onClick={() =>
                  void takeText('layout', 'application/json', '.json', () =>
                    Promise.resolve(JSON.stringify(version.document, null, 2)),
                  )
                }
              >
                Layout
              </button>
            </>
          )}
        </div>
        {whole && (
          <p className="text-sm text-slate">
            DXF: the floor at full size in millimetres, for CAD. CSV: every control point with its
            x, y and level. Layout: the document, for another Evenlay.
          </p>
        )}
        {making.kind === 'making' && (
          <div className="flex items-center gap-3">
            <progress
              className="h-2 flex-1"
              aria-label={`Making the ${making.what}`}
              {...(making.share === null ? {} : { value: making.share })}
            />
            <button
              type="button"
              className="button max-md:min-h-11"
              onClick={() => {
                stopped.current = true;
              }}
            >
              Stop
            </button>
          </div>
        )}
        {making.kind === 'failed' && (
          <p role="alert" className="text-brick">
            {making.message}
          </p>
        )}
        <p role="status" className="text-slate empty:hidden">
          {said}
        </p>
      </div>
      <div className="min-w-0 flex-1 bg-stone-100 p-4 md:p-8 print:bg-transparent print:p-0">
        {drawn.kind === 'drawing' && <p className="py-16 text-center">Drawing the sheets …</p>}
        {drawn.kind === 'failed' && (
          <div role="alert" className="mx-auto max-w-md py-16">
            <p>The sheets could not be drawn. {drawn.message} Nothing was changed.</p>
            <button type="button" className="button mt-4 max-md:min-h-11" onClick={again}>
              Draw them again
            </button>
          </div>
        )}
        {drawn.kind === 'drawn' && taken.length === 0 && (
          <p className="py-16 text-center">No sheet is chosen. Tick at least one kind.</p>
        )}
        {taken.map(({ sheet, number }) => (
          <PackSheet
            key={number}
            sheet={sheet}
            number={number}
            of={all.length}
            printing={printing}
          />
        ))}
      </div>
    </div>
  );
}

const sheetCount = (count: number): string => (count === 1 ? '1 sheet' : `${count} sheets`);

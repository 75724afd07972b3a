import './sheet-fonts.css';
import { useMemo, useState } from 'react';
import type { SheetPack } from '@/api-types/sheet-pack';
import { letteringGaps } from '@/sheets/lettering-gaps';
import type { PaperName } from '@/sheets/paper';
import { PAPER_NAMES } from '@/sheets/paper';
import type { Sheet } from '@/sheets/sheet';
import { planSheets } from '@/sheets/plan-sheet';
import { scaleName } from '@/sheets/scales';
import { drawingSvg } from '@/sheets/svg-sink';
import { failureWords } from '../ui/failure-words';
import { download } from '../ui/download';
import { Moment } from '../ui/Moment';
import { LetteringNote } from './LetteringNote';
import { planFileName } from './plan-file-name';
import { versionPlanInput } from './version-plan';

type PaperChoice = PaperName | 'auto';
type Making =
  { readonly kind: 'idle' | 'making' } | { readonly kind: 'failed'; readonly message: string };

/** The plan sheet of a version on screen: choose the paper, take it as PDF or SVG, or print it. */
export default function PlanView({ version, stamp }: Pick<SheetPack, 'version' | 'stamp'>) {
  const [choice, setChoice] = useState<PaperChoice>('auto');
  const [trueSize, setTrueSize] = useState(false);
  const [making, setMaking] = useState<Making>({ kind: 'idle' });
  const [said, setSaid] = useState('');
  const input = useMemo(
    () => versionPlanInput({ version, stamp }, choice),
    [version, stamp, choice],
  );
  const sheets = useMemo(() => planSheets(input), [input]);
  const [{ paper, scale }] = sheets;
  const title = `${version.projectName}, ${version.layoutName}, version ${version.number}`;

  const takePdf = async () => {
    setMaking({ kind: 'making' });
    try {
      const { browserPdfMeans, sheetsPdf } = await import('./browser-pdf');
      const about = { title, author: version.firmName };
      const file = await sheetsPdf(sheets, about, await browserPdfMeans());
      download(new Blob([file], { type: 'application/pdf' }), `${planFileName(version)}.pdf`);
      setMaking({ kind: 'idle' });
      setSaid(`The PDF is made: ${sheetCount(sheets)} of ${paper.name} at ${scaleName(scale)}.`);
    } catch (error) {
      const message = `The PDF could not be made. ${failureWords(error)} Try again.`;
      setMaking({ kind: 'failed', message });
    }
  };
  const takeSvg = () => {
    sheets.forEach((sheet, n) => {
      const name = n === 0 ? planFileName(version) : `${planFileName(version)}-sheet-${n + 1}`;
      download(new Blob([drawingSvg(sheet, { title })], { type: 'image/svg+xml' }), `${name}.svg`);
    });
    setSaid('The SVG is made.');
  };

  return (
    <div>
      <style>{`@page { size: ${paper.width}mm ${paper.height}mm; margin: 0 }`}</style>
      <div className="flex flex-wrap items-end gap-x-6 gap-y-3 border-b border-stone-300 px-5 py-3 print:hidden">
        <div>
          <label htmlFor="paper" className="field-label">
            Paper
          </label>
          <select
            id="paper"
            className="field w-60"
            value={choice}
            onChange={(event) => setChoice(event.target.value as PaperChoice)}
          >
            <option value="auto">Smallest that shows it well</option>
            {PAPER_NAMES.map((name) => (
              <option key={name} value={name}>
                {name}
              </option>
            ))}
          </select>
        </div>
        <p className="py-2 text-slate">
          <strong className="text-graphite">{scaleName(scale)}</strong> on {paper.name}{' '}
          {paper.orientation}, {sheetCount(sheets)}
          <br />
          Saved <Moment iso={version.createdAt} />; the sheet says it in UTC
        </p>
        <div className="flex flex-wrap gap-2 md:ml-auto">
          <button
            type="button"
            className="button"
            aria-pressed={trueSize}
            onClick={() => setTrueSize(!trueSize)}
          >
            True size
          </button>
          <button type="button" className="button" onClick={takeSvg}>
            Download SVG
          </button>
          <button type="button" className="button" onClick={() => window.print()}>
            Print
          </button>
          <button
            type="button"
            className="button button-primary"
            disabled={making.kind === 'making'}
            onClick={() => void takePdf()}
          >
            {making.kind === 'making' ? 'Making the PDF …' : 'Download PDF'}
          </button>
        </div>
        <LetteringNote gaps={letteringGaps(input)} />
        {making.kind === 'failed' && (
          <p role="alert" className="w-full text-brick">
            {making.message}
          </p>
        )}
        <p role="status" className="w-full text-slate empty:hidden">
          {said}
        </p>
      </div>
      <div className="overflow-x-auto bg-stone-100 p-4 md:p-8 print:overflow-visible print:bg-transparent print:p-0">
        {sheets.map((sheet, n) => (
          <SheetView key={n} sheet={sheet} trueSize={trueSize} title={`${title}, sheet ${n + 1}`} />
        ))}
      </div>
    </div>
  );
}

const sheetCount = (sheets: readonly Sheet[]): string =>
  sheets.length === 1 ? '1 sheet' : `${sheets.length} sheets`;

function SheetView({ sheet, trueSize, title }: { sheet: Sheet; trueSize: boolean; title: string }) {
  const svg = useMemo(() => drawingSvg(sheet, { title }), [sheet, title]);
  const size = trueSize
    ? { width: `${sheet.width}mm` }
    : { width: '100%', maxWidth: sheet.paper.orientation === 'portrait' ? '60rem' : '85rem' };
  return (
    <div
      role="img"
      aria-label={title}
      data-sheet
      className="mx-auto mb-6 border border-stone-300 last:mb-0 [&>svg]:block [&>svg]:h-auto [&>svg]:w-full print:mb-0 print:border-0"
      style={
        {
          ...size,
          '--sheet-width': `${sheet.width}mm`,
          '--sheet-height': `${sheet.height}mm`,
        } as never
      }
      dangerouslySetInnerHTML={{ __html: svg }}
    />
  );
}

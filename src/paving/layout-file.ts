import type { LayoutDocument } from './layout-document';
import { parseLayoutDocument, type DocumentProblem } from './layout-validation';

/**
 * A layout as a file: its document as JSON. Read are files that were saved from the drafting table or written for the `layout`
 * command, and the layouts and versions of an archive, which hold the document among other things.
 */

/** No file is larger, bytes; a document of that size is no floor. */
export const LAYOUT_FILE_LIMIT = 1_000_000;
/** How the name of a layout's file ends. */
export const LAYOUT_FILE_ENDING = '.evenlay';

export type LayoutFile =
  | { readonly ok: true; readonly document: LayoutDocument }
  /** What is wrong, each a sentence for the person. */
  | { readonly ok: false; readonly reasons: readonly string[] };

/** Reasons that are told at once; more would not be read. */
const TOLD = 6;

const NO_LAYOUT =
  'This is no layout file. One is saved from the drafting table under Versions, and its name ends in .evenlay or .json.';

/** Where in the document: `perimeter, corner 3`; what is counted from nought there is counted from one here. */
function placeWords(path: DocumentProblem['path']): string {
  return path
    .map((step) => (typeof step === 'number' ? String(step + 1) : step))
    .join(' ')
    .replace(/^ground perimeter (\d+)/, 'perimeter, corner $1')
    .replace(/^ground perimeter/, 'the perimeter')
    .replace(/^ground keepOuts (\d+) ring (\d+)/, 'keep-out $1, corner $2')
    .replace(/^ground keepOuts (\d+)( ring)?/, 'keep-out $1')
    .replace(/^units (\d+)/, 'unit $1,')
    .replace(/^levels spots (\d+)/, 'spot $1,');
}

const reason = ({ path, message }: DocumentProblem): string => {
  const words = `${placeWords(path)} ${message}`.trim();
  return `${words[0].toUpperCase()}${words.slice(1)}.`;
};

/** Reads a layout file; a floor that cannot be laid is refused with what is wrong and where. */
export function layoutFileRead(text: string): LayoutFile {
  let value: unknown;
  try {
    value = JSON.parse(text.replace(/^\ufeff/, ''));
  } catch {
    return { ok: false, reasons: [NO_LAYOUT] };
  }
  const isObject = (part: unknown): part is Record<string, unknown> =>
    typeof part === 'object' && part !== null && !Array.isArray(part);
  if (!isObject(value)) return { ok: false, reasons: [NO_LAYOUT] };
  const document = !('schema' in value) && isObject(value.document) ? value.document : value;
  if (!('schema' in document) && !('ground' in document))
    return { ok: false, reasons: [NO_LAYOUT] };
  const parsed = parseLayoutDocument(document);
  if (parsed.ok) return parsed;
  const { problems } = parsed;
  const more = problems.length - TOLD;
  return {
    ok: false,
    reasons: [
      ...problems.slice(0, TOLD).map(reason),
      ...(more > 0 ? [`And ${more} more of the kind.`] : []),
    ],
  };
}

/** The document as a file's text. */
export const layoutFileWritten = (document: LayoutDocument): string =>
  `${JSON.stringify(document, null, 2)}\n`;

import {
  LAYOUT_FILE_ENDING,
  LAYOUT_FILE_LIMIT,
  layoutFileRead,
  layoutFileWritten,
  type LayoutFile,
} from '@/paving/layout-file';
import type { LayoutDocument } from '@/paving/layout-document';
import { download } from './download';

/** What a choice of files offers. */
export const LAYOUT_FILE_ACCEPT = `${LAYOUT_FILE_ENDING},.json,application/json`;

/** A layout file that somebody chose or dropped. */
export async function layoutOfFile(file: File): Promise<LayoutFile> {
  if (file.size > LAYOUT_FILE_LIMIT)
    return { ok: false, reasons: ['This file is over 1 MB. No layout is that large.'] };
  try {
    return layoutFileRead(await file.text());
  } catch {
    return { ok: false, reasons: ['The file could not be read. Choose it once more.'] };
  }
}

/** The name of a layout whose file has that name. */
export const layoutNameOf = (file: File): string =>
  file.name
    .replace(/\.(evenlay|json)$/i, '')
    .replace(/[-_]+/g, ' ')
    .trim()
    .slice(0, 80) || 'Layout';

/** Hands a layout to the person as a file. */
export function layoutSaved(document: LayoutDocument, name: string): void {
  const safe = name.replace(/[^\p{L}\p{N}._-]+/gu, '-').replace(/^-+|-+$/g, '') || 'layout';
  download(
    new Blob([layoutFileWritten(document)], { type: 'application/json' }),
    `${safe}${LAYOUT_FILE_ENDING}`,
  );
}

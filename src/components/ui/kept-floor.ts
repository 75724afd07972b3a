import { layoutDocumentSchema, type LayoutDocument } from '@/paving/layout-document';

/** A floor made on the front page, kept on this device until its maker has an account to keep it in. */
const KEY = 'evenlay:floor-to-keep';

export function keepFloor(document: LayoutDocument): boolean {
  try {
    localStorage.setItem(KEY, JSON.stringify(document));
    return true;
  } catch {
    return false;
  }
}

export function keptFloor(): LayoutDocument | null {
  try {
    const read = layoutDocumentSchema.safeParse(JSON.parse(localStorage.getItem(KEY) ?? 'null'));
    return read.success ? read.data : null;
  } catch {
    return null;
  }
}

export function forgetKeptFloor(): void {
  try {
    localStorage.removeItem(KEY);
  } catch {
    // Nothing was kept where nothing can be.
  }
}

import type { Laying } from '@/paving/laying';
import type { Report } from '@/paving/report';
import type { PaperName } from './paper';

/** Where a version stands: the kinds of its events. */
export type SheetState = 'saved' | 'shared' | 'accepted' | 'change_asked' | 'issued' | 'superseded';

/** What every sheet says of its version's issue. */
export interface SheetStamp {
  /** When it was issued for set-out, ISO 8601 UTC. */
  readonly issuedAt: string | null;
  /** The version issued in its place, and when. */
  readonly supersededBy: { readonly number: number | null; readonly at: string } | null;
  /** Address of the page that says whether this is still the current plan; without it there is no QR code. */
  readonly currentUrl: string | null;
}

/** Of a version that was not issued, on a sheet without a QR code. */
export const NO_STAMP: SheetStamp = { issuedAt: null, supersededBy: null, currentUrl: null };

/** All that a plan sheet is drawn from. The document is the laying's own. */
export interface PlanInput {
  readonly laying: Laying;
  readonly report: Report;
  readonly firm: string;
  readonly project: string;
  readonly layout: string;
  readonly version: number;
  readonly label: string;
  readonly creator: string;
  readonly documentNumber: string;
  /** When the version was saved, ISO 8601 UTC. */
  readonly date: string;
  readonly fingerprint: string;
  readonly state: SheetState;
  readonly stamp: SheetStamp;
  readonly paper: PaperName | 'auto';
}

/** Where a version stands, as sheets say it. */
export const STATE_NAMES: Readonly<Record<SheetState, string>> = {
  saved: 'Saved',
  shared: 'Shared',
  accepted: 'Accepted',
  change_asked: 'Change asked',
  issued: 'Issued',
  superseded: 'Superseded',
};

/** What the sheet says at its head about building from it. */
export function setOutMark(state: SheetState): string {
  if (state === 'issued') return 'Issued for set-out';
  return state === 'superseded' ? 'Superseded' : 'Not for set-out';
}

/** `2026-10-14 09:30 UTC`. */
export function sheetDate(iso: string): string {
  const date = new Date(iso).toISOString();
  return `${date.slice(0, 10)} ${date.slice(11, 16)} UTC`;
}

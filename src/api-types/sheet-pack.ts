import type { TakeOffWithoutCosts } from '@/takeoff/without-costs';
import type { VersionDetail } from './versions';

/** GET /api/versions/{id}/sheets: what the sheets of a version are drawn from, the stamp that each bears. */
export interface SheetPack {
  readonly version: VersionDetail;
  readonly stamp: {
    /** When it was issued for set-out; null before. */
    readonly issuedAt: string | null;
    readonly supersededBy: { readonly number: number | null; readonly at: string } | null;
    /** The page that the QR code leads to; a whole address, for it is opened from paper. */
    readonly currentUrl: string;
  };
  /** `plan`: a client has the plan of a shared version, and no more. */
  readonly sheets: 'all' | 'plan';
  /**
   * What it takes, as it was reckoned from the firm's catalogue when it was saved: what the orders say too. Null with the plan
   * alone, and for versions saved before that was kept.
   */
  readonly materials: TakeOffWithoutCosts | null;
}

/**
 * GET /api/current/{id}, for whoever holds a sheet, signed in or not. It tells nothing else, and an id
 * that is no version's is answered as that of a version which was not issued.
 */
export type PlanStatus =
  | { readonly status: 'current' }
  | {
      readonly status: 'superseded';
      /** The version issued in its place; null in the rare case that it can't be told. */
      readonly by: number | null;
      /** When, ISO 8601 UTC. */
      readonly at: string;
    }
  | { readonly status: 'not-issued' };

import { z } from 'zod';
import type { PersonName } from './people';
import type { VersionState } from './versions';

/**
 * PUT /api/layouts/{id}/presence: sent by an open drafting table every `PRESENCE_BEAT_S` seconds, and once when
 * it closes (`gone`). 200 → `{ present: Present[] }`, the others who have it open.
 */
export const presenceSchema = z.object({ state: z.enum(['looking', 'editing', 'gone']) });
export type Presence = z.input<typeof presenceSchema>;

export const PRESENCE_BEAT_S = 15;

/** Somebody else who has a layout's draft open. */
export interface Present {
  readonly person: PersonName;
  /** Whether they changed the draft within the last minute. */
  readonly editing: boolean;
}

/** A version as it stands for this person. */
export interface LiveVersion {
  readonly id: string;
  readonly number: number;
  readonly state: VersionState;
  readonly comments: number;
  readonly unread: number;
  /** Changes when a comment is made here or a thread resolved: then ask for the comments again. */
  readonly commentsStamp: string;
  /** How many entries the crew has sent from site: when it grows, ask for them again. */
  readonly siteEntries: number;
}

export interface LiveLayout {
  readonly id: string;
  readonly name: string;
  /** Null for those who may not see drafts. */
  readonly draft: {
    readonly revision: number;
    readonly savedAt: string;
    readonly savedBy: PersonName;
  } | null;
  /** Newest first. */
  readonly versions: readonly LiveVersion[];
  /** Others at the drafting table; empty for those who may not see drafts. */
  readonly present: readonly Present[];
}

/**
 * GET /api/projects/{id}/live: how a project stands for this person, to be compared with what a page shows.
 *
 * GET /api/projects/{id}/live/stream: the same as server-sent events (`event: state`, `data: LiveState`), the
 * first at once and then whenever it has changed, seen within `LIVE_POLL_S` seconds whichever server process it
 * was changed through. `event: gone` when the person may no longer see the project: close, and do not come again.
 * The stream ends by itself after a few minutes, or after `?for=` so many seconds (0: after the first state); EventSource
 * comes again by itself.
 */
export interface LiveState {
  readonly projectId: string;
  /** The same just while nothing in the rest has changed. */
  readonly stamp: string;
  readonly layouts: readonly LiveLayout[];
  /** Another whenever the client's choices are picked anew; null while nothing is picked. */
  readonly choices: string | null;
}

export const LIVE_POLL_S = 2;

export const liveStreamQuerySchema = z.object({
  for: z.coerce.number().min(0).max(300).default(300),
});

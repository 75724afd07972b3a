import { z } from 'zod';
import type { Point } from '@/geometry/point';
import type { PersonName } from './people';
import type { VersionEventKind } from './versions';

const size = z.coerce.number().int().min(1).max(200).default(50);

/**
 * GET /api/projects/{id}/timeline?after=…&size=…, and GET /api/layouts/{id}/timeline: what happened, newest
 * first, of the versions that this person sees. `after` is the `next` of the page before.
 */
export const timelineQuerySchema = z.object({ after: z.string().max(200).optional(), size });

interface TimelineBase {
  readonly id: string;
  readonly at: string;
  readonly person: PersonName;
  readonly layout: { readonly id: string; readonly name: string };
  readonly version: { readonly id: string; readonly number: number; readonly label: string };
}

export interface TimelineStep extends TimelineBase {
  readonly kind: VersionEventKind;
  readonly note: string;
}

export interface TimelineComment extends TimelineBase {
  readonly kind: 'commented' | 'replied';
  readonly threadId: string;
  readonly body: string;
  readonly pin: Point | null;
}

export type TimelineEntry = TimelineStep | TimelineComment;

export interface TimelinePage {
  readonly entries: readonly TimelineEntry[];
  /** Ask for the next page `after` this; null at the end. */
  readonly next: string | null;
}

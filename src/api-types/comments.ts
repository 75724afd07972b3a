import { z } from 'zod';
import type { Point } from '@/geometry/point';
import { spotSchema } from './agreement';
import type { PersonName, Role } from './people';

const body = z
  .string({ error: 'Write something' })
  .trim()
  .min(1, 'Write something')
  .max(4000, 'Keep it to 4,000 characters');

/**
 * POST /api/versions/{id}/comments: begins a thread, pinned to a spot or about the version as a whole.
 * `@` and a person's full name, anywhere in the body, mentions them: see `Mentionable`. 201 → `Thread`.
 */
export const newCommentSchema = z.object({ body, pin: spotSchema.nullable().default(null) });
export type NewComment = z.input<typeof newCommentSchema>;

/**
 * POST /api/threads/{id}/replies. 201 → `Thread`. A reply to a resolved thread opens it again. Who replies has read the
 * thread up to the comment `upTo`, the last that was shown; all of it, if that is left out.
 */
export const newReplySchema = z.object({ body, upTo: z.string().max(64).optional() });
export type NewReply = z.input<typeof newReplySchema>;

/** PATCH /api/threads/{id}: by who began it, or by the firm’s owner and designers. 200 → `Thread`. */
export const threadChangeSchema = z.object({ resolved: z.boolean() });
export type ThreadChange = z.input<typeof threadChangeSchema>;

/** PUT /api/threads/{id}/read: up to the comment `upTo`, the last that was shown. 200 → `Thread`. */
export const threadReadSchema = z.object({ upTo: z.string().min(1) });
export type ThreadRead = z.input<typeof threadReadSchema>;

export interface Comment {
  readonly id: string;
  readonly person: PersonName;
  readonly body: string;
  readonly at: string;
  readonly mentions: readonly PersonName[];
  /** By somebody else, and not read by this person yet. */
  readonly unread: boolean;
}

export interface Thread {
  readonly id: string;
  readonly projectId: string;
  readonly layoutId: string;
  readonly versionId: string;
  readonly versionNumber: number;
  /** Its spot of the ground, mm; null when it is about the version as a whole. */
  readonly pin: Point | null;
  readonly resolved: { readonly at: string; readonly by: PersonName } | null;
  /** Whether this person may resolve it or open it again. */
  readonly mayResolve: boolean;
  /** Oldest first; the first began the thread. */
  readonly comments: readonly Comment[];
  readonly unread: number;
}

/**
 * GET /api/versions/{id}/comments, and GET /api/layouts/{id}/comments for all versions of a layout that
 * the person sees: → `{ threads: Thread[] }`, oldest first, resolved ones included.
 */
export interface Threads {
  readonly threads: readonly Thread[];
}

/** GET /api/versions/{id}/mentionable → `{ people: Mentionable[] }`: who else sees this version, by name. */
export interface Mentionable extends PersonName {
  readonly role: Role;
}

/** GET /api/unread → `Unread`: what this person has not read, newest first, at most 50 threads. */
export interface Unread {
  readonly threads: readonly {
    readonly threadId: string;
    readonly versionId: string;
    readonly versionNumber: number;
    readonly layoutName: string;
    readonly projectId: string;
    readonly projectName: string;
    readonly unread: number;
    /** The newest comment not read. */
    readonly latest: { readonly person: PersonName; readonly body: string; readonly at: string };
  }[];
}

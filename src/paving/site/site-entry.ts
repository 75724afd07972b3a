import { z } from 'zod';
import { formatCount } from '../count';
import { layoutDocumentSchema } from '../layout-document';

/**
 * What a crew writes down on the ground: courses laid, readings taken, notes, photos, and a proposal to
 * re-fit. Each is an event that is never altered: what is wrong is put right by another one after it.
 */

const words = (most: number, what: string) =>
  z
    .string({ error: `Write ${what}` })
    .trim()
    .max(most, `Keep ${what} to ${formatCount(most)} characters`);

/** A course of the set-out is laid, or is not after all: by its row, which stays whatever number the sheets give it. */
const courseEntrySchema = z.object({
  kind: z.literal('course'),
  course: z.number().int().min(1).max(1_000_000),
  laid: z.boolean(),
});

/** A reading of one of the set-out's checks, mm; null takes the reading back. */
const checkEntrySchema = z.object({
  kind: z.literal('check'),
  check: z.string().min(1).max(80),
  measured: z.number().min(0, 'A tape reads nothing less than 0.').max(1e8).nullable(),
});

const noteEntrySchema = z.object({
  kind: z.literal('note'),
  text: words(2000, 'the note').min(1, 'Write something first'),
});

/** The photo itself goes beside the entry, under the entry's id. */
const photoEntrySchema = z.object({
  kind: z.literal('photo'),
  caption: words(300, 'the line under the photo').default(''),
});

/** A floor that the crew proposes for what is not laid yet; the designer may take it as a draft. */
const proposalEntrySchema = z.object({
  kind: z.literal('proposal'),
  /** What was found and what would do, in the words that the phone showed. */
  text: words(4000, 'the proposal').min(1, 'Say what is proposed'),
  document: layoutDocumentSchema,
});

export const siteEntryContentSchema = z.discriminatedUnion('kind', [
  courseEntrySchema,
  checkEntrySchema,
  noteEntrySchema,
  photoEntrySchema,
  proposalEntrySchema,
]);

export type SiteEntryContent = z.infer<typeof siteEntryContentSchema>;
export type SiteEntryKind = SiteEntryContent['kind'];

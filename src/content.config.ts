import { defineCollection, z } from 'astro:content';
import { glob } from 'astro/loaders';

/** The guide: one file a step of the work, in its order. */
const guide = defineCollection({
  loader: glob({ base: './src/content/guide', pattern: '*.md' }),
  schema: z.object({
    title: z.string(),
    summary: z.string(),
    order: z.number(),
    /** Which piece of work it belongs to. */
    part: z.enum(['draft', 'agree', 'site']).default('draft'),
    /** Which of the program's own drawings goes with it; see components/guide. */
    picture: z.enum([
      'ground',
      'bonds',
      'places',
      'fit',
      'gaps',
      'versions',
      'sheet',
      'overlay',
      'cutting',
      'order',
      'set-out',
      'site',
    ]),
  }),
});

export const collections = { guide };

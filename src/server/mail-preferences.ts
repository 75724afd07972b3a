import { eq } from 'drizzle-orm';
import type { z } from 'zod';
import type { MailPreferences, mailPreferencesSchema } from '@/api-types/account';
import { people } from '@/db/schema';
import type { Db } from './database';

const columns = {
  mentions: people.mailMentions,
  steps: people.mailSteps,
  digest: people.mailDigest,
};

/** Which letters a person wants. Letters about their account come in any case. */
export const mailPreferencesOf = async (db: Db, personId: string): Promise<MailPreferences> =>
  (await db.select(columns).from(people).where(eq(people.id, personId)))[0];

/** Changes what is given, and answers with all of it. */
export const changeMailPreferences = async (
  db: Db,
  personId: string,
  change: z.output<typeof mailPreferencesSchema>,
): Promise<MailPreferences> => {
  const before = await mailPreferencesOf(db, personId);
  const { mentions, steps, digest } = { ...before, ...change };
  await db
    .update(people)
    .set({ mailMentions: mentions, mailSteps: steps, mailDigest: digest })
    .where(eq(people.id, personId));
  return { mentions, steps, digest };
};

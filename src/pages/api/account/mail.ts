import { mailPreferencesSchema } from '@/api-types/account';
import { onlyMethods, reading, writing } from '@/server/endpoint';
import { changeMailPreferences, mailPreferencesOf } from '@/server/mail-preferences';
import { done } from '@/server/outcomes';

export const GET = reading(async ({ db, actor }) =>
  done(await mailPreferencesOf(db, actor.personId)),
);
export const PATCH = writing(mailPreferencesSchema, async ({ db, actor }, change) =>
  done(await changeMailPreferences(db, actor.personId, change)),
);
export const ALL = onlyMethods('GET', 'PATCH');

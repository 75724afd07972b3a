import { eq } from 'drizzle-orm';
import { people } from '@/db/schema';
import type { Db } from '../database';
import { postLetter } from '../mail/outbox';
import { onlookersOf } from '../onlookers';
import { mayDraft, type Actor } from '../permissions';
import { versionName, type SeenVersion } from '../seen-version';

/** Writes to those who draw, and who asked to be written to, that the crew proposes another floor for the rest. */
export const postProposalLetters = async (
  tx: Db,
  actor: Actor,
  version: SeenVersion,
  text: string,
): Promise<void> => {
  const [doer] = await tx
    .select({ name: people.name })
    .from(people)
    .where(eq(people.id, actor.personId));
  for (const onlooker of await onlookersOf(tx, version, actor.personId)) {
    if (!onlooker.mailSteps || !mayDraft(onlooker.role)) continue;
    await postLetter(
      tx,
      { to: onlooker.email, firmId: actor.firmId },
      {
        kind: 'site-proposal',
        subject: `From site: ${version.projectName}, ${versionName(version)}`,
        name: onlooker.name,
        blocks: [
          {
            kind: 'paragraph',
            text: `${doer.name} proposes another floor for what is not laid yet of ${versionName(version)}. You can take it as a draft, look it over and issue it.`,
          },
          { kind: 'quote', by: doer.name, text },
          { kind: 'action', label: 'Look at it', path: `/versions/${version.id}#on-site` },
        ],
        why: `You draw for this project of ${version.firmName}. Which letters you get is for you to say on your account page.`,
      },
    );
  }
};

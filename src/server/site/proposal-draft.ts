import { and, eq } from 'drizzle-orm';
import type { z } from 'zod';
import type { DraftState } from '@/api-types/layouts';
import type { draftFromProposalSchema } from '@/api-types/site';
import { siteEntries, versions } from '@/db/schema';
import type { Db } from '../database';
import { draftTaking } from '../drafts';
import { done, notFound, type Outcome } from '../outcomes';
import type { Actor } from '../permissions';
import { seenVersion } from '../seen-version';

/** The layout's draft takes the floor that the crew proposes; what it held is set aside. */
export const draftFromProposal = async (
  db: Db,
  actor: Actor,
  entryId: string,
  { baseRevision }: z.output<typeof draftFromProposalSchema>,
): Promise<Outcome<DraftState>> => {
  const [row] = await db
    .select({ content: siteEntries.content, versionId: siteEntries.versionId })
    .from(siteEntries)
    .innerJoin(
      versions,
      and(eq(versions.firmId, siteEntries.firmId), eq(versions.id, siteEntries.versionId)),
    )
    .where(and(eq(siteEntries.firmId, actor.firmId), eq(siteEntries.id, entryId)));
  const { content, versionId } = row ?? {};
  if (content?.kind !== 'proposal' || versionId === undefined) return notFound('proposal');
  const version = await seenVersion(db, actor, versionId);
  if (!version) return notFound('proposal');
  return draftTaking(db, actor, version.layoutId, baseRevision, async () =>
    done({ document: content.document, versionId }),
  );
};

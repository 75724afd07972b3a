import { and, eq } from 'drizzle-orm';
import type { z } from 'zod';
import type { duplicateLayoutSchema, LayoutSummary } from '@/api-types/layouts';
import { drafts, versions } from '@/db/schema';
import type { LayoutDocument } from '@/paving/layout-document';
import type { Db } from './database';
import { draftingLayout, ofDraft } from './drafts';
import { createLayout } from './layouts';
import { notFound, type Outcome } from './outcomes';
import type { Actor } from './permissions';
import { copyLayoutPrices } from './pricing/layout-prices';

/** As long as a layout's name may be. */
const NAME_LIMIT = 80;

const copyName = (name: string): string => `Copy of ${name}`.slice(0, NAME_LIMIT).trimEnd();

const documentToCopy = async (
  db: Db,
  actor: Actor,
  layoutId: string,
  versionId: string | undefined,
): Promise<LayoutDocument | undefined> => {
  const rows =
    versionId === undefined
      ? await db.select({ document: drafts.document }).from(drafts).where(ofDraft(actor, layoutId))
      : await db
          .select({ document: versions.document })
          .from(versions)
          .where(
            and(
              eq(versions.firmId, actor.firmId),
              eq(versions.layoutId, layoutId),
              eq(versions.id, versionId),
            ),
          );
  return rows.at(0)?.document;
};

/** A new layout from a layout's draft or from one of its versions, in its own project or another. */
export const duplicateLayout = async (
  db: Db,
  actor: Actor,
  layoutId: string,
  { name, projectId, versionId }: z.output<typeof duplicateLayoutSchema>,
): Promise<Outcome<LayoutSummary>> => {
  const layout = await draftingLayout(db, actor, layoutId);
  if (!layout.ok) return layout;
  const document = await documentToCopy(db, actor, layoutId, versionId);
  if (!document) return notFound('version');
  const copied = await createLayout(db, actor, projectId ?? layout.value.project.id, {
    name: name ?? copyName(layout.value.name),
    document,
  });
  if (copied.ok) await copyLayoutPrices(db, actor, layoutId, copied.value.id);
  return copied;
};

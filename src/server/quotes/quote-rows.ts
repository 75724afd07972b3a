import { and, eq } from 'drizzle-orm';
import { projects, quotes } from '@/db/schema';
import type { Db } from '../database';
import type { SeenVersion } from '../seen-version';

const ofQuote = (firmId: string, id: string) => and(eq(quotes.firmId, firmId), eq(quotes.id, id));

/** One quote of a firm; undefined where there is none. */
export const quoteRow = async (db: Db, firmId: string, id: string) =>
  (await db.select().from(quotes).where(ofQuote(firmId, id))).at(0);

/** The client that the version’s project names; empty while none is. */
export const clientNameOf = async (db: Db, version: SeenVersion): Promise<string> =>
  (
    await db
      .select({ clientName: projects.clientName })
      .from(projects)
      .where(and(eq(projects.firmId, version.firmId), eq(projects.id, version.projectId)))
  )[0].clientName;

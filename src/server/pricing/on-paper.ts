import { eq } from 'drizzle-orm';
import type { FirmOnPaper, VersionOnPaper } from '@/api-types/quotes';
import { firms, people } from '@/db/schema';
import { pricingOf } from '../catalogue/pricing-settings';
import type { Db } from '../database';
import { shortFingerprint } from '../fingerprint';
import type { SeenVersion } from '../seen-version';

/** Who a paper comes from, as the firm's settings stand. */
export const firmOnPaper = async (db: Db, firmId: string): Promise<FirmOnPaper> => {
  const [{ name }] = await db.select({ name: firms.name }).from(firms).where(eq(firms.id, firmId));
  const { address, phone, email, registration } = await pricingOf(db, firmId);
  return { name, address, phone, email, registration };
};

/** A version as papers name it. */
export const versionOnPaper = (version: SeenVersion): VersionOnPaper => ({
  projectName: version.projectName,
  layoutName: version.layoutName,
  number: version.number,
  label: version.label,
  shortFingerprint: shortFingerprint(version.fingerprint),
});

/** Where answers to a person reach them. */
export const personEmail = async (db: Db, id: string): Promise<string> =>
  (await db.select({ email: people.email }).from(people).where(eq(people.id, id)))[0].email;

/** The name of a person who is known to be there. */
export const personName = async (db: Db, id: string): Promise<string> =>
  (await db.select({ name: people.name }).from(people).where(eq(people.id, id)))[0].name;

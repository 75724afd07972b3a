import { desc, eq } from 'drizzle-orm';
import { outbox } from '@/db/schema';
import { db } from './site';

/** The letters in the outbox for an address, newest first. */
export const lettersTo = async (email: string) =>
  (await db()).select().from(outbox).where(eq(outbox.to, email)).orderBy(desc(outbox.createdAt));

/** The token in the link of the newest letter to an address. */
export const tokenFor = async (email: string): Promise<string> => {
  const [letter] = await lettersTo(email);
  const token = /[?&]token=([\w-]+)/.exec(letter?.text ?? '')?.[1];
  if (!token) throw new Error(`no letter with a token to ${email}`);
  return token;
};

import { sql } from 'drizzle-orm';
import { theDatabase } from './database';

/** That the server answers and its database too; opens the database if nothing has yet. */
export const health = async () => {
  const { db, kind } = await theDatabase();
  await db.execute(sql`select 1`);
  return { status: 'ok', database: kind } as const;
};

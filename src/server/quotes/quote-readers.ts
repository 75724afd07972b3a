import { and, asc, eq } from 'drizzle-orm';
import type { QuoteReader } from '@/api-types/quotes';
import { memberships, people, projectPeople } from '@/db/schema';
import type { Db } from '../database';

/** The clients on a project, by name: those who read its quotes once the version is shared. */
export const quoteReaders = (db: Db, firmId: string, projectId: string): Promise<QuoteReader[]> =>
  db
    .select({ name: people.name, byLetter: people.mailSteps })
    .from(projectPeople)
    .innerJoin(
      memberships,
      and(
        eq(memberships.firmId, projectPeople.firmId),
        eq(memberships.personId, projectPeople.personId),
        eq(memberships.role, 'client'),
      ),
    )
    .innerJoin(people, eq(people.id, projectPeople.personId))
    .where(and(eq(projectPeople.firmId, firmId), eq(projectPeople.projectId, projectId)))
    .orderBy(asc(people.name), asc(people.id));

import { sql } from 'drizzle-orm';
import type { Db } from '@/db/client';
import { layFloor } from '@/paving/laying';
import { floorReport } from '@/paving/report';
import { COURT_CHEQUER } from '@/server/demo-layouts';
import { fingerprintOf } from '@/server/fingerprint';
import type { Actor } from '@/server/permissions';

/**
 * Puts many projects into a firm by statements over sets, as no endpoint could in good time: each with one layout, its
 * draft, and so many versions, every other one shared. Names are made of few words, so that a search finds several.
 */
export const putManyProjects = async (
  db: Db,
  { firmId, personId }: Actor,
  { projects, versions }: { readonly projects: number; readonly versions: number },
): Promise<void> => {
  const document = JSON.stringify(COURT_CHEQUER);
  const report = JSON.stringify(floorReport(layFloor(COURT_CHEQUER)));
  const fingerprint = fingerprintOf(COURT_CHEQUER);
  const id = (prefix: string, n: string) =>
    sql.raw(`'${prefix}-${firmId.slice(0, 6)}-' || lpad((${n})::text, 10, '0')`);
  const words = `(array['Court','Terrace','Yard','Walk','Pool','Gate','Orchard'])`;
  const clients = `(array['Alder','Birch','Cedar','Damson','Elder'])`;
  await db.execute(sql`insert into projects (id, firm_id, name, client_name, site_note, created_at, updated_at, archived_at)
    select ${id('p', 'n')}, ${firmId},
      ${sql.raw(`${words}[1 + n % 7] || ' ' || n`)}, ${sql.raw(`${clients}[1 + n % 5] || ' ' || (n % 97)`)}, '',
      now() - n * interval '1 minute', now() - n * interval '1 minute',
      case when n % 10 = 9 then now() - n * interval '1 minute' end
    from generate_series(1, ${projects}::int) n`);
  await db.execute(sql`insert into layouts (id, firm_id, project_id, name, created_at)
    select ${id('l', 'n')}, ${firmId}, ${id('p', 'n')}, 'Layout ' || n, now() - n * interval '1 minute'
    from generate_series(1, ${projects}::int) n`);
  await db.execute(sql`insert into drafts (firm_id, layout_id, document, revision, updated_by, updated_at)
    select ${firmId}, ${id('l', 'n')}, ${document}::jsonb, 1, ${personId}, now() - n * interval '1 minute'
    from generate_series(1, ${projects}::int) n`);
  if (versions > 0) {
    const many = sql`generate_series(1, ${projects}::int) n, generate_series(1, ${versions}::int) m`;
    await db.execute(sql`insert into versions
      (id, firm_id, layout_id, number, label, note, document, report, fingerprint, created_by, created_at)
      select ${id('v', 'n * 1000 + m')}, ${firmId}, ${id('l', 'n')}, m, 'Version ' || m, '',
        ${document}::jsonb, ${report}::jsonb, ${fingerprint}, ${personId}, now() - n * interval '1 minute'
      from ${many}`);
    // The events' trigger looks versions up: planned for the tables as they are now, not as when they were empty.
    await db.execute(sql`analyze`);
    await db.execute(sql`insert into version_events (id, firm_id, version_id, place, kind, person_id, note, at)
      select ${id('e', '(n * 1000 + m) * 2')}, ${firmId}, ${id('v', 'n * 1000 + m')}, 1, 'saved', ${personId}, '',
        now() - n * interval '1 minute' from ${many}`);
    await db.execute(sql`insert into version_events (id, firm_id, version_id, place, kind, person_id, note, at)
      select ${id('e', '(n * 1000 + m) * 2 + 1')}, ${firmId}, ${id('v', 'n * 1000 + m')}, 2, 'shared', ${personId}, '',
        now() - n * interval '1 minute' from ${many} where m % 2 = 0`);
  }
  // Twenty clients and installers, each on their share of the projects.
  await db.execute(sql`insert into people (id, email, name, password_hash)
    select ${id('m', 'n')}, ${id('m', 'n')} || '@firm.example', 'Member ' || n, '' from generate_series(1, 20) n`);
  await db.execute(sql`insert into memberships (firm_id, person_id, role)
    select ${firmId}, ${id('m', 'n')}, case when n % 2 = 0 then 'client' else 'installer' end
    from generate_series(1, 20) n`);
  await db.execute(sql`insert into project_people (firm_id, project_id, person_id)
    select ${firmId}, ${id('p', 'n')}, ${id('m', '1 + (n + m) % 20')}
    from generate_series(1, ${projects}::int) n, generate_series(0, 1) m`);
  await db.execute(sql`analyze`);
};

import { sql } from 'drizzle-orm';
import {
  choices,
  commentReads,
  comments,
  draftPresence,
  drafts,
  layouts,
  memberships,
  projectPeople,
  projects,
  siteEntries,
  versionEvents,
  versions,
} from '@/db/schema';
import type { Db } from './database';
import { AWAY_AFTER_S, EDITING_FOR_S } from './presence';

/**
 * One short line that changes whenever anything that `liveState` tells anybody may have. It is what is watched for
 * all who have a project open, so that one query a beat does for all of them. Counts and sums only grow with each change,
 * whatever order transactions commit in, where a greatest time could miss one that commits late.
 */
export const projectPulse = async (db: Db, firmId: string, projectId: string): Promise<string> => {
  const [row] = await db
    .select({
      pulse: sql<string>`md5(concat_ws('/',
        (select string_agg(concat_ws(',', l.id, l.name, d.revision), ';' order by l.id)
          from ${layouts} l join ${drafts} d on d.firm_id = l.firm_id and d.layout_id = l.id
          where l.firm_id = ${firmId} and l.project_id = ${projectId}),
        (select count(*) from ${layouts} l
          join ${versions} v on v.firm_id = l.firm_id and v.layout_id = l.id
          join ${versionEvents} e on e.firm_id = v.firm_id and e.version_id = v.id
          where l.firm_id = ${firmId} and l.project_id = ${projectId}),
        (select concat_ws(',', count(*), count(c.resolved_at), sum(extract(epoch from c.resolved_at)))
          from ${comments} c where c.firm_id = ${firmId} and c.project_id = ${projectId}),
        (select concat_ws(',', count(*), sum(extract(epoch from r.read_at)))
          from ${comments} c join ${commentReads} r on r.firm_id = c.firm_id and r.thread_id = c.id
          where c.firm_id = ${firmId} and c.project_id = ${projectId}),
        (select count(*) from ${layouts} l
          join ${versions} v on v.firm_id = l.firm_id and v.layout_id = l.id
          join ${siteEntries} s on s.firm_id = v.firm_id and s.version_id = v.id
          where l.firm_id = ${firmId} and l.project_id = ${projectId}),
        (select concat_ws(',', count(*), count(o.withdrawn_at)) from ${choices} o
          where o.firm_id = ${firmId} and o.project_id = ${projectId}),
        (select string_agg(concat_ws(',', q.layout_id, q.person_id,
            coalesce(q.edited_at > now() - make_interval(secs => ${EDITING_FOR_S}), false)),
            ';' order by q.layout_id, q.person_id)
          from ${layouts} l join ${draftPresence} q on q.firm_id = l.firm_id and q.layout_id = l.id
          where l.firm_id = ${firmId} and l.project_id = ${projectId}
          and q.seen_at > now() - make_interval(secs => ${AWAY_AFTER_S})),
        (select string_agg(concat_ws(',', m.person_id, m.role), ';' order by m.person_id)
          from ${memberships} m where m.firm_id = ${firmId}),
        (select string_agg(pp.person_id, ',' order by pp.person_id)
          from ${projectPeople} pp where pp.firm_id = ${firmId} and pp.project_id = ${projectId})))`,
    })
    .from(projects)
    .where(sql`${projects.firmId} = ${firmId} and ${projects.id} = ${projectId}`);
  return row?.pulse ?? 'gone';
};

import { PGlite } from '@electric-sql/pglite';
import { openPglite, type Db } from '@/db/client';
import { firms } from '@/db/schema';
import { newId } from '@/server/ids';
import { layoutSummaries } from '@/server/layouts';
import { addPerson } from '@/server/people';
import type { Actor } from '@/server/permissions';
import { projectPage } from '@/server/project-list';
import { openVersion } from '@/server/versions';
import { putManyProjects } from '../tests/api/many-projects';
import type { Bench, Ratio } from './ratio';

const FEW = 10;
const MANY = 10_000;
const VERSIONS = 10;
/** Whatever a firm has, a list or a version may take this much longer than with ten projects. */
const GREATEST = 2;
const RUNS = 60;

const firmWith = async (db: Db, projects: number): Promise<Actor> => {
  const firmId = newId();
  await db.insert(firms).values({ id: firmId, name: `Firm of ${projects}` });
  const personId = await addPerson(db, firmId, 'owner', {
    name: 'Owner',
    email: `owner-${firmId}@firm.example`,
    password: 'a long enough password',
    display: 'metric',
  });
  const actor: Actor = { firmId, personId, role: 'owner' };
  await putManyProjects(db, actor, { projects, versions: VERSIONS });
  return actor;
};

/** Each for itself in turn, so that whatever slows the machine meanwhile slows both alike; the medians. */
const medians = async (works: readonly (() => Promise<unknown>)[]): Promise<number[]> => {
  const times = works.map((): number[] => []);
  for (let run = 0; run < RUNS + 10; run += 1) {
    for (const [n, work] of works.entries()) {
      const from = performance.now();
      await work();
      if (run >= 10) times[n].push(performance.now() - from);
    }
  }
  return times.map((all) => all.sort((one, other) => one - other)[all.length >> 1]);
};

const current = { archived: 'no', size: 9 } as const;

/** A database with ten projects and one with 10,000 of ten versions each: the same lists, and a version opened. */
export const manyProjects: Bench = {
  name: 'many-projects',
  async run() {
    const few = await openPglite(await PGlite.create());
    const many = await openPglite(await PGlite.create());
    try {
      const [actorOfFew, actorOfMany] = [
        await firmWith(few.db, FEW),
        await firmWith(many.db, MANY),
      ];
      const versionOf = async (db: Db, actor: Actor): Promise<string> => {
        const { projects } = await projectPage(db, actor, { ...current, sort: 'updated' });
        const [layout] = await layoutSummaries(db, actor, [projects[0].id]);
        return layout.latest?.id ?? '';
      };
      const ids = [await versionOf(few.db, actorOfFew), await versionOf(many.db, actorOfMany)];
      const lists: [string, (db: Db, actor: Actor, n: number) => Promise<unknown>][] = [
        ...(['updated', 'name', 'client', 'stage'] as const).map(
          (sort): [string, (db: Db, actor: Actor) => Promise<unknown>] => [
            `projects by ${sort}`,
            (db, actor) => projectPage(db, actor, { ...current, sort }),
          ],
        ),
        [
          'a project looked for by its name',
          (db, actor, n) =>
            projectPage(db, actor, {
              ...current,
              sort: 'updated',
              search: ['walk 10', 'pool 10000'][n],
            }),
        ],
        ['a version opened', (db, actor, n) => openVersion(db, actor, ids[n])],
      ];
      const ratios: Ratio[] = [];
      for (const [name, work] of lists) {
        const [small, large] = await medians([
          () => work(few.db, actorOfFew, 0),
          () => work(many.db, actorOfMany, 1),
        ]);
        ratios.push({
          name: `${name}, ${MANY} ÷ ${FEW} projects`,
          value: large / small,
          greatest: GREATEST,
          detail: `${large.toFixed(2)} ms with ${MANY * VERSIONS} versions, ${small.toFixed(2)} ms with ${FEW * VERSIONS}`,
        });
      }
      return ratios;
    } finally {
      await few.close();
      await many.close();
    }
  },
};

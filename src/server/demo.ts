import { eq, sql } from 'drizzle-orm';
import { firms, outbox } from '@/db/schema';
import type { LayoutDocument } from '@/paving/layout-document';
import { acceptVersion, issueVersion, openAgreement, shareVersion } from './agreement';
import type { Db } from './database';
import { fromCatalogue, seedCatalogue, sendDemoOrder, sendDemoQuote } from './demo-catalogue';
import {
  COURT_CHEQUER,
  COURT_FIRST_CHEQUER,
  COURT_SQUARE,
  ROUND_TERRACE,
  SIDE_YARD,
} from './demo-layouts';
import { DEMO_FIRM, DEMO_PASSWORD, DEMO_PEOPLE, DEMO_TERMS } from './demo-people';
import { writeDemoSiteRecord } from './demo-site';
import { openDraft, saveDraft } from './drafts';
import { newId } from './ids';
import { createLayout } from './layouts';
import type { Outcome } from './outcomes';
import { addPerson } from './people';
import type { Actor } from './permissions';
import { createProject, putOnProject } from './projects';
import { comment, reply } from './threads';
import { saveVersion } from './versions';

/** Any number that nothing else in the database uses as an advisory lock. */
const SEED_LOCK = 5_170_222;

const sure = <T>(outcome: Outcome<T>): T => {
  if (outcome.ok) return outcome.value;
  throw new Error(`The demo could not be made: ${JSON.stringify(outcome)}`);
};

interface DemoVersion {
  readonly label: string;
  readonly note: string;
  readonly document: LayoutDocument;
  readonly then?: (versionId: string) => Promise<void>;
}

/** Drafts and saves each version in turn, the way a designer does; the draft is left at the last. */
const addVersions = async (
  db: Db,
  designer: Actor,
  layoutId: string,
  all: readonly DemoVersion[],
): Promise<void> => {
  for (const { label, note, document, then } of all) {
    const { revision } = sure(await openDraft(db, designer, layoutId));
    const saved = sure(
      await saveDraft(db, designer, layoutId, { baseRevision: revision, document }),
    );
    const version = sure(
      await saveVersion(db, designer, layoutId, { baseRevision: saved.revision, label, note }),
    );
    await then?.(version.id);
  }
};

const seed = async (db: Db): Promise<void> => {
  const firmId = newId();
  await db.insert(firms).values({ id: firmId, name: DEMO_FIRM, demo: true, terms: DEMO_TERMS });
  const actors = new Map<string, Actor>();
  for (const { role, name, email } of DEMO_PEOPLE) {
    const person = { name, email, password: DEMO_PASSWORD, display: 'metric' } as const;
    actors.set(role, { personId: await addPerson(db, firmId, role, person), firmId, role });
  }
  const actor = (role: string): Actor => {
    const found = actors.get(role);
    if (!found) throw new Error(`The demo has no ${role}`);
    return found;
  };
  const [designer, installer, client] = ['designer', 'installer', 'client'].map(actor);

  const project = async (name: string, clientName: string, siteNote: string): Promise<string> =>
    sure(await createProject(db, designer, { name, clientName, siteNote })).id;
  const items = await seedCatalogue(db, actor('owner'));
  const floor = (document: LayoutDocument) => fromCatalogue(document, items);
  const layout = async (projectId: string, name: string, document: LayoutDocument) =>
    sure(await createLayout(db, designer, projectId, { name, document: floor(document) })).id;

  const yard = await project(
    'Sallowgate side yard',
    'Nerys Quillamore',
    'Side gate is 900 mm clear; everything comes in by barrow. Gully lid must stay free.',
  );
  await layout(yard, 'Long planks', SIDE_YARD);

  const terrace = await project(
    'Ashwick round terrace',
    'Nerys Quillamore',
    'Lawn on all sides; park on the lane. Steel edge is in and checked for round.',
  );
  await putOnProject(db, firmId, terrace, installer.personId);
  await putOnProject(db, firmId, terrace, client.personId);
  await addVersions(db, designer, await layout(terrace, 'Herringbone', ROUND_TERRACE), [
    {
      label: 'Herringbone about the fire bowl',
      note: 'Set at 45° to the house, started where no block comes near the strip.',
      document: floor(ROUND_TERRACE),
      then: async (id) => {
        sure(await shareVersion(db, designer, id, { note: 'As we drew it together.' }));
        await sendDemoQuote(db, designer, id);
        const { fingerprint, terms } = sure(await openAgreement(db, client, id));
        const typedName = 'Nerys Quillamore';
        const note = 'Lovely. Go ahead.';
        sure(await acceptVersion(db, client, id, { typedName, fingerprint, terms, note }));
        sure(await issueVersion(db, actor('owner'), id, { note: 'For setting out from Monday.' }));
        await sendDemoOrder(db, designer, id);
        sure(await writeDemoSiteRecord(db, installer, id, ROUND_TERRACE));
      },
    },
  ]);

  const court = await project(
    'Fernhollow court',
    'Nerys Quillamore',
    'Kerb is set and level. Water pipe crosses under the north arm at 600 mm.',
  );
  await putOnProject(db, firmId, court, client.personId);
  await addVersions(db, designer, await layout(court, 'Chequer court', COURT_SQUARE), [
    {
      label: 'Square to the walls',
      note: 'Every slab, no voids: the most stone and the least planting.',
      document: floor(COURT_SQUARE),
    },
    {
      label: 'Chequer, from the corner',
      note: 'Turned 45° and started at the south-west corner, before the start was looked for.',
      document: floor(COURT_FIRST_CHEQUER),
    },
    {
      label: 'Chequer, well started',
      note: 'The same floor, started where the most slabs stay whole.',
      document: floor(COURT_CHEQUER),
      then: async (id) => {
        const note = 'Far more slabs than the first start, and margins that forgive.';
        sure(await shareVersion(db, designer, id, { note }));
        const body = 'Will the roots have room enough on this side?';
        const thread = sure(await comment(db, client, id, { body, pin: [2000, 3300] }));
        const answer =
          '@Nerys Quillamore Yes: the pit keeps its metre, and the voids around it drain.';
        sure(await reply(db, designer, thread.id, { body: answer }));
      },
    },
  ]);
  // All of this is past: nobody is written to about it.
  await db.delete(outbox).where(eq(outbox.firmId, firmId));
};

/** Puts the demo firm into a database that holds no firm at all; whether it did. All of it or nothing. */
export const seedIfEmpty = (db: Db): Promise<boolean> =>
  db.transaction(async (tx) => {
    await tx.execute(sql`select pg_advisory_xact_lock(${SEED_LOCK})`);
    const [any] = await tx.select({ id: firms.id }).from(firms).limit(1);
    if (any) return false;
    await seed(tx);
    return true;
  });

/** Whether the demo firm is in the database, so that its sign-ins may be told. */
export const demoIsThere = async (db: Db): Promise<boolean> =>
  (await db.select({ id: firms.id }).from(firms).where(eq(firms.demo, true)).limit(1)).length > 0;

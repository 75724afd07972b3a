import { firms } from '@/db/schema';
import { database } from '@/server/database';
import { COURT_CHEQUER } from '@/server/demo-layouts';
import { openDraft, saveDraft } from '@/server/drafts';
import { newId } from '@/server/ids';
import { createLayout, layoutSummaries } from '@/server/layouts';
import type { Outcome } from '@/server/outcomes';
import { addPerson } from '@/server/people';
import type { Actor } from '@/server/permissions';
import { createProject, listProjects } from '@/server/projects';
import { memberships } from '@/db/schema';
import { saveVersion } from '@/server/versions';

/**
 * Saves versions one after another through the service that the endpoint calls, on PGlite in the folder
 * that the environment names, and prints each once the service has answered. Runs until it is killed.
 */
const sure = <T>(outcome: Outcome<T>): T => {
  if (outcome.ok) return outcome.value;
  throw new Error(JSON.stringify(outcome));
};

const db = await database();

const makeFirm = async (): Promise<Actor> => {
  const firmId = newId();
  await db.insert(firms).values({ id: firmId, name: 'Firm' });
  const person = {
    name: 'Owner',
    email: 'owner@firm.example',
    password: 'a long enough password',
    display: 'metric' as const,
  };
  return { firmId, role: 'owner', personId: await addPerson(db, firmId, 'owner', person) };
};

const [member] = await db.select().from(memberships);
const actor: Actor = member ?? (await makeFirm());

const [project] = await listProjects(db, actor);
const projectId =
  project?.id ??
  sure(await createProject(db, actor, { name: 'Court', clientName: '', siteNote: '' })).id;
const [layout] = await layoutSummaries(db, actor, [projectId]);
const layoutId =
  layout?.id ??
  sure(await createLayout(db, actor, projectId, { name: 'Court', document: COURT_CHEQUER })).id;

for (;;) {
  const { revision, document } = sure(await openDraft(db, actor, layoutId));
  const [x, y] = document.placement.origin;
  const next = {
    ...document,
    placement: { ...document.placement, origin: [x + 0.25, y] as [number, number] },
  };
  const saved = sure(
    await saveDraft(db, actor, layoutId, { baseRevision: revision, document: next }),
  );
  const version = sure(
    await saveVersion(db, actor, layoutId, { baseRevision: saved.revision, label: 'V', note: '' }),
  );
  process.stdout.write(`${version.number} ${version.id} ${version.fingerprint}\n`);
}

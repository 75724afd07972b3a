import { and, asc, eq } from 'drizzle-orm';
import { outbox } from '@/db/schema';
import { putOnProject } from '@/server/projects';
import { newFirm, newMember, newProject, newVersion, type Signed } from './firm';
import { db } from './site';

/** A firm with one of each role, the installer and client put on its one project, and those who are not on it. */
export interface Office {
  readonly owner: Signed;
  readonly designer: Signed;
  readonly installer: Signed;
  readonly client: Signed;
  readonly clientElsewhere: Signed;
  readonly stranger: Signed;
  readonly projectId: string;
  readonly layoutId: string;
}

export const newOffice = async (): Promise<Office> => {
  const owner = await newFirm();
  const { firmId } = owner.actor;
  const designer = await newMember(firmId, 'designer');
  const installer = await newMember(firmId, 'installer');
  const client = await newMember(firmId, 'client');
  const clientElsewhere = await newMember(firmId, 'client');
  const stranger = await newFirm();
  const { projectId, layoutId } = await newProject(designer.visitor);
  for (const { actor } of [installer, client]) {
    await putOnProject(await db(), firmId, projectId, actor.personId);
  }
  return { owner, designer, installer, client, clientElsewhere, stranger, projectId, layoutId };
};

/** What a client sends to accept a version, as it is shown to them. */
export const acceptance = async ({ client }: Office, id: string, typedName = 'A. Client') => {
  const { fingerprint, terms } = (await client.visitor.get(`/api/versions/${id}/agreement`)).body;
  return { typedName, fingerprint, terms };
};

/** A new version of the office's layout, brought to where it stands through the endpoints. */
export const versionThatIs = async (
  office: Office,
  state: 'saved' | 'shared' | 'accepted' | 'issued',
  layoutId = office.layoutId,
): Promise<string> => {
  const { designer, owner, client } = office;
  const { id } = await newVersion(designer.visitor, layoutId, state);
  if (state === 'saved') return id;
  await designer.visitor.post(`/api/versions/${id}/share`);
  if (state === 'shared') return id;
  await client.visitor.post(`/api/versions/${id}/accept`, await acceptance(office, id));
  if (state === 'issued') await owner.visitor.post(`/api/versions/${id}/issue`);
  return id;
};

/** Letters of a firm that wait to be sent, in the order they were written. */
export const letters = async (firmId: string, kind?: string) =>
  (await db())
    .select()
    .from(outbox)
    .where(and(eq(outbox.firmId, firmId), kind === undefined ? undefined : eq(outbox.kind, kind)))
    .orderBy(asc(outbox.createdAt), asc(outbox.to));

import type { Role } from '@/api-types/people';
import type { LayoutDocument } from '@/paving/layout-document';
import { COURT_CHEQUER } from '@/server/demo-layouts';
import { addPerson } from '@/server/people';
import type { Actor } from '@/server/permissions';
import type { VersionEventKind } from '@/api-types/versions';
import { addVersionEvent } from '@/server/versions';
import { db, Visitor } from './site';

export const PASSWORD = 'a long enough password';

let firms = 0;

export interface Signed {
  readonly visitor: Visitor;
  readonly actor: Actor;
  readonly email: string;
}

/** The L-shaped court with its tree pit, 450 mm slabs as a chequer at 45°. */
export const court = (): LayoutDocument => structuredClone(COURT_CHEQUER);

/** A document whose ring crosses itself: the shape of one, but not one that can be laid. */
export const crossing = (): LayoutDocument => ({
  ...court(),
  ground: {
    perimeter: [
      [0, 0],
      [4000, 3000],
      [4000, 0],
      [0, 3000],
    ],
    keepOuts: [],
  },
});

export const moved = (document: LayoutDocument, x: number): LayoutDocument => ({
  ...document,
  placement: { ...document.placement, origin: [x, document.placement.origin[1]] },
});

/** Signs up a new firm through the endpoint. */
export const newFirm = async (): Promise<Signed> => {
  firms += 1;
  const visitor = new Visitor();
  const email = `owner${firms}@firm.example`;
  const answer = await visitor.post('/api/sign-up', {
    firmName: `Firm ${firms}`,
    name: `Owner ${firms}`,
    email,
    password: PASSWORD,
  });
  if (answer.status !== 201) throw new Error(JSON.stringify(answer.body));
  const { id, firm, role } = answer.body;
  return { visitor, email, actor: { personId: id, firmId: firm.id, role } };
};

let members = 0;

/** Adds somebody to a firm and signs them in through the endpoint. */
export const newMember = async (firmId: string, role: Role): Promise<Signed> => {
  members += 1;
  const email = `${role}-${members}@firm.example`;
  const personId = await addPerson(await db(), firmId, role, {
    name: `${role} ${members}`,
    email,
    password: PASSWORD,
    display: 'metric',
  });
  const visitor = new Visitor();
  const answer = await visitor.post('/api/sign-in', { email, password: PASSWORD });
  if (answer.status !== 200) throw new Error(JSON.stringify(answer.body));
  return { visitor, email, actor: { personId, firmId, role } };
};

export interface Made {
  readonly projectId: string;
  readonly layoutId: string;
}

export const newProject = async (visitor: Visitor, document = court()): Promise<Made> => {
  const project = await visitor.post('/api/projects', { name: 'Court' });
  const layout = await visitor.post(`/api/projects/${project.body.id}/layouts`, {
    name: 'Chequer',
    document,
  });
  if (layout.status !== 201) throw new Error(JSON.stringify(layout.body));
  return { projectId: project.body.id, layoutId: layout.body.id };
};

/** Saves a version of the draft as it stands; its id. */
export const newVersion = async (visitor: Visitor, layoutId: string, label = 'One') => {
  const draft = await visitor.get(`/api/layouts/${layoutId}/draft`);
  const version = await visitor.post(`/api/layouts/${layoutId}/versions`, {
    baseRevision: draft.body.revision,
    label,
  });
  if (version.status !== 201) throw new Error(JSON.stringify(version.body));
  return version.body as { id: string; number: number };
};

/** Puts an event on a version, whether or not it may follow there. */
export const putEvent = async (
  actor: Actor,
  versionId: string,
  kind: VersionEventKind,
  note = '',
): Promise<void> => {
  await (await db()).transaction((tx) => addVersionEvent(tx, actor, versionId, kind, note));
};

import { statuses, type Row, type World } from './role-rows';
import { newMember, PASSWORD } from './firm';
import { tokenFor } from './letters-to';
import { Visitor } from './site';

const OWN = 'one’s own account';
const MANAGING = 'people, roles, firm settings';
const DRAFTS = 'projects, drafts, saving and sharing versions';

const own = (success = 200) =>
  statuses([success, success, success, success, success, success, success, 401]);
/** The stranger is the owner of a firm of their own. */
const managing = (success: number, ofAnother = 404) =>
  statuses([success, 403, 403, 403, 403, 403, ofAnother, 401]);
const drafting = (success: number) => statuses([success, success, 403, 403, 404, 404, 404, 401]);
const anybody = (success: number) =>
  statuses([success, success, success, success, success, success, success, success]);

let counted = 0;
const newAddress = () => `asked${(counted += 1)}@elsewhere.example`;

/** An open invitation of the firm, made anew for each that asks, since one is used up. */
const invited = async ({ people }: World) => {
  const email = newAddress();
  const { visitor } = people.owner;
  const answer = await visitor.post('/api/invitations', { email, role: 'installer' });
  return { email, id: answer.body.id as string };
};

const removable = async ({ firmId }: World) =>
  (await newMember(firmId, 'installer')).actor.personId;

/** People, accounts and letters. */
export const peopleRows: readonly Row[] = [
  { row: MANAGING, endpoint: 'GET /api/people', expected: managing(200, 200) },
  {
    row: MANAGING,
    endpoint: 'PATCH /api/people/[id]',
    id: ({ installerId }) => installerId,
    body: () => ({ role: 'installer' }),
    expected: managing(200),
  },
  {
    row: MANAGING,
    endpoint: 'DELETE /api/people/[id]',
    id: removable,
    expected: managing(200),
  },
  { row: MANAGING, endpoint: 'GET /api/invitations', expected: managing(200, 200) },
  {
    row: MANAGING,
    endpoint: 'POST /api/invitations',
    body: () => ({ email: newAddress(), role: 'installer' }),
    expected: managing(201, 201),
  },
  {
    row: `${MANAGING}: to a project of the firm`,
    endpoint: 'POST /api/invitations',
    body: ({ project }) => ({ email: newAddress(), role: 'client', projectId: project }),
    expected: managing(201),
  },
  {
    row: MANAGING,
    endpoint: 'DELETE /api/invitations/[id]',
    id: async (world) => (await invited(world)).id,
    expected: managing(200),
  },
  {
    row: MANAGING,
    endpoint: 'POST /api/invitations/[id]/again',
    id: async (world) => (await invited(world)).id,
    expected: managing(200),
  },
  { row: MANAGING, endpoint: 'GET /api/firm', expected: managing(200, 200) },
  {
    row: MANAGING,
    endpoint: 'PATCH /api/firm',
    body: () => ({ name: 'Renamed' }),
    expected: managing(200, 200),
  },
  {
    row: DRAFTS,
    endpoint: 'GET /api/projects/[id]/people',
    id: ({ project }) => project,
    expected: drafting(200),
  },
  {
    row: DRAFTS,
    endpoint: 'POST /api/projects/[id]/people',
    id: ({ project }) => project,
    body: ({ installerId }) => ({ personId: installerId }),
    expected: drafting(200),
  },
  {
    row: `${DRAFTS}: somebody who is not on it`,
    endpoint: 'POST /api/projects/[id]/people/remove',
    id: ({ project }) => project,
    body: () => ({ personId: 'nobody' }),
    expected: drafting(200),
  },
  { row: OWN, endpoint: 'GET /api/account/mail', expected: own() },
  {
    row: OWN,
    endpoint: 'PATCH /api/account/mail',
    body: () => ({ digest: 'daily' }),
    expected: own(),
  },
  { row: OWN, endpoint: 'GET /api/account/firms', expected: own() },
  {
    row: `${OWN}: only into a firm of one’s own`,
    endpoint: 'POST /api/account/firm',
    body: ({ firmId }) => ({ firmId }),
    expected: statuses([200, 200, 200, 200, 200, 200, 404, 401]),
  },
  { row: OWN, endpoint: 'GET /api/account/sessions', expected: own() },
  {
    row: `${OWN}: nobody else’s session`,
    endpoint: 'DELETE /api/account/sessions/[id]',
    id: async ({ firmId }) => {
      const other = await newMember(firmId, 'designer');
      return (await other.visitor.get('/api/account/sessions')).body.sessions[0].id;
    },
    expected: own(404),
  },
  {
    row: OWN,
    endpoint: 'POST /api/account/sessions/end-others',
    expected: own(),
  },
  {
    row: OWN,
    endpoint: 'POST /api/account/password',
    body: () => ({ current: PASSWORD, password: PASSWORD }),
    expected: own(),
  },
  {
    row: `${OWN}: the only owner of a firm stays; the others leave the firm`,
    endpoint: 'POST /api/account/leave',
    visitor: async ({ people, firmId }, asker) => {
      if (asker === 'nobody') return new Visitor();
      if (asker === 'owner' || asker === 'stranger') return people[asker].visitor;
      const [role] = asker.split(' ');
      return (await newMember(firmId, role as 'designer' | 'installer' | 'client')).visitor;
    },
    expected: statuses([403, 200, 200, 200, 200, 200, 403, 401]),
  },
  {
    row: 'open to all: the invitation’s token brings in',
    endpoint: 'POST /api/accept-invitation',
    visitor: () => new Visitor(),
    body: async (world) => ({
      token: await tokenFor((await invited(world)).email),
      name: 'Invited',
      password: PASSWORD,
    }),
    expected: anybody(200),
  },
  {
    row: 'open to all: the answer tells nothing',
    endpoint: 'POST /api/forgotten-password',
    visitor: () => new Visitor(),
    body: ({ people }, asker) => ({ email: people[asker].email }),
    expected: anybody(200),
  },
  {
    row: 'open to all: a token that was never sent opens nothing',
    endpoint: 'POST /api/reset-password',
    visitor: () => new Visitor(),
    body: () => ({ token: 'never-sent', password: PASSWORD }),
    expected: anybody(404),
  },
  {
    row: 'only where no letters are sent, and only from near',
    endpoint: 'GET /api/dev/mail',
    expected: anybody(404),
  },
  {
    row: 'only where no letters are sent, and only from near',
    endpoint: 'GET /api/dev/mail/[id]',
    id: () => '1796110984017-abc',
    expected: anybody(404),
  },
];

import type { Account } from '@/api-types/people';
import type { SendSiteEntries, SiteEntry, SitePack, SitePacks } from '@/api-types/site';
import { COURT_CHEQUER } from '@/server/demo-layouts';

export const account = (id: string, role: Account['role'] = 'installer'): Account => ({
  id,
  name: `Person ${id}`,
  email: `${id}@firm.example`,
  display: 'metric',
  firm: { id: 'firm', name: 'Firm' },
  role,
});

export const pack = (versionId: string, entries: readonly SiteEntry[] = []): SitePack => ({
  versionId,
  number: 1,
  label: 'One',
  layoutId: 'layout',
  layoutName: 'Court',
  projectId: 'project',
  projectName: 'Court',
  siteNote: '',
  state: 'issued',
  issuedAt: '2026-05-04T06:00:00.000Z',
  supersededBy: null,
  firmName: 'Firm',
  shortFingerprint: '0123456789',
  issuedBy: { id: 'owner', name: 'Owner' },
  issueNote: '',
  note: '',
  document: COURT_CHEQUER,
  standing: { versionId, state: 'issued', supersededBy: null, entries },
});

type Answer = { readonly status: number; readonly body: unknown } | 'lost' | 'no-signal';

/** What the phone asks of a server, and a server that keeps what it is sent, each once and in the order it came in. */
export class FakeServer {
  person: Account | null = account('joss');
  packs: SitePack[] = [pack('v1')];
  readonly kept: { id: string; place: number; kind: string }[] = [];
  readonly asked: string[] = [];
  photos = new Map<string, number>();
  /** Says what becomes of a request before it is answered; undefined lets it be answered. */
  meddle: (method: string, path: string, body: string) => Answer | undefined = () => undefined;

  readonly key = (id: string) =>
    Buffer.from(id.padEnd(32, '.').slice(0, 32), 'utf8').toString('base64');

  fetch = async (url: string | URL | Request, init: RequestInit = {}): Promise<Response> => {
    const [method, path] = [init.method ?? 'GET', String(url)];
    this.asked.push(`${method} ${path.split('?')[0]}`);
    const meddled = this.meddle(method, path, typeof init.body === 'string' ? init.body : '');
    if (meddled === 'no-signal') throw new TypeError('Failed to fetch');
    if (meddled && meddled !== 'lost') return this.response(meddled.status, meddled.body);
    const answer = this.answer(method, path, init);
    // It was done, but nobody heard.
    if (meddled === 'lost') throw new TypeError('Failed to fetch');
    return answer;
  };

  private response(status: number, body: unknown): Response {
    return new Response(JSON.stringify(body), { status });
  }

  private answer(method: string, path: string, init: RequestInit): Response {
    if (!this.person) return this.response(401, { detail: 'Sign in to go on.' });
    const { pathname, searchParams } = new URL(path, 'http://phone.test');
    const [, , versionId, what] = pathname.split('/').slice(1);
    if (pathname === '/api/site') {
      const body: SitePacks = {
        account: this.person,
        keep: 'all',
        key: this.key(this.person.id),
        packs: this.packs.map(({ document: _document, standing: _standing, ...rest }) => rest),
      };
      return this.response(200, body);
    }
    const asked = this.packs.find((each) => each.versionId === versionId);
    if (!asked) return this.response(404, { detail: 'There is no such version.' });
    if (what === 'site-pack') return this.response(200, asked);
    if (what === 'site-photos') {
      const id = searchParams.get('id')!;
      if (searchParams.get('by') !== this.person.id) return this.response(403, {});
      this.keep(id, Number(searchParams.get('place')), 'photo');
      this.photos.set(id, (init.body as ArrayBuffer).byteLength);
      return this.response(201, { id, width: 1, height: 1 });
    }
    if (method === 'GET') return this.response(200, asked.standing);
    const sent = JSON.parse(String(init.body)) as SendSiteEntries;
    if (sent.by !== this.person.id) return this.response(403, { detail: 'Somebody else’s.' });
    for (const { id, place, content } of sent.entries) this.keep(id, place, content.kind);
    return this.response(200, { kept: sent.entries.map(({ id }) => id), refused: [] });
  }

  private keep(id: string, place: number, kind: string) {
    if (!this.kept.some((each) => each.id === id)) this.kept.push({ id, place, kind });
  }
}

import { fireEvent, render, screen } from '@testing-library/react';
import { describe, expect, it, vi } from 'vitest';
import type { VersionDetail } from '@/api-types/versions';
import PlanView from '@/components/version/PlanView';
import StartDraft from '@/components/version/StartDraft';
import { planFileName } from '@/components/version/plan-file-name';
import { NO_STAMP } from '@/sheets/plan-input';
import { documentNumber } from '@/components/version/version-plan';
import { layFloor } from '@/paving/laying';
import { floorReport } from '@/paving/report';
import { COURT } from '../sheets/sample-floors';

const stamp = { ...NO_STAMP, currentUrl: 'https://floors.example/current/v3' };
const { edges: _, ...figures } = floorReport(layFloor(COURT));
const VERSION: VersionDetail = {
  id: 'v3',
  layoutId: 'lay0abc123',
  number: 3,
  label: 'Most slabs',
  note: '',
  state: 'shared',
  createdAt: '2026-10-14T09:30:00.000Z',
  createdBy: { id: 'p1', name: 'Tess Aldine' },
  shortFingerprint: 'a1b2c3d4e5',
  fingerprint: 'a1b2c3d4e5f6',
  figures,
  report: floorReport(layFloor(COURT)),
  document: COURT,
  projectId: 'pr1',
  projectName: 'Court behind the dairy',
  layoutName: 'Diamond chequer',
  firmName: 'Hollin & Sedge Paving',
  clientName: '',
  siteNote: '',
  events: [],
};

describe('the plan on screen', () => {
  it('shows the sheet and its scale, on the paper asked for', () => {
    const { container } = render(<PlanView version={VERSION} stamp={stamp} />);
    const size = () => container.querySelector('[data-sheet] svg')!.getAttribute('viewBox');
    expect(size()).toBe('0 0 210 297');
    expect(container.textContent).toContain('1:50 on A4');
    fireEvent.change(screen.getByLabelText('Paper'), { target: { value: 'Tabloid' } });
    expect(['0 0 279.4 431.8', '0 0 431.8 279.4']).toContain(size());
    expect(container.textContent).toContain('on Tabloid');
  });

  it('says so, and stays usable, when the PDF cannot be made', async () => {
    vi.stubGlobal('fetch', () => Promise.resolve(new Response(null, { status: 503 })));
    render(<PlanView version={VERSION} stamp={stamp} />);
    fireEvent.click(screen.getByRole('button', { name: 'Download PDF' }));
    expect((await screen.findByRole('alert')).textContent).toContain('could not be made');
    expect(screen.getByRole<HTMLButtonElement>('button', { name: 'Download PDF' }).disabled).toBe(
      false,
    );
    vi.unstubAllGlobals();
  });
});

describe('what the plan’s typeface lacks', () => {
  it('is said on screen, with the texts and letters in question, and not on the sheet', () => {
    const named = {
      ...VERSION,
      projectName: '庭 at the mill',
      document: { ...COURT, notes: '石' },
    };
    const { container } = render(<PlanView version={named} stamp={stamp} />);
    const note = screen.getByRole('note').textContent;
    expect(note).toContain('Some letters of the project’s name and the notes');
    expect(note).toContain('庭 石');
    expect(container.querySelector('[data-sheet]')!.textContent).toContain('? at the mill');
  });

  it('goes without saying where every letter is there', () => {
    // Polish and Cyrillic letters are in the typeface.
    render(<PlanView version={{ ...VERSION, projectName: 'Łódź, двор' }} stamp={stamp} />);
    expect(screen.queryByRole('note')).toBeNull();
  });
});

describe('the time of a version', () => {
  it('is the reader’s own on screen, and UTC by name on the sheet', () => {
    // Asia/Kolkata keeps UTC+5:30 all the year (IANA time zone database).
    vi.stubEnv('TZ', 'Asia/Kolkata');
    const { container } = render(<PlanView version={VERSION} stamp={stamp} />);
    expect(container.querySelector('time')!.textContent).toContain('15:00');
    expect(container.querySelector('[data-sheet]')!.textContent).toContain('2026-10-14 09:30 UTC');
    vi.unstubAllEnvs();
  });
});

describe('starting a draft from a version', () => {
  it('says what happens first, and keeps the person here when the draft has moved on', async () => {
    const sent: unknown[] = [];
    vi.stubGlobal('fetch', (path: string, init: RequestInit) => {
      sent.push([path, JSON.parse(init.body as string)]);
      return Promise.resolve(
        new Response(JSON.stringify({ detail: 'The draft has moved on.' }), { status: 409 }),
      );
    });
    render(<StartDraft layoutId="lay" versionId="v3" versionNumber={3} baseRevision={12} />);
    expect(screen.queryByRole('button', { name: 'Start from version 3' })).toBeNull();
    fireEvent.click(screen.getByRole('button', { name: 'Start a draft from this' }));
    expect(screen.getByText(/set aside, not lost/)).toBeTruthy();
    fireEvent.click(screen.getByRole('button', { name: 'Start from version 3' }));
    expect((await screen.findByRole('alert')).textContent).toContain('moved on');
    expect(screen.getByRole('button', { name: 'Look again' })).toBeTruthy();
    expect(sent).toEqual([
      ['/api/layouts/lay/draft/from-version', { versionId: 'v3', baseRevision: 12 }],
    ]);
    vi.unstubAllGlobals();
  });
});

describe('a plan’s file name', () => {
  const named = (projectName: string, layoutName: string, layoutId = VERSION.layoutId) =>
    planFileName({ projectName, layoutName, layoutId, number: 3 });

  it('tells apart the same version of two layouts, however long or foreign their names', () => {
    const long = 'The courtyard behind the old dairy by the mill race at the end of the lane';
    const names = [
      named(long, 'Diamond'),
      named(long, 'Square'),
      named(long, `${long}, one`, 'lay0aaaaaa'),
      named(long, `${long}, two`, 'lay0bbbbbb'),
      named('庭', '一', 'lay0aaaaaa'),
      named('庭', '二', 'lay0bbbbbb'),
    ];
    expect(new Set(names).size).toBe(names.length);
    for (const name of names) expect(name).toMatch(/^[a-z0-9]+(-[a-z0-9]+)*-v3$/);
  });

  it('writes Latin letters of other languages without their marks', () => {
    // Ł, Þ, Æ, ß as in the machine-readable zone of passports (ICAO Doc 9303-3, section 6, from memory);
    // Ø as O and umlauts without their dots: common practice in file names.
    expect(named('Łąka', 'Größe Ørsted')).toBe('laka-grosse-orsted-v3');
    expect(named('Æsir Þing', 'Café')).toBe('aesir-thing-cafe-v3');
  });
});

describe('a plan’s names', () => {
  it('are the same on every sheet of a version, and safe as file names', () => {
    expect(documentNumber(VERSION)).toBe('ABC123-3');
    expect(planFileName(VERSION)).toBe('court-behind-the-dairy-diamond-chequer-v3');
    expect(planFileName({ ...VERSION, projectName: '庭', layoutName: '../..' })).toBe(
      'plan-abc123-v3',
    );
  });
});

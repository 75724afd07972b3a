import { QueryClient, QueryClientProvider } from '@tanstack/react-query';
import { fireEvent, render, screen, waitFor } from '@testing-library/react';
import { useState, type ReactNode } from 'react';
import { afterEach, describe, expect, it, vi } from 'vitest';
import type { AcceptVersion, Agreement, AskChange } from '@/api-types/agreement';
import type { VersionDetail } from '@/api-types/versions';
import { AcceptForm } from '@/components/review/AcceptForm';
import { useSteps } from '@/components/review/agreement';
import { AskChangeForm, type ChangePin } from '@/components/review/AskChangeForm';
import { FirmSteps } from '@/components/review/FirmSteps';
import { PlainFigures } from '@/components/review/PlainFigures';
import { layFloor } from '@/paving/laying';
import { floorReport } from '@/paving/report';
import { COURT } from '../sheets/sample-floors';

const report = floorReport(layFloor(COURT));
const VERSION = {
  id: 'v3',
  layoutId: 'l1',
  number: 3,
  label: 'Most slabs',
  state: 'shared',
  document: COURT,
  report,
  layoutName: 'Diamond chequer',
  projectName: 'Court behind the dairy',
  firmName: 'Hollin & Sedge Paving',
} as unknown as VersionDetail;
const no = (why: string | null) => ({ may: false, why });
const AGREEMENT: Agreement = {
  versionId: 'v3',
  state: 'shared',
  steps: {
    share: no('This version is shared already.'),
    accept: { may: true, why: null },
    askChange: { may: true, why: null },
    issue: no('The client has not accepted this version yet.'),
  },
  terms: 'Half on order, half when laid.',
  fingerprint: 'ab'.repeat(32),
  acceptance: null,
  issued: null,
};

/** Answers every request from a list of paths, and keeps what was sent. */
function server(answers: Record<string, (body: unknown) => [status: number, answer: unknown]>) {
  const sent: { path: string; body: unknown }[] = [];
  vi.stubGlobal('fetch', async (path: string, init: RequestInit) => {
    const body = init.body ? JSON.parse(String(init.body)) : undefined;
    if (init.method !== 'GET') sent.push({ path, body });
    const [status, answer] = answers[path]?.(body) ?? [404, { detail: 'Not here.' }];
    return new Response(JSON.stringify(answer), { status });
  });
  return sent;
}
afterEach(() => vi.unstubAllGlobals());

const within = (children: ReactNode) =>
  render(
    <QueryClientProvider
      client={new QueryClient({ defaultOptions: { queries: { retry: false } } })}
    >
      {children}
    </QueryClientProvider>,
  );

function Accepting({ onClose }: { onClose: () => void }) {
  const { accept } = useSteps('v3');
  return (
    <AcceptForm open onClose={onClose} version={VERSION} agreement={AGREEMENT} accept={accept} />
  );
}

describe('accepting', () => {
  it('asks for a typed name, and sends what was shown: terms and fingerprint', async () => {
    const sent = server({ '/api/versions/v3/accept': () => [200, {}] });
    const onClose = vi.fn();
    within(<Accepting onClose={onClose} />);
    expect(screen.getByTestId('terms').textContent).toBe(AGREEMENT.terms);
    fireEvent.click(screen.getByRole('button', { name: 'I accept this floor' }));
    expect(await screen.findByText(/Type your name: it stands/)).toBeTruthy();
    expect(sent).toEqual([]);
    fireEvent.change(screen.getByLabelText('Type your full name'), {
      target: { value: '  Odile Marrow ' },
    });
    fireEvent.click(screen.getByRole('button', { name: 'I accept this floor' }));
    await waitFor(() => expect(onClose).toHaveBeenCalledOnce());
    expect(sent).toEqual([
      {
        path: '/api/versions/v3/accept',
        body: {
          typedName: 'Odile Marrow',
          terms: AGREEMENT.terms,
          fingerprint: AGREEMENT.fingerprint,
          note: '',
        } satisfies AcceptVersion,
      },
    ]);
  });

  it('stays open and says so when the terms were changed meanwhile', async () => {
    server({
      '/api/versions/v3/accept': () => [409, { detail: 'The firm’s terms have changed.' }],
    });
    const onClose = vi.fn();
    within(<Accepting onClose={onClose} />);
    fireEvent.change(screen.getByLabelText('Type your full name'), { target: { value: 'Odile' } });
    fireEvent.click(screen.getByRole('button', { name: 'I accept this floor' }));
    expect((await screen.findByRole('alert')).textContent).toContain('terms have changed');
    expect(screen.getByText(/Nothing was accepted/)).toBeTruthy();
    expect(onClose).not.toHaveBeenCalled();
  });
});

function Asking({ onLeave }: { onLeave: () => void }) {
  const { askChange } = useSteps('v3');
  const [pins, setPins] = useState<readonly ChangePin[]>([]);
  return (
    <AskChangeForm
      pins={pins}
      onPins={setPins}
      picking={false}
      onPickSpot={() => setPins([...pins, { at: [1200.5, 800], body: '' }])}
      onLeave={onLeave}
      askChange={askChange}
    />
  );
}

describe('asking for a change', () => {
  it('sends the words and the pins at their spots of the ground, and no pin without words', async () => {
    const sent = server({ '/api/versions/v3/ask-change': () => [200, {}] });
    const onLeave = vi.fn();
    within(<Asking onLeave={onLeave} />);
    fireEvent.click(screen.getByRole('button', { name: 'Mark a spot on the floor' }));
    fireEvent.change(screen.getByLabelText('What should be different?'), {
      target: { value: 'Lighter slabs' },
    });
    fireEvent.click(screen.getByRole('button', { name: 'Ask for this change' }));
    expect(await screen.findByText(/or take the pin out/)).toBeTruthy();
    expect(sent).toEqual([]);
    fireEvent.change(screen.getByLabelText('At pin 1'), { target: { value: 'Too dark here' } });
    fireEvent.click(screen.getByRole('button', { name: 'Ask for this change' }));
    await waitFor(() => expect(onLeave).toHaveBeenCalledOnce());
    expect(sent[0].body).toEqual({
      note: 'Lighter slabs',
      pins: [{ at: [1200.5, 800], body: 'Too dark here' }],
    } satisfies AskChange);
  });
});

describe('what the firm may do', () => {
  it('gives the reason for what may not be done now', async () => {
    server({ '/api/versions/v3/agreement': () => [200, AGREEMENT] });
    within(<FirmSteps version={VERSION} />);
    const issue = await screen.findByRole('button', { name: 'Issue for set-out' });
    expect((issue as HTMLButtonElement).disabled).toBe(true);
    const why = issue.getAttribute('aria-describedby')!;
    expect(document.getElementById(why)!.textContent).toBe(AGREEMENT.steps.issue.why);
  });
});

describe('a client’s figures', () => {
  it('are those of the report, without words of the trade', () => {
    const { container } = within(<PlainFigures version={VERSION} />);
    const text = container.textContent!.replace(/[\u202f\u2009]/g, ' ');
    expect(text).toContain(`${report.groundArea.toFixed(2)} m²`);
    expect(text).toContain(String(report.wholeUnits));
    for (const word of ['joint', 'bond', 'lattice', 'clearance', 'play', 'left out'])
      expect(text.toLowerCase()).not.toContain(word);
  });
});

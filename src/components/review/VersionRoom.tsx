import { STATE_WORDS } from '../ui/version-words';
import { useQuery } from '@tanstack/react-query';
import { useEffect, useRef, useState, type ReactNode } from 'react';
import type { Role } from '@/api-types/people';
import type { VersionDetail } from '@/api-types/versions';
import type { Point } from '@/geometry/point';
import { Comments } from '../comments/Comments';
import { useThreads } from '../comments/threads';
import { useLiveRefresh } from '../live/live-refresh';
import { api } from '../ui/api';
import { ClientQuote } from '../quote/ClientQuote';
import { OnSite } from '../site-progress/OnSite';
import { Queries } from '../ui/Queries';
import { useAgreement } from './agreement';
import { type ChangePin } from './AskChangeForm';
import { Choices } from './Choices';
import { ClientAnswer } from './ClientAnswer';
import { FirmSteps } from './FirmSteps';
import { NewerVersion } from './NewerVersion';
import { PlainFigures } from './PlainFigures';
import { VersionEvents } from './VersionEvents';
import { VersionFloor } from './VersionFloor';

interface Props {
  readonly version: VersionDetail;
  readonly role: Role;
  /** The thread that a link leads to. */
  readonly thread: string | null;
  /** The designer's figures, drawn by the page. */
  readonly children?: ReactNode;
  /** What the firm does with a version besides: plan, table, a draft from it. */
  readonly tools?: ReactNode;
}

/** One version, for everybody who sees it: the floor, what it is, what is said about it and what is decided. */
export default function VersionRoom(props: Props) {
  return (
    <Queries>
      <Room {...props} />
    </Queries>
  );
}

type Picking = 'comment' | 'change' | null;

function Room({ version: first, role, thread, children, tools }: Props) {
  const client = role === 'client';
  const { data: version } = useQuery({
    queryKey: ['version', first.id],
    queryFn: () => api<VersionDetail>('GET', `/api/versions/${first.id}`),
    initialData: first,
  });
  const { state: live, gone } = useLiveRefresh(first.projectId);
  const agreement = useAgreement(first.id);
  const threads = useThreads(first.id);
  const [picking, setPicking] = useState<Picking>(null);
  const [spot, setSpot] = useState<Point | null>(null);
  const [pins, setPins] = useState<readonly ChangePin[]>([]);
  const [picked, setPicked] = useState<string | null>(thread);
  const floor = useRef<HTMLElement>(null);
  const panel = useRef<HTMLDivElement>(null);

  useEffect(() => {
    if (picking) floor.current?.scrollIntoView({ block: 'nearest' });
  }, [picking]);
  // The strip over the page is the page's own; where the version stands must be right there too.
  useEffect(() => {
    const cell = document.querySelector('[data-cell=state]');
    if (cell) cell.textContent = STATE_WORDS[version.state];
  }, [version.state]);
  const onSpot = (at: Point) => {
    if (picking === 'comment') setSpot(at);
    else setPins((now) => [...now, { at, body: '' }]);
    setPicking(null);
  };
  const onPick = (id: string | null) => setPicked((now) => (now === id ? null : id));

  return (
    <div className="flex flex-col lg:h-[calc(100dvh-53px)] lg:min-h-[34rem] lg:flex-row">
      <section
        ref={floor}
        aria-label="The floor"
        className="h-[62vh] min-h-80 border-b border-stone-300 lg:h-auto lg:min-w-0 lg:flex-1 lg:border-r lg:border-b-0"
      >
        <VersionFloor
          version={version}
          figured={!client}
          threads={threads.data ?? []}
          drafts={spot ? [spot] : pins.map(({ at }) => at)}
          picked={picked}
          onPick={onPick}
          onSpot={picking ? onSpot : null}
          onLeaveSpot={() => setPicking(null)}
        />
      </section>
      <div ref={panel} className="space-y-6 p-5 lg:w-[25rem] lg:overflow-y-auto">
        {gone && (
          <p role="alert" className="bg-amber-wash p-3">
            This project is no longer shared with you. What you see here is not kept up to date.
          </p>
        )}
        <header>
          <h1>{version.label}</h1>
          <p className="mt-1 text-slate">
            Version {version.number} of {version.layoutName}
            {client && `, by ${version.firmName}`}
          </p>
          {version.note && <p className="mt-3 whitespace-pre-line">{version.note}</p>}
        </header>
        <NewerVersion version={version} live={live} client={client} />
        {client ? (
          <ClientAnswer
            version={version}
            agreement={agreement}
            pins={pins}
            onPins={setPins}
            picking={picking === 'change'}
            onPickSpot={() => setPicking('change')}
          />
        ) : (
          (role === 'owner' || role === 'designer') && <FirmSteps version={version} />
        )}
        {tools && <div>{tools}</div>}
        <OnSite version={version} role={role} />
        {client && <ClientQuote versionId={version.id} />}
        {client && <PlainFigures version={version} />}
        <Choices version={version} client={client} agreement={agreement.data} />
        <Comments
          versionId={version.id}
          spot={spot}
          onSpot={setSpot}
          onPickSpot={() => setPicking('comment')}
          picked={picked}
          onPick={setPicked}
        />
        {children && <div className="[&_section+section]:mt-6">{children}</div>}
        <VersionEvents events={version.events} />
        <p className="border-t border-stone-300 pt-2 text-sm text-slate">
          Fingerprint{' '}
          <span className="font-semibold break-all text-graphite">{version.shortFingerprint}</span>.
          It is printed on every sheet of this version and changes with any change of the floor.
        </p>
      </div>
    </div>
  );
}

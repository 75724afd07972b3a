import { useEffect, useRef, useState } from 'react';
import { PRESENCE_BEAT_S, type Presence, type Present } from '@/api-types/live';
import { api } from '../ui/api';
import { liveConnected } from './live-connection';
import { presentWords } from './present-words';

interface Props {
  readonly projectId: string;
  readonly layoutId: string;
  /** Changes whenever this table changes the draft. */
  readonly document: unknown;
  /** The number of the version saved last, as this table knows it. */
  readonly newestVersion: number;
  readonly onNewVersion: () => void;
}

/** How long a change counts as editing, ms: as long as the others are told. */
const EDITING_MS = 60_000;

/** Tells the others that this draft is open here, and says who else has it open or is changing it. */
export function DraftPresence(props: Props) {
  const { projectId, layoutId, document: edited, newestVersion, onNewVersion } = props;
  const [present, setPresent] = useState<readonly Present[]>([]);
  const [newest, setNewest] = useState(0);
  const changedAt = useRef<number | null>(null);
  const first = useRef(edited);
  const beat = useRef<() => void>(() => {});

  useEffect(() => {
    const path = `/api/layouts/${layoutId}/presence`;
    const state = (): Presence['state'] =>
      changedAt.current !== null && Date.now() - changedAt.current < EDITING_MS
        ? 'editing'
        : 'looking';
    const send = async () => {
      try {
        const body: Presence = { state: state() };
        setPresent((await api<{ present: Present[] }>('PUT', path, body)).present);
      } catch {
        // The table works without it, and the next beat tells again.
      }
    };
    const gone = () => {
      const body: Presence = { state: 'gone' };
      void api('PUT', path, body, { keepalive: true }).catch(() => {});
    };
    beat.current = () => void send();
    void send();
    const timer = setInterval(() => void send(), PRESENCE_BEAT_S * 1000);
    window.addEventListener('pagehide', gone);
    return () => {
      clearInterval(timer);
      window.removeEventListener('pagehide', gone);
      gone();
    };
  }, [layoutId]);

  useEffect(() => {
    if (edited === first.current) return;
    first.current = edited;
    const before = changedAt.current;
    changedAt.current = Date.now();
    if (before === null || changedAt.current - before > EDITING_MS) beat.current();
  }, [edited]);

  useEffect(
    () =>
      liveConnected(projectId, (state) => {
        const layout = state.layouts.find(({ id }) => id === layoutId);
        if (!layout) return;
        setPresent(layout.present);
        setNewest(layout.versions[0]?.number ?? 0);
      }),
    [projectId, layoutId],
  );

  const behind = newest > newestVersion;
  useEffect(() => {
    if (behind) onNewVersion();
  }, [behind, onNewVersion]);

  const words = presentWords(present);
  if (!words) return null;
  return (
    <p
      role="status"
      data-testid="presence"
      className="border-b border-amber bg-amber-wash px-4 py-1.5 text-amber"
    >
      {words} Saves of both are kept: whoever saves second chooses which to go on with.
    </p>
  );
}

import { LIVE_POLL_S, type LiveState } from '@/api-types/live';
import { api, ApiError } from '../ui/api';

/** After a stream that cannot be had, how long until it is asked for again, ms. */
const AGAIN_MS = 5 * LIVE_POLL_S * 1000;

/**
 * Tells how a project stands, at once and whenever it changes, until the returned function is called. Where
 * server-sent events cannot be had, it asks for the same by and by. `onGone`: it is no longer theirs to see.
 */
export function liveConnected(
  projectId: string,
  onState: (state: LiveState) => void,
  onGone: () => void = () => {},
): () => void {
  const path = `/api/projects/${projectId}/live`;
  let ended = false;
  let stream: EventSource | null = null;
  let timer: ReturnType<typeof setTimeout> | undefined;

  const poll = async () => {
    try {
      const state = await api<LiveState>('GET', path);
      if (!ended) onState(state);
    } catch (error) {
      if (error instanceof ApiError && [401, 403, 404].includes(error.status)) return;
    }
    if (!ended) timer = setTimeout(open, AGAIN_MS);
  };
  const open = () => {
    if (typeof EventSource === 'undefined') return void poll();
    stream = new EventSource(`${path}/stream`);
    stream.addEventListener('state', (event) => onState(JSON.parse(event.data) as LiveState));
    stream.addEventListener('gone', () => {
      stop();
      onGone();
    });
    // A stream that merely ended comes again by itself; one that was refused is closed.
    stream.addEventListener('error', () => {
      if (stream?.readyState === EventSource.CLOSED && !ended) void poll();
    });
  };
  const stop = () => {
    ended = true;
    clearTimeout(timer);
    stream?.close();
    window.removeEventListener('pagehide', stop);
  };
  window.addEventListener('pagehide', stop);
  open();
  return stop;
}

import type { Outcome } from './outcomes';
import { done } from './outcomes';
import { endBeforeClosing, type Db } from './database';
import { liveState } from './live';
import { logError } from './log';
import type { Actor } from './permissions';
import { watchProject } from './project-watch';
import { signedInBy } from './sessions';

/** Proxies close a connection on which nothing moves for a minute. */
const PING_MS = 20_000;

/** Streams that are open, to be ended before the server closes: it waits for its connections. */
const open = new Set<() => void>();
let endsWithServer = false;

const stillSignedIn = async (db: Db, actor: Actor, sessionId: string): Promise<boolean> => {
  const signedIn = await signedInBy(db, sessionId);
  return (
    signedIn !== null &&
    signedIn.account.id === actor.personId &&
    signedIn.account.firm.id === actor.firmId &&
    signedIn.account.role === actor.role
  );
};

/**
 * The live state of a project as server-sent events, for `seconds`. Before each state the person's session and role are
 * asked for again, so that whoever is removed gets `gone` and nothing more.
 */
export const liveStream = async (
  db: Db,
  actor: Actor,
  projectId: string,
  sessionId: string,
  seconds: number,
): Promise<Outcome<ReadableStream<Uint8Array>>> => {
  const first = await liveState(db, actor, projectId);
  if (!first.ok) return first;
  if (!endsWithServer) {
    endsWithServer = true;
    endBeforeClosing(async () => {
      for (const end of [...open]) end();
    });
  }
  const encoder = new TextEncoder();
  let end = () => {};
  return done(
    new ReadableStream<Uint8Array>({
      start: (controller) => {
        let sent = '';
        let ended = false;
        const write = (text: string) => {
          if (!ended) controller.enqueue(encoder.encode(text));
        };
        const sendState = (state: { readonly stamp: string }) => {
          if (state.stamp === sent) return;
          sent = state.stamp;
          write(`event: state\nid: ${state.stamp}\ndata: ${JSON.stringify(state)}\n\n`);
        };
        // States are worked out one at a time; what changes meanwhile is told by one more.
        let busy = false;
        let again = false;
        const changed = async (): Promise<void> => {
          again = true;
          if (busy) return;
          busy = true;
          try {
            while (again && !ended) {
              again = false;
              const signedIn = await stillSignedIn(db, actor, sessionId);
              const state = signedIn ? await liveState(db, actor, projectId) : null;
              if (state?.ok) {
                sendState(state.value);
              } else {
                write('event: gone\ndata: {}\n\n');
                end();
              }
            }
          } catch (error) {
            logError('live', error);
          } finally {
            busy = false;
          }
        };
        const unwatch =
          seconds > 0 ? watchProject(db, actor.firmId, projectId, () => void changed()) : () => {};
        const ping = setInterval(() => write(': \n\n'), PING_MS);
        const over = setTimeout(() => end(), seconds * 1000);
        ping.unref();
        over.unref();
        end = () => {
          if (ended) return;
          ended = true;
          open.delete(end);
          unwatch();
          clearInterval(ping);
          clearTimeout(over);
          try {
            controller.close();
          } catch {
            // The browser has gone already.
          }
        };
        open.add(end);
        write('retry: 2000\n\n');
        sendState(first.value);
        if (seconds === 0) end();
      },
      cancel: () => end(),
    }),
  );
};

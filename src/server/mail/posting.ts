import { endBeforeClosing, type Db } from '../database';
import { startDigests } from '../digest-posting';
import type { Environment } from '../environment';
import { localMailFolder } from './local-letters';
import { startLocalMailServer } from './local-server';
import { letterSender, type Sender } from './sender';
import { smtpPost } from './smtp-post';
import { SMTP_PATIENCE } from './smtp-settings';

/** How long the letter in hand may take when the process is told to stop, ms; its lease brings it back otherwise. */
const LAST_LETTER_MS = 5000;

const begin = async (db: Db, settings: Environment): Promise<Sender> => {
  const local = settings.smtpUrl
    ? null
    : await startLocalMailServer(localMailFolder(settings.dataDir));
  const url = settings.smtpUrl ?? local!.url;
  const sender = letterSender(db, smtpPost({ url, from: settings.mailFrom, ...SMTP_PATIENCE }));
  sender.start();
  startDigests(db);
  endBeforeClosing(async () => {
    await Promise.race([
      sender.stop(),
      new Promise((resolve) => setTimeout(resolve, LAST_LETTER_MS)),
    ]);
    await local?.close();
  });
  return sender;
};

/** On globalThis, so that modules loaded anew in development do not start a second one. */
const place = globalThis as typeof globalThis & { evenlayPosting?: Promise<Sender> };

/** Starts sending letters in this process, once: to SMTP_URL, or to a server of this process's own. */
export const startPosting = (db: Db, settings: Environment): Promise<Sender> =>
  (place.evenlayPosting ??= begin(db, settings));

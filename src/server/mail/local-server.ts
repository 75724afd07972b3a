import type { AddressInfo } from 'node:net';
import { SMTPServer } from 'smtp-server';
import { newId } from '../ids';
import { keepLetter } from './local-letters';

/** No letter of ours comes near it, bytes. */
const LARGEST = 5_000_000;

/** A mail server in this process that keeps what it takes. */
export interface LocalMailServer {
  readonly url: string;
  readonly close: () => Promise<void>;
}

/**
 * A mail server inside this process, for when none is set: it speaks SMTP on a free port of this machine
 * alone, and keeps what it is sent in a folder. Letters take the same way as they do to a real server.
 */
export const startLocalMailServer = async (folder: string): Promise<LocalMailServer> => {
  const server = new SMTPServer({
    name: 'localhost',
    banner: 'letters are kept on this machine',
    disabledCommands: ['AUTH', 'STARTTLS'],
    size: LARGEST,
    onData: (stream, _session, answer) => {
      const chunks: Buffer[] = [];
      stream.on('data', (chunk: Buffer) => chunks.push(chunk));
      stream.once('error', answer);
      stream.once('end', () => {
        keepLetter(folder, newId(), Buffer.concat(chunks)).then(() => answer(), answer);
      });
    },
  });
  server.on('error', () => {
    // A connection that broke: the sender has seen it too, and tries again.
  });
  await new Promise<void>((resolve, reject) => {
    server.server.once('error', reject);
    server.listen(0, '127.0.0.1', resolve);
  });
  server.server.unref();
  const { port } = server.server.address() as AddressInfo;
  return {
    url: `smtp://127.0.0.1:${port}`,
    close: () => new Promise((resolve) => server.close(() => resolve())),
  };
};

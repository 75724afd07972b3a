import { createServer, type AddressInfo, type Server, type Socket } from 'node:net';
import { simpleParser, type ParsedMail } from 'mailparser';
import { SMTPServer, type SMTPServerOptions } from 'smtp-server';
import { onTestFinished } from 'vitest';

export interface MailServer {
  readonly url: string;
  /** What it has taken, in order. */
  readonly taken: ParsedMail[];
  /** How many conversations were begun with it. */
  readonly conversations: () => number;
  readonly close: () => Promise<void>;
}

const listening = (server: Server, port = 0): Promise<number> =>
  new Promise((resolve, reject) => {
    server.once('error', reject);
    server.listen(port, '127.0.0.1', () => resolve((server.address() as AddressInfo).port));
  });

/** A mail server that works, with what is given otherwise. */
export const mailServer = async (
  options: SMTPServerOptions = {},
  port = 0,
): Promise<MailServer> => {
  const taken: ParsedMail[] = [];
  let begun = 0;
  const server = new SMTPServer({
    disabledCommands: ['AUTH', 'STARTTLS'],
    closeTimeout: 100,
    onConnect: (_session, answer) => {
      begun += 1;
      answer();
    },
    onData: (stream, _session, answer) => {
      const chunks: Buffer[] = [];
      stream.on('data', (chunk: Buffer) => chunks.push(chunk));
      stream.once('end', () => {
        void simpleParser(Buffer.concat(chunks)).then((mail) => {
          taken.push(mail);
          answer();
        }, answer);
      });
    },
    ...options,
  });
  server.on('error', () => {});
  const bound = await new Promise<number>((resolve, reject) => {
    server.server.once('error', reject);
    server.listen(port, '127.0.0.1', () => resolve((server.server.address() as AddressInfo).port));
  });
  const close = () => new Promise<void>((resolve) => server.close(() => resolve()));
  onTestFinished(close);
  return { url: `smtp://127.0.0.1:${bound}`, taken, conversations: () => begun, close };
};

/** Where a server written by hand does what no well-behaved one does. */
export type Fault =
  | 'no greeting'
  | 'turned away'
  | 'no answer to the recipient'
  | 'dead in the letter'
  | 'dead after the letter'
  | 'no answer after the letter';

const GREETING = '220 odd.example ESMTP\r\n';

const converse = (socket: Socket, fault: Fault): void => {
  socket.on('error', () => {});
  if (fault === 'no greeting') return;
  if (fault === 'turned away') {
    socket.end('421 4.3.2 Not now\r\n');
    return;
  }
  socket.write(GREETING);
  let rest = '';
  let inLetter = false;
  socket.on('data', (chunk) => {
    rest += chunk.toString('latin1');
    if (inLetter) {
      if (fault === 'dead in the letter') return void socket.destroy();
      if (!rest.endsWith('\r\n.\r\n')) return;
      if (fault === 'dead after the letter') socket.destroy();
      return;
    }
    const lines = rest.split('\r\n');
    rest = lines.pop() ?? '';
    for (const line of lines) {
      const [verb] = line.toUpperCase().split(/[ :]/);
      if (verb === 'RCPT' && fault === 'no answer to the recipient') return;
      if (verb === 'DATA') {
        inLetter = true;
        socket.write('354 Go on\r\n');
      } else if (verb === 'QUIT') socket.end('221 Bye\r\n');
      else socket.write('250 Yes\r\n');
    }
  });
};

/** A mail server that fails in one way, in each conversation. */
export const faultyServer = async (
  fault: Fault,
): Promise<{
  url: string;
  port: number;
  conversations: () => number;
  close: () => Promise<void>;
}> => {
  const sockets = new Set<Socket>();
  let begun = 0;
  const server = createServer((socket) => {
    begun += 1;
    sockets.add(socket);
    socket.once('close', () => sockets.delete(socket));
    converse(socket, fault);
  });
  const port = await listening(server);
  const close = () =>
    new Promise<void>((resolve) => {
      for (const socket of sockets) socket.destroy();
      server.close(() => resolve());
    });
  onTestFinished(close);
  return { url: `smtp://127.0.0.1:${port}`, port, conversations: () => begun, close };
};

/** An address where nothing listens. */
export const deadAddress = async (): Promise<string> => {
  const server = createServer();
  const port = await listening(server);
  await new Promise<void>((resolve) => server.close(() => resolve()));
  return `smtp://127.0.0.1:${port}`;
};

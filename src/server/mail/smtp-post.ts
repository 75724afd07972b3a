import MailComposer from 'nodemailer/lib/mail-composer';
import SMTPConnection from 'nodemailer/lib/smtp-connection';
import type { Delivery, Post, PostedLetter } from './post';
import { smtpTarget, type SmtpSettings } from './smtp-settings';

interface SmtpError extends Error {
  readonly responseCode?: number;
  readonly response?: string | false;
  readonly command?: string;
}

/**
 * Whether the server said that it will never take this letter (RFC 5321, 4.2.1: of a 5yz answer the same
 * request should not be repeated). Only of the recipient or the letter itself: a refused sign-in, sender or greeting, or an
 * answer about policy (RFC 3463, x.7.z), is a matter of settings, and letters wait until they are put right.
 */
const isForGood = ({ responseCode = 0, response, command = '' }: SmtpError): boolean =>
  responseCode >= 550 &&
  responseCode < 560 &&
  (command === 'RCPT TO' || command === 'DATA') &&
  !/^5\d\d[ -]5\.7\./.test(response || '');

const deliveryOf = (error: unknown): Delivery => {
  const failure = error as SmtpError;
  const reason = (failure.response || failure.message || String(error)).slice(0, 500);
  return { kind: isForGood(failure) ? 'refused' : 'failed', reason };
};

const composed = async (letter: PostedLetter, from: string) => {
  const node = new MailComposer({
    from,
    to: { name: '', address: letter.to },
    subject: letter.subject,
    text: letter.text,
    html: letter.html,
    ...(letter.replyTo ? { replyTo: { name: '', address: letter.replyTo } } : {}),
    attachments: letter.attachments.map(({ name, type, content }) => ({
      filename: name,
      contentType: type,
      content: Buffer.from(content, 'base64'),
    })),
    messageId: letter.messageId,
    date: letter.createdAt,
    // So that no holiday answer comes back (RFC 3834).
    headers: { 'Auto-Submitted': 'auto-generated' },
    disableFileAccess: true,
    disableUrlAccess: true,
  }).compile();
  const { from: sender } = node.getEnvelope();
  return { message: await node.build(), envelope: { from: sender, to: [letter.to] } };
};

/**
 * Carries letters by SMTP, several over one connection where the server lets it. After anything but a success
 * the connection is given up, so that no letter meets the remains of the one before.
 */
export const smtpPost = (settings: SmtpSettings): Post => {
  const { options, credentials } = smtpTarget(settings);
  let open: SMTPConnection | null = null;

  const rest = () => {
    const connection = open;
    open = null;
    if (connection && !connection.destroyed) connection.quit();
  };

  const drop = (connection: SMTPConnection) => {
    if (open === connection) open = null;
    connection.close();
  };

  /** Runs one step of the conversation; the connection's own errors and its end break it off. */
  const step = <T>(
    connection: SMTPConnection,
    run: (settle: (e: unknown, v?: T) => void) => void,
  ) =>
    new Promise<T | undefined>((resolve, reject) => {
      const end = () => fail(new Error('The server ended the connection'));
      const fail = (error: unknown) => settle(error);
      const settle = (error: unknown, value?: T) => {
        connection.removeListener('error', fail);
        connection.removeListener('end', end);
        if (error) reject(error instanceof Error ? error : new Error(String(error)));
        else resolve(value);
      };
      connection.on('error', fail);
      connection.on('end', end);
      run(settle);
    });

  const connected = async (watch: (connection: SMTPConnection) => void) => {
    if (open && !open.destroyed) {
      watch(open);
      return open;
    }
    const connection = new SMTPConnection(options);
    // A connection that breaks while nobody uses it is simply not used again.
    connection.on('error', () => drop(connection));
    watch(connection);
    await step(connection, (settle) => connection.connect((error) => settle(error)));
    if (credentials) {
      await step(connection, (settle) =>
        connection.login({ credentials }, (error) => settle(error)),
      );
    }
    open = connection;
    return connection;
  };

  const deliver: Post['deliver'] = async (letter, stillOurs) => {
    let using: SMTPConnection | undefined;
    let late = false;
    const deadline = setTimeout(() => {
      late = true;
      if (using) drop(using);
    }, settings.deadlineMs);
    try {
      const { message, envelope } = await composed(letter, settings.from);
      const connection = await connected((connection) => (using = connection));
      if (!(await stillOurs())) return { kind: 'not-ours' };
      await step(connection, (settle) =>
        connection.send(envelope, message, (error) => settle(error)),
      );
      return { kind: 'sent' };
    } catch (error) {
      if (using) drop(using);
      return late
        ? { kind: 'failed', reason: `Not done in ${settings.deadlineMs / 1000} s` }
        : deliveryOf(error);
    } finally {
      clearTimeout(deadline);
    }
  };

  return { deliver, rest };
};

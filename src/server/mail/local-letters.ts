import { mkdir, readdir, readFile, rename, rm, writeFile } from 'node:fs/promises';
import path from 'node:path';
import type { LocalLetter, LocalLetterSummary } from '@/api-types/dev-mail';

/** How many letters are kept; the oldest go first. */
const KEPT = 500;

/** Where letters are kept that no mail server is set for. */
export const localMailFolder = (dataDir: string): string => path.resolve(dataDir, 'mail');

const ID = /^\d{13}-[a-z0-9]+$/;

const idsIn = async (folder: string): Promise<string[]> =>
  (await readdir(folder).catch(() => []))
    .filter((name) => name.endsWith('.eml'))
    .map((name) => name.slice(0, -'.eml'.length))
    .filter((id) => ID.test(id))
    .sort()
    .reverse();

/** Keeps a message as it came, under a name that sorts by when it came. */
export const keepLetter = async (folder: string, mark: string, message: Buffer): Promise<void> => {
  await mkdir(folder, { recursive: true });
  const file = path.join(folder, `${Date.now()}-${mark}.eml`);
  await writeFile(`${file}.part`, message);
  await rename(`${file}.part`, file);
  for (const id of (await idsIn(folder)).slice(KEPT)) {
    await rm(path.join(folder, `${id}.eml`), { force: true });
  }
};

/** A kept letter, read the way a mail program reads it; null when there is none of that id. */
export const readLetter = async (folder: string, id: string): Promise<LocalLetter | null> => {
  if (!ID.test(id)) return null;
  const file = path.join(folder, `${id}.eml`);
  const message = await readFile(file).catch(() => null);
  if (!message) return null;
  // Only ever needed where no mail server is set.
  const { simpleParser } = await import('mailparser');
  const mail = await simpleParser(message, { skipTextToHtml: true, skipTextLinks: true });
  const to = Array.isArray(mail.to) ? mail.to : mail.to ? [mail.to] : [];
  return {
    id,
    at: new Date(Number(id.slice(0, 13))).toISOString(),
    from: mail.from?.text ?? '',
    to: to.map(({ text }) => text).join(', '),
    subject: mail.subject ?? '',
    messageId: mail.messageId ?? '',
    text: mail.text ?? '',
    html: mail.html || '',
    attachments: mail.attachments.map(({ filename, contentType, size, content }) => ({
      name: filename ?? 'file',
      type: contentType,
      size,
      content: content.toString('base64'),
    })),
  };
};

/** The letters kept, newest first. */
export const listLetters = async (folder: string, limit = 100): Promise<LocalLetterSummary[]> => {
  const letters = await Promise.all(
    (await idsIn(folder)).slice(0, limit).map((id) => readLetter(folder, id)),
  );
  return letters
    .filter((letter) => letter !== null)
    .map(({ id, at, from, to, subject, messageId }) => ({ id, at, from, to, subject, messageId }));
};

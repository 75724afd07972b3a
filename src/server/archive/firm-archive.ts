import { createReadStream, createWriteStream } from 'node:fs';
import { mkdtemp, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { Readable } from 'node:stream';
import { finished } from 'node:stream/promises';
import { recordAudit } from '../audit';
import type { Db } from '../database';
import { done, type Outcome } from '../outcomes';
import { refuseUnlessManaging, type Actor } from '../permissions';
import { exportFirm } from './export';

/** Writes a firm's archive to a file. */
export const exportFirmTo = async (db: Db, firmId: string, file: string): Promise<void> => {
  const out = createWriteStream(file);
  const written = finished(out);
  try {
    await exportFirm(db, firmId, (bytes) => out.write(bytes));
  } finally {
    out.end();
    await written;
  }
};

/**
 * Everything of the actor's firm as one archive. It goes to a file first: a slow connection must not hold the
 * database's transaction open.
 */
export const firmArchive = async (
  db: Db,
  actor: Actor,
): Promise<Outcome<ReadableStream<Uint8Array>>> => {
  const refusal = refuseUnlessManaging(actor);
  if (refusal) return refusal;
  await recordAudit(db, actor, 'firm.exported', { type: 'firm', id: actor.firmId });
  const folder = await mkdtemp(path.join(tmpdir(), 'evenlay-export-'));
  const tidy = () => rm(folder, { recursive: true, force: true });
  try {
    const file = path.join(folder, 'firm.zip');
    await exportFirmTo(db, actor.firmId, file);
    const stream = createReadStream(file);
    stream.once('close', () => void tidy());
    return done(Readable.toWeb(stream) as ReadableStream<Uint8Array>);
  } catch (error) {
    await tidy();
    throw error;
  }
};

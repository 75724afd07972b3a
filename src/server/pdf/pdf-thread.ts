import { createRequire } from 'node:module';
import path from 'node:path';
import { pathToFileURL } from 'node:url';
import { Worker } from 'node:worker_threads';
import { migrationsFolder } from '@/db/migrations-folder';
import type { PdfAbout } from '@/pdf/sheets-pdf';
import type { Sheet } from '@/sheets/sheet';

/** What the thread is handed: to read in what it needs, or to make a PDF. */
export type PdfTask =
  | { readonly kind: 'begin' }
  | { readonly kind: 'make'; readonly sheets: readonly Sheet[]; readonly about: PdfAbout };

export type PdfAnswer =
  | { readonly ok: true; readonly file: Uint8Array<ArrayBuffer> | null }
  | { readonly ok: false; readonly why: string };

/** A PDF takes a tenth of a second a page; one that takes longer than this is stopped, ms. The first waits for the thread to begin. */
const LIMIT_MS = 30_000;

/** No PDF was made; the message is written for the person. */
export class PdfNotMade extends Error {}

let worker: Worker | null = null;

/** A thread does not take over how the process reads TypeScript: it is told by itself, and then runs its own file. */
const BEGIN = `
  const { reader, file } = require('node:worker_threads').workerData;
  import(reader).then(({ register }) => { register(); return import(file); });
`;

/**
 * The thread runs from the sources, as the start script does: they are beside the built server, which does not know where
 * its own parts came from.
 */
function theWorker(): Worker {
  if (worker) return worker;
  const root = path.dirname(migrationsFolder());
  const packages = createRequire(path.join(root, 'package.json'));
  const tsx = path.dirname(packages.resolve('tsx/package.json'));
  const made = new Worker(BEGIN, {
    eval: true,
    execArgv: [],
    env: { ...process.env, TSX_TSCONFIG_PATH: path.join(root, 'tsconfig.json') },
    workerData: {
      reader: pathToFileURL(path.join(tsx, 'dist', 'esm', 'api', 'index.mjs')).href,
      file: pathToFileURL(path.join(root, 'src', 'server', 'pdf', 'pdf-worker.ts')).href,
    },
  });
  // It keeps no process alive that has nothing else to do.
  made.unref();
  worker = made;
  return made;
}

function ended(one: Worker): void {
  if (worker === one) worker = null;
  void one.terminate();
}

/** One task in the thread. A thread that fails or takes too long is ended; the next task gets a new one. */
function asked(task: PdfTask, limitMs: number): Promise<Uint8Array<ArrayBuffer> | null> {
  const thread = theWorker();
  thread.ref();
  return new Promise<Uint8Array<ArrayBuffer> | null>((resolve, reject) => {
    const settle = (run: () => void) => {
      clearTimeout(timer);
      thread.off('message', onMessage);
      thread.off('error', onFailure);
      thread.off('exit', onFailure);
      thread.unref();
      run();
    };
    const fail = (message: string, cause?: unknown) =>
      settle(() => {
        ended(thread);
        reject(new PdfNotMade(message, { cause }));
      });
    const onMessage = (answer: PdfAnswer) => {
      if (answer.ok) settle(() => resolve(answer.file));
      else fail('The PDF could not be made. Nothing was changed; please try again.', answer.why);
    };
    const onFailure = (why: unknown) =>
      fail('The PDF could not be made. Nothing was changed; please try again.', why);
    const timer = setTimeout(
      () =>
        fail('The PDF took too long and was stopped. Nothing was changed; try again in a minute.'),
      limitMs,
    );
    thread.on('message', onMessage);
    thread.on('error', onFailure);
    thread.on('exit', onFailure);
    thread.postMessage(task);
  });
}

let last: Promise<unknown> = Promise.resolve();

/** Tasks one after another: the time that one may take begins when it is its turn. */
function queued(task: PdfTask, limitMs: number) {
  const turn = last.then(() => asked(task, limitMs));
  last = turn.catch(() => null);
  return turn;
}

/** Begins the thread and lets it read in what it needs, so that the first PDF does not wait for that. Throws `PdfNotMade`. */
export const pdfThreadBegun = async (): Promise<void> => {
  await queued({ kind: 'begin' }, LIMIT_MS);
};

/**
 * Sheets as a PDF, made in a thread of its own so that the server answers others meanwhile: quotes, orders and whatever is
 * sent with a letter. Throws `PdfNotMade`.
 */
export const threadPdf = async (
  sheets: readonly Sheet[],
  about: PdfAbout,
  limitMs = LIMIT_MS,
): Promise<Uint8Array<ArrayBuffer>> =>
  (await queued({ kind: 'make', sheets, about }, limitMs)) as Uint8Array<ArrayBuffer>;

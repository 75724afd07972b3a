import { parentPort } from 'node:worker_threads';
import { nodePdf, nodePdfMeans } from './node-pdf';
import type { PdfAnswer, PdfTask } from './pdf-thread';

/** The thread that makes PDFs: one task after another, as they are handed to it. */
parentPort!.on('message', (task: PdfTask) => {
  run(task)
    .then((answer) => parentPort!.postMessage(answer))
    .catch((error: unknown) =>
      parentPort!.postMessage({ ok: false, why: String(error) } satisfies PdfAnswer),
    );
});

async function run(task: PdfTask): Promise<PdfAnswer> {
  if (task.kind === 'begin') {
    await nodePdfMeans();
    return { ok: true, file: null };
  }
  return { ok: true, file: await nodePdf(task.sheets, task.about) };
}

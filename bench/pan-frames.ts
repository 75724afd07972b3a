import { mkdtemp, rm } from 'node:fs/promises';
import { createServer } from 'node:http';
import { readFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import { chromium as browserType } from 'playwright-core';
import { build } from 'vite';
import { chromium } from '../scripts/chromium';
import type { Bench } from './ratio';

/** Mean time of a frame while panning, ms, as `pan-frames/page.ts` measures it. */
interface Measured {
  readonly units: number;
  readonly shape: number;
  readonly nodes: number;
  /** Units of the floor that is dragged, and what painting a step takes, ms. */
  readonly dragged: number;
  readonly moving: number;
  readonly resting: number;
}

const TYPES: Record<string, string> = { '.html': 'text/html', '.js': 'text/javascript' };

async function measured(): Promise<Measured> {
  const folder = await mkdtemp(path.join(tmpdir(), 'evenlay-bench-'));
  try {
    await build({
      configFile: false,
      logLevel: 'error',
      root: fileURLToPath(new URL('./pan-frames', import.meta.url)),
      resolve: { alias: { '@': fileURLToPath(new URL('../src', import.meta.url)) } },
      build: { outDir: folder, emptyOutDir: true },
    });
    const server = createServer(async (request, response) => {
      const file = path.join(
        folder,
        path.normalize(request.url === '/' ? '/index.html' : request.url!),
      );
      const body = await readFile(file).catch(() => null);
      response.writeHead(body ? 200 : 404, {
        'content-type': TYPES[path.extname(file)] ?? 'text/plain',
      });
      response.end(body ?? '');
    });
    await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
    const { port } = server.address() as { port: number };
    const browser = await browserType.launch({
      executablePath: chromium(),
      args: ['--no-sandbox', '--disable-gpu', '--disable-background-networking'],
    });
    try {
      const page = await browser.newPage({ viewport: { width: 1200, height: 800 } });
      await page.goto(`http://127.0.0.1:${port}/`);
      await page.waitForFunction('window.measured', undefined, { timeout: 240_000 });
      return (await page.evaluate('window.measured')) as Measured;
    } finally {
      await browser.close();
      server.close();
    }
  } finally {
    await rm(folder, { recursive: true, force: true });
  }
}

/** Panning 20,000 units in Chromium: the table's one shape against one Konva node a unit, in one page. */
export const panFrames: Bench = {
  name: 'pan-frames',
  async run() {
    const { units, shape, nodes, dragged, moving, resting } = await measured();
    return [
      {
        name: 'a frame with one Konva node a unit over a frame with the floor as one shape',
        value: nodes / shape,
        least: 20,
        detail: `${units.toLocaleString('en-GB')} units in view; ${nodes.toFixed(1)} ms and ${shape.toFixed(2)} ms a frame`,
      },
      {
        name: 'painting a large floor sharp over painting it under a moving hand',
        value: resting / moving,
        least: 4,
        detail: `${dragged.toLocaleString('en-GB')} units in view; ${resting.toFixed(0)} ms and ${moving.toFixed(1)} ms a step`,
      },
    ];
  },
};

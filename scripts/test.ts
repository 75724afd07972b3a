import { spawn } from 'node:child_process';
import { mkdtempSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { chromium } from './chromium';
import { endWith } from './welcome';

interface VitestReport {
  readonly numPassedTests: number;
  readonly numFailedTests: number;
  readonly testResults: readonly {
    readonly status: string;
    readonly assertionResults: readonly { readonly status: string }[];
  }[];
}

/** A file that could not be loaded fails without failing a test; it counts as one. */
const counts = (file: string): { passed: number; failed: number } => {
  const report = JSON.parse(readFileSync(file, 'utf8')) as VitestReport;
  const broken = report.testResults.filter(
    ({ status, assertionResults }) =>
      status === 'failed' && !assertionResults.some((test) => test.status === 'failed'),
  );
  return { passed: report.numPassedTests, failed: report.numFailedTests + broken.length };
};

/** `npm test`: every test, those in Chromium too; what is given is passed on to Vitest. */
const test = async (): Promise<void> => {
  const root = path.resolve(import.meta.dirname, '..');
  const folder = mkdtempSync(path.join(tmpdir(), 'evenlay-tests-'));
  const report = path.join(folder, 'report.json');
  const vitest = path.join(root, 'node_modules', 'vitest', 'vitest.mjs');
  const reporters = ['--reporter=default', '--reporter=json', `--outputFile.json=${report}`];
  const child = spawn(process.execPath, [vitest, 'run', ...reporters, ...process.argv.slice(2)], {
    cwd: root,
    stdio: 'inherit',
    env: { ...process.env, CHROMIUM_PATH: chromium() },
  });
  for (const signal of ['SIGTERM', 'SIGINT'] as const) process.on(signal, () => child.kill(signal));
  const code = await new Promise<number>((resolve, reject) => {
    child.once('error', reject);
    child.once('exit', (ended) => resolve(ended ?? 1));
  });
  const { passed, failed } = (() => {
    try {
      return counts(report);
    } catch {
      return { passed: 0, failed: 1 };
    } finally {
      rmSync(folder, { recursive: true, force: true });
    }
  })();
  // An error outside any test makes Vitest fail though no test did.
  console.log(`${passed} passed, ${code !== 0 && failed === 0 ? 1 : failed} failed`);
  process.exit(code);
};

test().catch(endWith);

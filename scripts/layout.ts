import { readFile } from 'node:fs/promises';
import { text } from 'node:stream/consumers';
import type { LayoutDocument } from '@/paving/layout-document';
import { layFloor } from '@/paving/laying';
import { parseLayoutDocument, type DocumentProblem } from '@/paving/layout-validation';
import { floorReport } from '@/paving/report';

/**
 * The `layout` command: works out a layout document from a file, or from standard input when the
 * file is `-`, and prints the answer as JSON on standard output and nothing else. What is wrong
 * with the input goes to standard error, and the command exits with 2.
 */

/** A task that answers with what to print, or refuses its own arguments by throwing a `Refusal`. */
interface Task {
  readonly usage: string;
  readonly run: (document: LayoutDocument, options: readonly string[]) => unknown;
}

class Refusal extends Error {}

const tasks: Readonly<Record<string, Task>> = {
  report: {
    usage: 'report FILE|-',
    run: (document, options) => {
      if (options.length > 0) throw new Refusal(`report takes no option "${options[0]}"`);
      return floorReport(layFloor(document));
    },
  },
};

const usage = () =>
  [
    'Usage:',
    ...Object.values(tasks).map((task) => `  npm run --silent layout -- ${task.usage}`),
  ].join('\n');

/** `ground.perimeter[2]: message` */
function problemLine({ path, message }: DocumentProblem): string {
  const field = path.reduce<string>(
    (before, step) =>
      typeof step === 'number' ? `${before}[${step}]` : before ? `${before}.${step}` : step,
    '',
  );
  return `${field || 'document'}: ${message}`;
}

async function readInput(file: string): Promise<unknown> {
  let source: string;
  try {
    source = file === '-' ? await text(process.stdin) : await readFile(file, 'utf8');
  } catch (error) {
    const { code, message } = error as NodeJS.ErrnoException;
    throw new Refusal(
      code === 'ENOENT' ? `there is no file ${file}` : `cannot read ${file}: ${message}`,
    );
  }
  try {
    return JSON.parse(source.replace(/^\uFEFF/, ''));
  } catch (error) {
    const name = file === '-' ? 'standard input' : file;
    throw new Refusal(`${name} is not JSON: ${(error as Error).message}`);
  }
}

async function main([name, file, ...options]: readonly string[]): Promise<void> {
  const task = name && Object.hasOwn(tasks, name) ? tasks[name] : null;
  if (!task || !file) {
    throw new Refusal(name && !task ? `there is no task "${name}"\n${usage()}` : usage());
  }
  const parsed = parseLayoutDocument(await readInput(file));
  if (!parsed.ok) throw new Refusal(parsed.problems.map(problemLine).join('\n'));
  process.stdout.write(`${JSON.stringify(task.run(parsed.document, options), null, 2)}\n`);
}

main(process.argv.slice(2)).catch((error: unknown) => {
  if (!(error instanceof Refusal)) throw error;
  process.stderr.write(`${error.message}\n`);
  process.exitCode = 2;
});

import { readFile } from 'node:fs/promises';
import { text } from 'node:stream/consumers';
import { fit, fitRefusal, type EdgeAddress, type FitHold, type FitOptions } from '@/paving/fit/fit';
import { rangeTurns } from '@/paving/fit/turn-sweep';
import type { LayoutDocument } from '@/paving/layout-document';
import { layFloor } from '@/paving/laying';
import { parseLayoutDocument, type DocumentProblem } from '@/paving/layout-validation';
import { floorReport } from '@/paving/report';
import { takeOff } from '@/takeoff/take-off';
import { setOut } from '@/paving/set-out/set-out';

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

const number = (text: string | undefined): number => (text?.trim() ? Number(text) : NaN);

function edgeAddress(text: string): EdgeAddress {
  const [ring, edge, ...rest] = text.split(':').map(number);
  if (rest.length > 0 || !Number.isInteger(ring) || !Number.isInteger(edge)) {
    throw new Refusal(`"${text}" is not an edge; write RING:EDGE, such as 0:2`);
  }
  return [ring, edge];
}

/** Turns that one fit may go through from the command line. */
const GREATEST_TURNS = 10_000;

function fitOptions(options: readonly string[]): FitOptions {
  const hold: FitHold[] = [];
  let turn: FitOptions['turn'] = 'fixed';
  for (let n = 0; n < options.length; n += 2) {
    const [option, value = ''] = [options[n], options[n + 1]];
    if (option === '--turn') {
      const [from, to, step, ...rest] = value.split(':').map(number);
      const turns = (to - from) / step;
      if (rest.length > 0 || !(step > 0) || !(turns >= 0 && turns <= GREATEST_TURNS)) {
        throw new Refusal(
          `"${value}" is not a range of turns; write FROM:TO:STEP, such as 0:90:0.5`,
        );
      }
      turn = { from, to, step };
      rangeTurns(turn);
    } else if (option === '--hold') {
      hold.push({ edge: edgeAddress(value) });
    } else if (option === '--between') {
      const edges = value.split(',').map(edgeAddress);
      if (edges.length !== 2) {
        throw new Refusal(`"${value}" is not two edges; write RING:EDGE,RING:EDGE`);
      }
      hold.push({ between: [edges[0], edges[1]] });
    } else {
      throw new Refusal(`fit takes no option "${option}"`);
    }
  }
  return { turn, hold };
}

const tasks: Readonly<Record<string, Task>> = {
  report: {
    usage: 'report FILE|-',
    run: (document, options) => {
      if (options.length > 0) throw new Refusal(`report takes no option "${options[0]}"`);
      return floorReport(layFloor(document));
    },
  },
  'take-off': {
    usage: 'take-off FILE|-',
    run: (document, options) => {
      if (options.length > 0) throw new Refusal(`take-off takes no option "${options[0]}"`);
      const laying = layFloor(document);
      return takeOff(laying, floorReport(laying), null);
    },
  },
  fit: {
    usage: 'fit FILE|- [--turn FROM:TO:STEP] [--hold RING:EDGE] [--between RING:EDGE,RING:EDGE]',
    run: (document, options) => {
      const asked = fitOptions(options);
      const refusal = fitRefusal(document, asked);
      if (refusal) throw new Refusal(refusal.message);
      return fit(document, asked);
    },
  },
  'set-out': {
    usage: 'set-out FILE|-',
    run: (document, options) => {
      if (options.length > 0) throw new Refusal(`set-out takes no option "${options[0]}"`);
      return setOut(layFloor(document));
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

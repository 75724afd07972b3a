import { readFile } from 'node:fs/promises';
import { text } from 'node:stream/consumers';
import { creep, measureProblem } from '@/paving/creep/creep';
import type { JointLimits, UnitMeasure } from '@/paving/creep/creep-types';
import { refit } from '@/paving/creep/refit';
import { fit, fitRefusal, type EdgeAddress, type FitHold, type FitOptions } from '@/paving/fit/fit';
import { fitJoints, type JointRange } from '@/paving/fit/joint-range';
import { rangeTurns } from '@/paving/fit/turn-sweep';
import type { LayoutDocument } from '@/paving/layout-document';
import { layFloor } from '@/paving/laying';
import { parseLayoutDocument, type DocumentProblem } from '@/paving/layout-validation';
import { levelsReport } from '@/takeoff/levels-report';
import { floorReport } from '@/paving/report';
import { takeOff } from '@/takeoff/take-off';
import { setOut } from '@/paving/set-out/set-out';
import { setOutWritten } from '@/paving/set-out/set-out-written';
import { surveyPrinted } from '@/paving/survey/survey-printed';

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

function fitOptions(options: readonly string[]): FitOptions & { readonly joint?: JointRange } {
  const hold: FitHold[] = [];
  let joint: JointRange | undefined;
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
    } else if (option === '--joint') {
      const [from, to, step, ...rest] = value.split(':').map(number);
      if (rest.length > 0 || ![from, to, step].every(Number.isFinite)) {
        throw new Refusal(
          `"${value}" is not a range of joints; write FROM:TO:STEP in mm, such as 2:5:0.25`,
        );
      }
      joint = { from, to, step };
    } else {
      throw new Refusal(`fit takes no option "${option}"`);
    }
  }
  return { turn, hold, joint };
}

/** `--measure UNIT:SIDE:COUNT:TOTAL`, such as `slab:length:10:4509`; any number of them. */
function unitMeasure(text: string): UnitMeasure {
  const [unit, side, count, total, ...rest] = text.split(':');
  if (!unit || (side !== 'length' && side !== 'width') || rest.length > 0)
    throw new Refusal(
      `"${text}" is not a measure; write UNIT:SIDE:COUNT:TOTAL, such as slab:length:10:4509`,
    );
  return { unit, side, count: number(count), total: number(total) };
}

/** `1-4` or `1,2,3`, or both. */
function courseNumbers(text: string): number[] {
  return text.split(',').flatMap((part) => {
    const [from, to = from, ...rest] = part.split('-').map(number);
    if (
      !Number.isInteger(from) ||
      !Number.isInteger(to) ||
      to < from ||
      to - from > 10_000 ||
      rest.length > 0
    )
      throw new Refusal(`"${part}" is not a run of courses; write 1-4 or 1,2,3`);
    return Array.from({ length: to - from + 1 }, (_, n) => from + n);
  });
}

interface CreepOptions {
  readonly measures: UnitMeasure[];
  readonly joints?: JointLimits;
  readonly laid: number[];
  readonly offset: number;
  readonly along?: number;
  readonly shift?: number;
}

function creepOptions(task: 'creep' | 'refit', options: readonly string[]): CreepOptions {
  let asked: CreepOptions = { measures: [], laid: [], offset: 0 };
  for (let n = 0; n < options.length; n += 2) {
    const [option, value = ''] = [options[n], options[n + 1]];
    const length = () => {
      const mm = number(value);
      if (!Number.isFinite(mm)) throw new Refusal(`"${value}" is not a length in mm for ${option}`);
      return mm;
    };
    if (option === '--measure') {
      asked = { ...asked, measures: [...asked.measures, unitMeasure(value)] };
    } else if (option === '--joints') {
      const [least, greatest, ...rest] = value.split(':').map(number);
      if (rest.length > 0 || !(least >= 0 && greatest >= least))
        throw new Refusal(`"${value}" is not a range of joints; write FROM:TO in mm, such as 2:5`);
      asked = { ...asked, joints: { least, greatest } };
    } else if (option === '--laid') {
      asked = { ...asked, laid: courseNumbers(value) };
    } else if (task === 'refit' && option === '--offset') {
      asked = { ...asked, offset: length() };
    } else if (task === 'refit' && option === '--along') {
      asked = { ...asked, along: length() };
    } else if (task === 'refit' && option === '--shift') {
      asked = { ...asked, shift: length() };
    } else {
      throw new Refusal(`${task} takes no option "${option}"`);
    }
  }
  return asked;
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
  levels: {
    usage: 'levels FILE|-',
    run: (document, options) => {
      if (options.length > 0) throw new Refusal(`levels takes no option "${options[0]}"`);
      return levelsReport(document);
    },
  },
  fit: {
    usage:
      'fit FILE|- [--turn FROM:TO:STEP] [--hold RING:EDGE] [--between RING:EDGE,RING:EDGE] [--joint FROM:TO:STEP]',
    run: (document, options) => {
      const { joint, ...asked } = fitOptions(options);
      const refusal = fitRefusal(document, asked);
      if (refusal) throw new Refusal(refusal.message);
      if (!joint) return fit(document, asked);
      const sought = fitJoints(document, joint, asked.hold);
      if (!sought.ok) throw new Refusal(sought.message);
      return { ...fit(document, asked), joints: sought.joints };
    },
  },
  'set-out': {
    usage: 'set-out FILE|-',
    run: (document, options) => {
      if (options.length > 0) throw new Refusal(`set-out takes no option "${options[0]}"`);
      return setOutWritten(setOut(layFloor(document)), document.display);
    },
  },
  survey: {
    usage: 'survey FILE|-',
    run: (document, options) => {
      if (options.length > 0) throw new Refusal(`survey takes no option "${options[0]}"`);
      if (!document.survey) throw new Refusal('the document has no tape survey');
      return surveyPrinted(document.survey, document.display);
    },
  },
  creep: {
    usage: 'creep FILE|- [--measure UNIT:SIDE:COUNT:TOTAL …] [--laid 1-4] [--joints FROM:TO]',
    run: (document, options) => {
      const { measures, joints, laid } = creepOptions('creep', options);
      const problem = measureProblem(document, measures);
      if (problem) throw new Refusal(problem);
      const laying = layFloor(document);
      const plan = setOut(laying);
      const { length } = plan.courses;
      const unknown = laid.find((course) => course < 1 || course > length);
      if (unknown !== undefined)
        throw new Refusal(
          `there is no course ${unknown}; ${length === 0 ? 'no unit is laid on this floor' : `they are numbered from 1 to ${length}`}`,
        );
      return creep(laying, { measures, joints, laid }, plan);
    },
  },
  refit: {
    usage:
      'refit FILE|- [--measure UNIT:SIDE:COUNT:TOTAL …] [--laid 1-4] [--offset MM] [--along MM] [--joints FROM:TO] [--shift MM]',
    run: (document, options) => {
      const result = refit(layFloor(document), creepOptions('refit', options));
      if (!result.ok) throw new Refusal(result.message);
      return result.refit;
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

// Whoever reads the answer may have enough of it before its end, as `head` does.
process.stdout.on('error', (error: NodeJS.ErrnoException) => {
  if (error.code !== 'EPIPE') throw error;
  process.exit();
});

main(process.argv.slice(2)).catch((error: unknown) => {
  if (!(error instanceof Refusal)) throw error;
  process.stderr.write(`${error.message}\n`);
  process.exitCode = 2;
});

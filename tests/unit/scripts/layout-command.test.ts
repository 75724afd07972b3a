import { spawnSync } from 'node:child_process';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { afterAll, expect, test } from 'vitest';
import type { Creep, Refit } from '@/paving/creep/creep-types';
import { fit } from '@/paving/fit/fit';
import { fitJoints } from '@/paving/fit/joint-range';
import { layFloor } from '@/paving/laying';
import { floorReport } from '@/paving/report';
import { setOut } from '@/paving/set-out/set-out';
import { setOutWritten } from '@/paving/set-out/set-out-written';
import { levelsReport } from '@/takeoff/levels-report';
import { takeOff } from '@/takeoff/take-off';
import { documentOf, parsed } from '../../oracle/documents';

const root = fileURLToPath(new URL('../../../', import.meta.url));
const folder = mkdtempSync(join(tmpdir(), 'layout-command-'));
afterAll(() => rmSync(folder, { recursive: true }));

function layout(args: string[], input = '') {
  const { status, stdout, stderr } = spawnSync(
    process.execPath,
    ['--import', 'tsx', 'scripts/layout.ts', ...args],
    { cwd: root, input, encoding: 'utf8' },
  );
  return { status, stdout, stderr };
}

function fileOf(name: string, text: string): string {
  const file = join(folder, name);
  writeFileSync(file, text);
  return file;
}

const good = JSON.stringify(documentOf({}));
const report = floorReport(layFloor(parsed(documentOf({}))));

test('report prints the report as JSON and nothing else, from a file or standard input', () => {
  const fromFile = layout(['report', fileOf('good.json', good)]);
  expect(fromFile).toMatchObject({ status: 0, stderr: '' });
  expect(JSON.parse(fromFile.stdout)).toEqual(report);
  const fromInput = layout(['report', '-'], good);
  expect(fromInput).toMatchObject({ status: 0, stderr: '', stdout: fromFile.stdout });
});

test('levels prints volumes, pegs, screed board and advice as JSON, and takes no option', () => {
  const { status, stdout, stderr } = layout(['levels', '-'], good);
  expect({ status, stderr }).toEqual({ status: 0, stderr: '' });
  expect(JSON.parse(stdout)).toEqual(
    JSON.parse(JSON.stringify(levelsReport(parsed(documentOf({}))))),
  );
  expect(layout(['levels', '-', '--loud'], good)).toMatchObject({ status: 2, stdout: '' });
});

test('survey prints points and tapes by name, and refuses a layout without one', () => {
  const lengths = [4000, 3000, 4000, 3000, 5000, 5000];
  const pairs = [
    [0, 1],
    [1, 2],
    [2, 3],
    [3, 0],
    [0, 2],
    [1, 3],
  ];
  const survey = {
    rings: [{ corners: 4 }],
    sketch: [
      [0, 0],
      [1, 0],
      [1, 1],
      [0, 1],
    ],
    tapes: pairs.map(([from, to], n) => ({ from, to, length: lengths[n] })),
  };
  const { status, stdout, stderr } = layout(
    ['survey', '-'],
    JSON.stringify({ ...documentOf({}), survey }),
  );
  expect({ status, stderr }).toEqual({ status: 0, stderr: '' });
  // 3, 4 and 5 make a right angle (FAO Training manual 2, ch. 4.1), so both diagonals agree.
  const printed = JSON.parse(stdout);
  expect(printed).toMatchObject({ state: 'agrees', spare: 1, doubts: [], telling: null });
  expect(printed.tapes[4]).toMatchObject({ tape: 'A – C', read: 5000 });
  expect(Math.abs(printed.tapes[4].off)).toBeLessThan(1e-6);
  const none = layout(['survey', '-'], good);
  expect(none).toMatchObject({ status: 2, stdout: '' });
  expect(none.stderr).toContain('no tape survey');
});

test('take-off prints the take-off as JSON, without prices', () => {
  const { status, stdout, stderr } = layout(['take-off', '-'], good);
  expect({ status, stderr }).toEqual({ status: 0, stderr: '' });
  const laying = layFloor(parsed(documentOf({})));
  expect(JSON.parse(stdout)).toEqual(JSON.parse(JSON.stringify(takeOff(laying, report, null))));
  expect(layout(['take-off', '-', '--loud'], good)).toMatchObject({ status: 2, stdout: '' });
});

test('fit prints the fit as JSON, at a turn, over a range of turns, as held, and with joints', () => {
  const document = parsed(documentOf({}));
  const printed = (...options: string[]): unknown => {
    const { status, stdout, stderr } = layout(['fit', '-', ...options], good);
    expect({ status, stderr }).toEqual({ status: 0, stderr: '' });
    return JSON.parse(stdout);
  };
  expect(printed()).toEqual(fit(document));
  const turn = { from: 0, to: 90, step: 45 };
  const between = [
    [0, 1],
    [0, 3],
  ] as const;
  const hold = [{ edge: [0, 0] as const }, { between }];
  expect(
    printed('--turn', '0:90:45', '--hold', '0:0', '--between', '0:1,0:3', '--joint', '2:4:1'),
  ).toEqual({
    ...fit(document, { turn, hold }),
    joints: (fitJoints(document, { from: 2, to: 4, step: 1 }, hold) as { joints: unknown }).joints,
  });
});

test.each([
  ['a range of turns that ends before it begins', ['--turn', '90:0:1'], 'not a range of turns'],
  ['an edge that is none', ['--hold', 'AB'], 'is not an edge; write RING:EDGE'],
  ['one edge to be centred between', ['--between', '0:1'], 'is not two edges'],
  ['holds that run the same way', ['--hold', '0:0', '--hold', '0:2'], 'parallel'],
  ['joints without a step', ['--joint', '2:5'], 'is not a range of joints'],
  ['joints that run backwards', ['--joint', '5:2:1'], 'narrower to the wider'],
  ['another option', ['--best', '1'], 'takes no option "--best"'],
])('fit refuses %s, says why and exits with 2', (_, options, words) => {
  const { status, stdout, stderr } = layout(['fit', '-', ...options], good);
  expect({ status, stdout }).toEqual({ status: 2, stdout: '' });
  expect(stderr).toContain(words);
});

test('a document that is not valid prints each error with its path and exits with 2', () => {
  const bad = { ...documentOf({}), clearance: -1, display: 'cubits' };
  const { status, stdout, stderr } = layout(['report', '-'], JSON.stringify(bad));
  expect({ status, stdout }).toEqual({ status: 2, stdout: '' });
  const lines = stderr.trim().split('\n');
  expect(lines).toHaveLength(2);
  expect(lines[0]).toMatch(/^display: /);
  expect(lines[1]).toMatch(/^clearance: /);
});

test.each([
  ['a file that is not there', ['report', join(folder, 'none.json')], '', 'there is no file'],
  ['what is not JSON', ['report', '-'], '{"schema": ', 'is not JSON'],
  ['nothing at all on standard input', ['report', '-'], '', 'is not JSON'],
  ['a folder', ['report', folder], '', 'cannot read'],
  ['no arguments', [], '', 'report FILE|-'],
  ['a task that there is not', ['polish', '-'], '', 'there is no task "polish"'],
  ['an option that there is not', ['report', '-', '--loud'], good, '--loud'],
])('%s exits with 2 and says so', (_, args, input, words) => {
  const { status, stdout, stderr } = layout(args, input);
  expect({ status, stdout }).toEqual({ status: 2, stdout: '' });
  expect(stderr).toContain(words);
});

test('set-out prints datums, points, courses and checks as JSON', () => {
  const { status, stdout, stderr } = layout(['set-out', '-'], good);
  expect({ status, stderr }).toEqual({ status: 0, stderr: '' });
  const found = setOut(layFloor(parsed(documentOf({}))));
  expect(JSON.parse(stdout)).toEqual(setOutWritten(found, 'metric'));
  expect(stdout).toContain('a 3\u202f000\u202fmm straightedge');
});

test('creep says what ten units laid tight come to on this floor', () => {
  const { status, stdout, stderr } = layout(
    ['creep', '-', '--measure', 'a:length:10:4506', '--joints', '2:4'],
    good,
  );
  expect({ status, stderr }).toEqual({ status: 0, stderr: '' });
  const found = JSON.parse(stdout) as Creep;
  expect(found.units[0].lengthGrowth).toBeCloseTo(0.6, 9);
  expect(found.joints).toMatchObject({ least: 2, greatest: 4 });
});

test('creep reckons from the courses that are laid, by their numbers', () => {
  const held = (laid: string) => {
    const { status, stdout, stderr } = layout(
      ['creep', '-', '--measure', 'a:length:10:4506', '--laid', laid],
      good,
    );
    expect({ status, stderr }).toEqual({ status: 0, stderr: '' });
    return (JSON.parse(stdout) as Creep).heldCourse;
  };
  const { length } = setOut(layFloor(parsed(documentOf({})))).courses;
  expect(held('1-3')).toBe(1);
  expect(held(`${length - 1},${length}`)).toBe(length);
  expect(layout(['creep', '-', '--laid', `1-${length + 1}`], good)).toMatchObject({
    status: 2,
    stdout: '',
    stderr: `there is no course ${length + 1}; they are numbered from 1 to ${length}\n`,
  });
});

test('a reader that has enough of the answer before its end is no fault', () => {
  // Far more than a pipe holds (64 kB), so that the rest meets a closed pipe.
  const units = [{ id: 'a', name: 'Sett', length: 50, width: 50, thickness: 50 }];
  const many = documentOf({ units, bond: { kind: 'stack', unit: 'a', joint: 3 } });
  expect(JSON.stringify(setOut(layFloor(parsed(many)))).length).toBeGreaterThan(100_000);
  const file = fileOf('setts.json', JSON.stringify(many));
  const { stdout, stderr } = spawnSync(
    'sh',
    ['-c', `"$0" --import tsx scripts/layout.ts set-out "$1" | head -c 20`, process.execPath, file],
    { cwd: root, encoding: 'utf8' },
  );
  expect(stdout).toHaveLength(20);
  expect(stderr).toBe('');
});

test('refit holds the courses laid and gives the joint and the floor for the rest', () => {
  const { status, stdout, stderr } = layout(
    ['refit', '-', '--measure', 'a:length:10:4506', '--laid', '1-2', '--offset', '-3'],
    good,
  );
  expect({ status, stderr }).toEqual({ status: 0, stderr: '' });
  const found = JSON.parse(stdout) as Refit;
  expect(found.courses[0].number).toBe(3);
  expect(layFloor(parsed(found.document)).laid.count).toBeGreaterThan(0);
});

test.each([
  ['creep', ['--measure', 'a:height:10:4500'], 'UNIT:SIDE:COUNT:TOTAL'],
  ['refit', ['--laid', '99'], 'no course 99'],
  ['set-out', ['--loud'], 'takes no option'],
])('%s %j exits with 2 and says what would do', (task, options, words) => {
  const { status, stdout, stderr } = layout([task, '-', ...options], good);
  expect({ status, stdout }).toEqual({ status: 2, stdout: '' });
  expect(stderr).toContain(words);
});

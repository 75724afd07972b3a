import { readFile, writeFile } from 'node:fs/promises';
import { comparison } from './comparison';
import { fitAgainstSearch, fitGrowth, fitOnTable } from './fit';
import { growth } from './growth';
import { layingAgainstClipping } from './laying-against-clipping';
import type { Bench, Ratio } from './ratio';
import { manyProjects } from './many-projects';
import { panFrames } from './pan-frames';
import { usualFloor } from './usual-floor';

/**
 * `npm run bench -- [name…] [--save]`: runs the benchmarks and prints each ratio with what is
 * asked of it and what it was when `--save` last kept it. Exits with 1 when a ratio falls short.
 */

const benches: readonly Bench[] = [
  usualFloor,
  layingAgainstClipping,
  growth,
  comparison,
  panFrames,
  manyProjects,
  fitAgainstSearch,
  fitOnTable,
  fitGrowth,
];
const baselineFile = new URL('./baseline.json', import.meta.url);

function holds({ value, least, greatest }: Ratio): boolean {
  return value >= (least ?? -Infinity) && value <= (greatest ?? Infinity);
}

const shown = (value: number) =>
  value >= 100 ? Math.round(value).toLocaleString('en-GB') : value.toPrecision(3);

function asked({ least, greatest }: Ratio): string {
  if (least !== undefined) return `at least ${shown(least)}`;
  return greatest === undefined ? '' : `at most ${shown(greatest)}`;
}

const options = process.argv.slice(2);
const save = options.includes('--save');
const names = options.filter((option) => !option.startsWith('--'));
const unknown = names.filter((name) => !benches.some((bench) => bench.name === name));
if (unknown.length > 0) {
  console.error(
    `there is no benchmark ${unknown.join(', ')}; there are ${benches.map(({ name }) => name).join(', ')}`,
  );
  process.exit(2);
}

const baseline: Record<string, Record<string, number>> = JSON.parse(
  await readFile(baselineFile, 'utf8').catch(() => '{}'),
);
let failed = false;
for (const bench of benches.filter(({ name }) => names.length === 0 || names.includes(name))) {
  console.log(`\n${bench.name}`);
  const ratios = await bench.run();
  const before = Object.values(baseline[bench.name] ?? {});
  ratios.forEach((ratio, n) => {
    const good = holds(ratio);
    failed ||= !good;
    const was = before[n] === undefined ? '' : `  (was ${shown(before[n])})`;
    console.log(`  ${good ? 'yes' : 'NO '}  ${shown(ratio.value)}  ${asked(ratio)}${was}`);
    console.log(`       ${ratio.name}: ${ratio.detail}`);
  });
  baseline[bench.name] = Object.fromEntries(
    ratios.map(({ name, value }) => [name, Number(value.toPrecision(3))]),
  );
}
if (save) await writeFile(baselineFile, `${JSON.stringify(baseline, null, 2)}\n`);
process.exit(failed ? 1 : 0);

import { existsSync, readdirSync, readFileSync } from 'node:fs';
import path from 'node:path';
import { describe, expect, test } from 'vitest';

const ROOT = path.resolve(import.meta.dirname, '../..');

const readmes = readdirSync(path.join(ROOT, 'src'), { recursive: true, encoding: 'utf8' })
  .filter((file) => path.basename(file) === 'README.md')
  .map((file) => path.join('src', path.dirname(file)));

const textOf = (file: string) => readFileSync(path.join(ROOT, file), 'utf8');

/** What the rows of a README's tables name: files without their ending, rooms with a slash behind. */
const rowNames = (text: string): string[] =>
  text
    .split('\n')
    .filter((line) => line.startsWith('| `'))
    .flatMap((line) => [...line.split('|')[1].matchAll(/`([^`]+)`/g)])
    .map(([, name]) => name.replace(/\.tsx?$/, ''));

describe('a directory’s README', () => {
  test.each(readmes.filter((folder) => rowNames(textOf(`${folder}/README.md`)).length > 0))(
    'in %s names each of its files once, and none that is not there',
    (folder) => {
      const names = rowNames(textOf(`${folder}/README.md`));
      const files = readdirSync(path.join(ROOT, folder))
        .filter((file) => /\.tsx?$/.test(file))
        .map((file) => file.replace(/\.tsx?$/, ''));
      expect(names.filter((name) => !name.endsWith('/')).sort()).toEqual(files.sort());
      for (const name of names.filter((each) => each.endsWith('/'))) {
        expect(existsSync(path.join(ROOT, folder, name)), name).toBe(true);
      }
    },
  );
});

test('every directory on the developers’ map is there', () => {
  const map = /## A map of the house\n\n```\n([^`]*)```/.exec(textOf('DEVELOPERS.md'))![1];
  let inside = '';
  const places = map.split('\n').flatMap((line) => {
    const names = /^(\s*)((?:[\w-]+\/?)(?:[\w/-]*))/.exec(line);
    if (!names || /^\s{3,}/.test(line)) return [];
    if (names[1] === '') inside = names[2];
    return [names[1] === '' ? names[2] : path.join(inside, names[2])];
  });
  expect(places.length).toBeGreaterThan(20);
  for (const place of places) expect(existsSync(path.join(ROOT, place)), place).toBe(true);
});

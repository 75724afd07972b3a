import { expect, test } from 'vitest';
import { isOpenPage, nextPage } from '@/server/next-page';

test.each(['/layouts/abc', '/projects?tab=1#top', '/'])('%s is gone back to', (asked) => {
  expect(nextPage(asked)).toBe(asked);
});

test.each([
  null,
  '',
  'https://elsewhere.example/',
  '//elsewhere.example',
  '/\\elsewhere.example',
  '/\t/elsewhere.example',
  '/.//elsewhere.example',
  'javascript:alert(1)',
])('%j leads to the projects instead', (asked) => {
  expect(nextPage(asked)).toBe('/projects');
});

// A phone fetches its program's page whoever is signed in; sent to the sign-in page it would keep that instead.
test.each(['/site', '/site/abc', '/guide/on-site', '/sign-in'])('%s is open to all', (path) => {
  expect(isOpenPage(path)).toBe(true);
});

test.each(['/projects', '/sitemap', '/site-plans', '/versions/abc', '/account'])(
  '%s is not',
  (path) => {
    expect(isOpenPage(path)).toBe(false);
  },
);

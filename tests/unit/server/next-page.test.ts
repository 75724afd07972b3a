import { expect, test } from 'vitest';
import { nextPage } from '@/server/next-page';

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

import { expect, it } from 'vitest';
import { failureWords } from '@/components/ui/failure-words';

// The words of Chromium, Firefox and WebKit for a module that could not be fetched.
it.each([
  'Failed to fetch dynamically imported module: http://here.example/_astro/browser-pdf.js',
  'error loading dynamically imported module: http://here.example/_astro/browser-pdf.js',
  'Importing a module script failed.',
])('says in plain words that the server was not reached: %s', (message) => {
  expect(failureWords(new TypeError(message))).toBe(
    'The server could not be reached. Check the connection.',
  );
});

it('leaves every other reason as it is', () => {
  expect(failureWords(new Error('A letter is missing in the typeface.'))).toBe(
    'A letter is missing in the typeface.',
  );
  expect(failureWords('thrown oddly')).toBe('');
});

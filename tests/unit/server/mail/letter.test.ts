import { JSDOM } from 'jsdom';
import { expect, test } from 'vitest';
import {
  invitationLetter,
  newPasswordLetter,
  passwordChangedLetter,
  putOnProjectLetter,
  removedLetter,
} from '@/server/mail/account-letters';
import { letterParts, type Letter } from '@/server/mail/letter';

const ORIGIN = 'https://floors.example';

const letters: readonly Letter[] = [
  invitationLetter({
    firm: 'Larkmoss & Sons <Dry> "Floors"',
    inviter: 'Tamsin O’Kelby',
    role: 'client',
    project: 'Fernhollow court',
    token: 'abc-DEF_123',
    days: 14,
  }),
  newPasswordLetter({ name: 'Bram', token: 'abc-DEF_123', minutes: 60 }),
  passwordChangedLetter({ name: 'Bram' }),
  putOnProjectLetter({
    name: 'Joss',
    by: 'Bram',
    firm: 'Larkmoss',
    project: 'Court',
    projectId: 'p1',
  }),
  removedLetter({ name: 'Joss', firm: 'Larkmoss' }),
  {
    kind: 'everything',
    subject: 'All blocks',
    blocks: [
      { kind: 'quote', by: 'Nerys', text: 'Nearer the gate?\n\nOr <not>.' },
      { kind: 'list', items: [{ text: 'Version 1', path: '/versions/1' }, { text: 'No link' }] },
    ],
    why: 'Because.',
  },
];

const words = (text: string) => text.replace(/\s+/g, ' ').trim();

test.each(letters.map((letter) => [letter.kind, letter] as const))(
  'the letter "%s" says the same in both parts, and names nothing that its markup could swallow',
  (_kind, letter) => {
    const { text, html } = letterParts(letter, ORIGIN);
    const { document } = new JSDOM(html).window;
    const shown = words(document.body.textContent);
    for (const block of letter.blocks) {
      const said =
        block.kind === 'list'
          ? block.items.map((item) => item.text)
          : [block.kind === 'action' ? block.label : block.text];
      for (const each of said) {
        for (const line of each.split('\n').filter(Boolean)) {
          expect(shown).toContain(words(line));
          expect(words(text.replace(/^> /gm, ''))).toContain(words(line));
        }
      }
    }
    expect(shown).toContain(words(letter.why));
    expect(words(text)).toContain(words(letter.why));
    const links = [...document.querySelectorAll('a')].map((link) => link.getAttribute('href'));
    for (const link of links) {
      expect(link).toMatch(/^https:\/\/floors\.example\//);
      expect(text).toContain(link);
    }
  },
);

test.each(letters.map((letter) => [letter.kind, letter] as const))(
  'the text of the letter "%s" keeps to lines that mail programs do not break',
  (_kind, letter) => {
    // RFC 5322, 2.1.1: lines should be no more than 78 characters.
    for (const line of letterParts(letter, ORIGIN).text.split('\n')) {
      if (!line.includes('https://')) expect(line.length).toBeLessThanOrEqual(78);
    }
  },
);

test('nothing is fetched to show a letter: no picture, style sheet or script', () => {
  for (const letter of letters) {
    const { document } = new JSDOM(letterParts(letter, ORIGIN).html).window;
    expect(document.querySelectorAll('img, link, script, iframe')).toHaveLength(0);
  }
});

test('a subject is one line, whatever was typed into a name, and not endless', () => {
  const subject = `Court\r\nBcc: everybody@elsewhere.example\u2028 ${'long '.repeat(60)}`;
  const parts = letterParts({ kind: 'x', subject, blocks: [], why: '' }, ORIGIN);
  expect(parts.subject).not.toMatch(/[\r\n\u2028]/);
  expect(parts.subject.length).toBeLessThanOrEqual(150);
});

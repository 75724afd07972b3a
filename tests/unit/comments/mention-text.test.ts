import { describe, expect, it } from 'vitest';
import {
  bodyParts,
  mentionMatches,
  mentionPut,
  mentionQuery,
} from '@/components/comments/mention-text';

const PEOPLE = [
  { id: '1', name: 'Bram Festerley' },
  { id: '2', name: 'Brámwen Oak' },
  { id: '3', name: 'Nerys Quillamore' },
];

describe('mentioning somebody', () => {
  it('begins with an @ at the start of a word, and not within an e-mail address', () => {
    expect(mentionQuery('Look, @Bra', 10)).toEqual({ from: 6, typed: 'Bra' });
    expect(mentionQuery('@', 1)).toEqual({ from: 0, typed: '' });
    expect(mentionQuery('bram@larkmoss', 13)).toBeNull();
    expect(mentionQuery('@ home', 6)).toBeNull();
    expect(mentionQuery('@Bram\nand', 9)).toBeNull();
  });

  it('finds people by the beginning of any part of their name, accents aside', () => {
    expect(mentionMatches(PEOPLE, 'bram').map(({ id }) => id)).toEqual(['1', '2']);
    expect(mentionMatches(PEOPLE, 'quil').map(({ id }) => id)).toEqual(['3']);
    expect(mentionMatches(PEOPLE, 'Nerys Q').map(({ id }) => id)).toEqual(['3']);
    expect(mentionMatches(PEOPLE, 'ram')).toEqual([]);
  });

  it('puts the full name and leaves the caret behind it', () => {
    const text = 'Look, @Bra here';
    const put = mentionPut(text, mentionQuery(text, 10)!, 'Bram Festerley');
    expect(put.text).toBe('Look, @Bram Festerley here');
    expect(put.text.slice(0, put.caret)).toBe('Look, @Bram Festerley ');
  });

  it('parts a body into mentions and the rest, losing nothing, the longer of two names first', () => {
    const mentions = [
      { id: '1', name: 'Bram' },
      { id: '2', name: 'Bram Festerley' },
    ];
    const body = 'Hello @bram festerley, and @Bram!';
    const parts = bodyParts(body, mentions);
    expect(parts.map(({ text }) => text).join('')).toBe(body);
    expect(parts.filter(({ mention }) => mention).map(({ text }) => text)).toEqual([
      '@bram festerley',
      '@Bram',
    ]);
  });
});

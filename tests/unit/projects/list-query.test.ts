import { describe, expect, it } from 'vitest';
import { projectQuerySchema } from '@/api-types/projects';
import {
  lookAsked,
  lookRead,
  lookWritten,
  PLAIN_LOOK,
  shownWords,
} from '@/components/projects/list-query';

describe('the look of the list in its address', () => {
  it('comes back from the address as it went into it', () => {
    const look = {
      search: 'fern court',
      stage: 'change_asked',
      archived: true,
      sort: 'client',
      view: 'table',
    } as const;
    expect(lookRead(new URLSearchParams(lookWritten(look)))).toEqual(look);
    expect(lookWritten(PLAIN_LOOK)).toBe('');
    expect(lookRead(new URLSearchParams(''))).toEqual(PLAIN_LOOK);
  });

  it('takes nothing from an address that the server would refuse', () => {
    const wild = lookRead(
      new URLSearchParams(`sort=price&stage=lost&view=3d&search=${'x'.repeat(500)}`),
    );
    expect(wild).toEqual({ ...PLAIN_LOOK, search: 'x'.repeat(120) });
    expect(projectQuerySchema.safeParse(lookAsked(wild, '')).success).toBe(true);
  });
});

describe('how far down the list one is', () => {
  it('is said with the total, where there is more than is shown', () => {
    expect(shownWords(24, { count: 137, more: false })).toBe('24 of 137 projects');
    expect(shownWords(1, { count: 1, more: false })).toBe('1 project');
    expect(shownWords(48, { count: 1000, more: true })).toBe('48 of more than 1 000 projects');
  });

  it('never says less than is shown, when projects came meanwhile', () => {
    expect(shownWords(9, { count: 8, more: false })).toBe('9 projects');
    expect(shownWords(9, null)).toBe('9 projects');
  });
});

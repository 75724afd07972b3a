import { describe, expect, it } from 'vitest';
import { projectQuerySchema } from '@/api-types/projects';
import { lookAsked, lookRead, lookWritten, PLAIN_LOOK } from '@/components/projects/list-query';

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

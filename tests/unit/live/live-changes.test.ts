import { describe, expect, it } from 'vitest';
import type { LiveState } from '@/api-types/live';
import { liveChanges } from '@/components/live/live-changes';
import { presentWords } from '@/components/live/present-words';

const version = {
  id: 'v1',
  number: 1,
  state: 'shared',
  comments: 1,
  unread: 1,
  commentsStamp: 'c',
  siteEntries: 0,
};
const layout = {
  id: 'l1',
  name: 'Court',
  draft: { revision: 4, savedAt: '', savedBy: { id: 'p', name: 'Bram' } },
  versions: [version],
  present: [],
};
const BEFORE = { projectId: 'p1', stamp: '1', layouts: [layout], choices: null } as LiveState;
const now = (change: object) => ({ ...BEFORE, stamp: '2', layouts: [{ ...layout, ...change }] });

describe('what changed in a project', () => {
  it('is nothing when only somebody sat down at the table', () => {
    const present = [{ person: { id: 'q', name: 'Tamsin' }, editing: true }];
    expect(liveChanges(BEFORE, now({ present }) as LiveState)).toEqual({
      layouts: [],
      versions: [],
      comments: [],
      site: [],
      choices: false,
    });
  });

  it('tells a saved draft, a new version, a step and a comment apart', () => {
    const draft = { ...layout.draft, revision: 5 };
    expect(liveChanges(BEFORE, now({ draft }) as LiveState).layouts).toEqual(['l1']);
    const second = { ...version, id: 'v2', number: 2, state: 'saved' };
    const added = liveChanges(BEFORE, now({ versions: [second, version] }) as LiveState);
    expect(added).toEqual({
      layouts: ['l1'],
      versions: ['v2'],
      comments: ['v2'],
      site: ['v2'],
      choices: false,
    });
    const accepted = liveChanges(
      BEFORE,
      now({ versions: [{ ...version, state: 'accepted' }] }) as LiveState,
    );
    expect(accepted).toEqual({
      layouts: [],
      versions: ['v1'],
      comments: [],
      site: [],
      choices: false,
    });
    const said = liveChanges(
      BEFORE,
      now({ versions: [{ ...version, commentsStamp: 'd' }] }) as LiveState,
    );
    expect(said).toEqual({ layouts: [], versions: [], comments: ['v1'], site: [], choices: false });
    const laid = liveChanges(
      BEFORE,
      now({ versions: [{ ...version, siteEntries: 1 }] }) as LiveState,
    );
    expect(laid).toEqual({ layouts: [], versions: [], comments: [], site: ['v1'], choices: false });
  });

  it('tells that the choices were picked anew', () => {
    const picked = liveChanges(BEFORE, { ...BEFORE, stamp: '2', choices: 'c1' });
    expect(picked).toEqual({ layouts: [], versions: [], comments: [], site: [], choices: true });
  });

  it('notices a layout that is gone', () => {
    const gone = liveChanges(BEFORE, { ...BEFORE, layouts: [] });
    expect(gone).toEqual({
      layouts: ['l1'],
      versions: ['v1'],
      comments: ['v1'],
      site: ['v1'],
      choices: false,
    });
  });
});

describe('who else is there', () => {
  it('says first who changes the draft, and is silent when nobody is there', () => {
    const looks = { person: { id: '1', name: 'Bram' }, editing: false };
    const edits = { person: { id: '2', name: 'Tamsin' }, editing: true };
    expect(presentWords([])).toBeNull();
    expect(presentWords([looks])).toBe('Bram has this draft open.');
    expect(presentWords([looks, edits])).toBe('Tamsin is changing this draft now.');
    expect(presentWords([looks, { ...looks, person: { id: '3', name: 'Joss' } }])).toBe(
      'Bram and Joss have this draft open.',
    );
  });
});

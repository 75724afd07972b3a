import fc from 'fast-check';
import { beforeAll, describe, expect, test } from 'vitest';
import type { VersionState } from '@/api-types/versions';
import { newProject, newVersion, type Signed } from './firm';
import { letters, newOffice, type Office } from './office';
import { db, useEmptyDatabase } from './site';
import { putOnProject } from '@/server/projects';

useEmptyDatabase();

/**
 * The life of a layout as the product's description tells it, written down again here: saved → shared → accepted or change
 * asked → issued (only an accepted one) → superseded when another version of that layout is issued. That a version
 * may be shared again after a change was asked is the product's own decision (src/server/version-steps.ts).
 */
const FOLLOWS = {
  share: { saved: 'shared', change_asked: 'shared' },
  accept: { shared: 'accepted' },
  'ask-change': { shared: 'change_asked' },
  issue: { accepted: 'issued' },
} as const satisfies Record<string, Partial<Record<VersionState, VersionState>>>;
type StepName = keyof typeof FOLLOWS;

const askers = ['owner', 'designer', 'installer', 'client', 'clientElsewhere', 'stranger'] as const;
type Asker = (typeof askers)[number];

const TAKEN_BY: Readonly<Record<StepName, readonly Asker[]>> = {
  share: ['owner', 'designer'],
  accept: ['client'],
  'ask-change': ['client'],
  issue: ['owner', 'designer'],
};

/** What is known of a version: its states so far, with who brought it there. */
interface Known {
  readonly id: string;
  readonly history: { state: VersionState; by: Asker }[];
  readonly fingerprint: string;
}

const stateOf = ({ history }: Known): VersionState => history[history.length - 1].state;
const had = ({ history }: Known, state: VersionState) => history.some((one) => one.state === state);

const sees = (asker: Asker, version: Known): boolean => {
  switch (asker) {
    case 'owner':
    case 'designer':
      return true;
    case 'installer':
      return had(version, 'issued');
    case 'client':
      return had(version, 'shared');
    default:
      return false;
  }
};

const expectedStatus = (asker: Asker, step: StepName, version: Known): number => {
  if (!sees(asker, version)) return 404;
  if (!TAKEN_BY[step].includes(asker)) return 403;
  return stateOf(version) in FOLLOWS[step] ? 200 : 409;
};

interface Move {
  readonly step: StepName | 'save';
  readonly asker: Asker;
  /** Which of the versions so far, counted round. */
  readonly which: number;
}

/** Drafters and the client act more often than not, or few versions would come far. */
const moves: fc.Arbitrary<Move[]> = fc.array(
  fc.oneof(
    {
      weight: 1,
      arbitrary: fc.record({
        step: fc.constant('save' as const),
        asker: fc.constant('designer' as const),
        which: fc.constant(0),
      }),
    },
    {
      weight: 4,
      arbitrary: fc.constantFrom<StepName>('share', 'accept', 'ask-change', 'issue').chain((step) =>
        fc.record({
          step: fc.constant(step),
          asker: fc.constantFrom(...TAKEN_BY[step]),
          which: fc.nat(3),
        }),
      ),
    },
    {
      weight: 2,
      arbitrary: fc.record({
        step: fc.constantFrom<StepName>('share', 'accept', 'ask-change', 'issue'),
        asker: fc.constantFrom(...askers),
        which: fc.nat(3),
      }),
    },
  ),
  { minLength: 4, maxLength: 24 },
);

let office: Office;
beforeAll(async () => {
  office = await newOffice();
});

const bodyOf = (step: StepName, version: Known) => {
  if (step === 'accept')
    return { typedName: 'A. Client', fingerprint: version.fingerprint, terms: '' };
  return step === 'ask-change' ? { note: 'Turn it a little' } : { note: 'So' };
};

/** What each move that was taken writes: who hears of it, of those in the office. */
const HEARD_BY: Readonly<Record<StepName, (asker: Asker) => Asker[]>> = {
  share: () => ['client'],
  // Whoever drew and shared it, and the owner.
  accept: () => ['owner', 'designer'],
  'ask-change': () => ['owner', 'designer'],
  issue: () => ['client', 'installer'],
};

const signed = (asker: Asker): Signed => office[asker];

describe('the life of a version', () => {
  test(
    'takes each step that follows, by whoever may take it, and refuses every other with a reason, changing nothing',
    { timeout: 240_000 },
    async () => {
      const reached = new Set<VersionState>();
      const refused = new Set<string>();
      await fc.assert(
        fc.asyncProperty(moves, async (all) => {
          const { projectId, layoutId } = await newProject(office.designer.visitor);
          for (const { actor } of [office.installer, office.client]) {
            await putOnProject(await db(), actor.firmId, projectId, actor.personId);
          }
          const versions: Known[] = [];
          const save = async () => {
            const { id } = await newVersion(office.designer.visitor, layoutId);
            const { fingerprint } = (await office.designer.visitor.get(`/api/versions/${id}`)).body;
            versions.push({ id, history: [{ state: 'saved', by: 'designer' }], fingerprint });
          };
          await save();
          for (const { step, asker, which } of all) {
            if (step === 'save') {
              await save();
              continue;
            }
            const version = versions[which % versions.length];
            const status = expectedStatus(asker, step, version);
            const before = (await letters(office.owner.actor.firmId)).length;
            const answer = await signed(asker).visitor.post(
              `/api/versions/${version.id}/${step}`,
              bodyOf(step, version),
            );
            expect(
              answer.status,
              JSON.stringify([step, asker, stateOf(version), answer.body]),
            ).toBe(status);
            const written = (await letters(office.owner.actor.firmId)).slice(before);
            if (status !== 200) {
              expect(answer.body.detail.length).toBeGreaterThan(20);
              expect(written).toEqual([]);
              refused.add(`${step} ${status} ${status === 409 ? stateOf(version) : ''}`);
              continue;
            }
            if (step === 'issue') {
              const old = versions.find((one) => stateOf(one) === 'issued');
              old?.history.push({ state: 'superseded', by: asker });
            }
            version.history.push({
              state: (FOLLOWS[step] as Record<string, VersionState>)[stateOf(version)],
              by: asker,
            });
            reached.add(stateOf(version));
            // A drafter who shares again hears of the answer too, being the owner or the designer.
            expect(new Set(written.map(({ to }) => to))).toEqual(
              new Set(HEARD_BY[step](asker).map((who) => signed(who).email)),
            );
          }
          for (const version of versions) {
            const { state, events } = (
              await office.owner.visitor.get(`/api/versions/${version.id}`)
            ).body;
            expect(state).toBe(stateOf(version));
            expect(
              events.map(({ kind, person }: { kind: string; person: { id: string } }) => [
                kind,
                person.id,
              ]),
            ).toEqual(version.history.map(({ state, by }) => [state, signed(by).actor.personId]));
          }
          // At most one version of a layout is ever the plan to build from.
          expect(versions.filter((one) => stateOf(one) === 'issued').length).toBeLessThanOrEqual(1);
        }),
        { numRuns: 25 },
      );
      // The moves were rich enough to mean something.
      expect([...reached].sort()).toEqual(['accepted', 'change_asked', 'issued', 'shared']);
      expect(refused.size).toBeGreaterThan(10);
    },
  );
});

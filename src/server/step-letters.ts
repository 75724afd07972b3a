import { and, eq } from 'drizzle-orm';
import type { VersionEventKind } from '@/api-types/versions';
import { people, versionEvents } from '@/db/schema';
import type { Db } from './database';
import type { Letter, LetterBlock } from './mail/letter';
import { postLetter } from './mail/outbox';
import { onlookersOf, type Onlooker } from './onlookers';
import { mayDraft, type Actor } from './permissions';
import { versionName, type SeenVersion } from './seen-version';

type Told = Exclude<VersionEventKind, 'saved' | 'superseded'>;

interface Step {
  readonly kind: Told;
  readonly note: string;
  /** The version that this one takes the place of, when it is issued. */
  readonly superseded?: number | undefined;
}

const subjectOf = (kind: Told, who: string, version: SeenVersion): string => {
  switch (kind) {
    case 'shared':
      return `${version.firmName} has shared a floor with you: ${version.projectName}`;
    case 'accepted':
      return `Accepted: ${version.projectName}, ${versionName(version)}`;
    case 'change_asked':
      return `${who} asks for a change: ${version.projectName}, ${versionName(version)}`;
    case 'issued':
      return `Issued for setting out: ${version.projectName}, ${versionName(version)}`;
  }
};

const sentences = (step: Step, who: string, version: SeenVersion): string => {
  const name = versionName(version);
  switch (step.kind) {
    case 'shared':
      return `${who} has shared ${name} of ${version.projectName} with you. Look at the floor, and accept it or ask for a change.`;
    case 'accepted':
      return `${who} has accepted ${name} of ${version.projectName}. It can be issued for setting out now.`;
    case 'change_asked':
      return `${who} asks for a change to ${name} of ${version.projectName}.`;
    case 'issued':
      return (
        `${who} has issued ${name} of ${version.projectName} for setting out.` +
        (step.superseded === undefined
          ? ''
          : ` It takes the place of version ${step.superseded}: put away every print of that one, and do not build from it.`)
      );
  }
};

const action: Readonly<Record<Told, string>> = {
  shared: 'Look at the floor',
  accepted: 'See the version',
  change_asked: 'See what should change',
  issued: 'Open the plan',
};

/** Clients hear of what is shared, whoever drew or shared it and the owners of the answer, the rest of what is issued. */
const concerned = (
  kind: Told,
  onlooker: Onlooker,
  version: SeenVersion,
  sharers: ReadonlySet<string>,
): boolean => {
  switch (kind) {
    case 'shared':
      return onlooker.role === 'client';
    case 'issued':
      return !mayDraft(onlooker.role);
    default:
      return (
        onlooker.role === 'owner' ||
        (mayDraft(onlooker.role) && (onlooker.id === version.createdBy || sharers.has(onlooker.id)))
      );
  }
};

/** Writes to those whom a step concerns, in the transaction of the step. */
export const postStepLetters = async (
  tx: Db,
  actor: Actor,
  version: SeenVersion,
  step: Step,
): Promise<void> => {
  const [doer] = await tx
    .select({ name: people.name })
    .from(people)
    .where(eq(people.id, actor.personId));
  const shared = await tx
    .select({ id: versionEvents.personId })
    .from(versionEvents)
    .where(
      and(
        eq(versionEvents.firmId, actor.firmId),
        eq(versionEvents.versionId, version.id),
        eq(versionEvents.kind, 'shared'),
      ),
    );
  const sharers = new Set(shared.map(({ id }) => id));
  const blocks: LetterBlock[] = [
    { kind: 'paragraph', text: sentences(step, doer.name, version) },
    ...(step.note ? [{ kind: 'quote', by: doer.name, text: step.note } as const] : []),
    { kind: 'action', label: action[step.kind], path: `/versions/${version.id}` },
  ];
  for (const onlooker of await onlookersOf(tx, version, actor.personId)) {
    if (!onlooker.mailSteps || !concerned(step.kind, onlooker, version, sharers)) continue;
    const letter: Letter = {
      kind: `version-${step.kind.replace('_', '-')}`,
      subject: subjectOf(step.kind, doer.name, version),
      name: onlooker.name,
      blocks,
      why: `You are on this project of ${version.firmName}. Which letters you get is for you to say on your account page.`,
    };
    await postLetter(tx, { to: onlooker.email, firmId: actor.firmId }, letter);
  }
};

import type { ChoiceVersion } from '@/api-types/choices';
import { STATE_WORDS } from '../ui/version-words';
import type { Pickable } from './ChoicePicker';

export const pickableOf = (version: ChoiceVersion): Pickable => ({
  id: version.id,
  name: `${version.number}. ${version.label}`,
  about: `${version.layoutName} · ${STATE_WORDS[version.state]}`,
  document: version.document,
});

/** What was done, said plainly. */
export const pickedSentence = (count: number): string =>
  count === 1
    ? 'One version is before the client.'
    : `${count} versions are before the client, in this order.`;

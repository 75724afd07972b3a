import type { Present } from '@/api-types/live';

const names = (people: readonly Present[]): string => {
  const all = people.map(({ person }) => person.name);
  return all.length < 2 ? (all[0] ?? '') : `${all.slice(0, -1).join(', ')} and ${all.at(-1)}`;
};

/** Who else is at a drafting table, in words; null when nobody is. */
export function presentWords(present: readonly Present[]): string | null {
  const editing = present.filter((each) => each.editing);
  const looking = present.filter((each) => !each.editing);
  if (editing.length > 0)
    return `${names(editing)} ${editing.length > 1 ? 'are' : 'is'} changing this draft now.`;
  if (looking.length > 0)
    return `${names(looking)} ${looking.length > 1 ? 'have' : 'has'} this draft open.`;
  return null;
}

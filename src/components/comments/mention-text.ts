import type { PersonName } from '@/api-types/people';

/** The longest name that is looked for after an @, characters. */
const LONGEST_NAME = 60;

/** A mention being typed: where its @ stands and what follows it up to the caret. */
export interface MentionQuery {
  readonly from: number;
  readonly typed: string;
}

/** An @ begins a mention at the start of a word only, so that an e-mail address is none. */
export function mentionQuery(text: string, caret: number): MentionQuery | null {
  const before = text.slice(Math.max(0, caret - LONGEST_NAME), caret);
  const at = before.lastIndexOf('@');
  if (at < 0 || (at > 0 && !/[\s(“"']/.test(before[at - 1]))) return null;
  const typed = before.slice(at + 1);
  if (/[\n@]/.test(typed) || typed.startsWith(' ')) return null;
  return { from: caret - typed.length - 1, typed };
}

const plain = (text: string) => text.normalize('NFD').replace(/\p{M}/gu, '').toLowerCase();

/** People of whom some part of the name begins with what was typed. */
export function mentionMatches<T extends PersonName>(people: readonly T[], typed: string): T[] {
  const wanted = plain(typed);
  return people.filter(({ name }) =>
    [plain(name), ...plain(name).split(/\s+/)].some((part) => part.startsWith(wanted)),
  );
}

/** The text with the mention finished, and where the caret then stands. */
export function mentionPut(
  text: string,
  { from, typed }: MentionQuery,
  name: string,
): { readonly text: string; readonly caret: number } {
  const after = text.slice(from + 1 + typed.length);
  const put = `@${name}${after.startsWith(' ') ? '' : ' '}`;
  return { text: text.slice(0, from) + put + after, caret: from + name.length + 2 };
}

export interface BodyPart {
  readonly text: string;
  readonly mention: boolean;
}

/** A comment's body in parts, those that mention somebody apart; of two names the longer is taken. */
export function bodyParts(body: string, mentions: readonly PersonName[]): BodyPart[] {
  const names = mentions.map(({ name }) => `@${name}`).sort((p, q) => q.length - p.length);
  const parts: BodyPart[] = [];
  let plainFrom = 0;
  for (let at = 0; at < body.length; at++) {
    const name = names.find(
      (each) => body.slice(at, at + each.length).toLowerCase() === each.toLowerCase(),
    );
    if (!name) continue;
    if (at > plainFrom) parts.push({ text: body.slice(plainFrom, at), mention: false });
    parts.push({ text: body.slice(at, at + name.length), mention: true });
    at += name.length - 1;
    plainFrom = at + 1;
  }
  if (plainFrom < body.length) parts.push({ text: body.slice(plainFrom), mention: false });
  return parts;
}

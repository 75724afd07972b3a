/** Letters and digits of any script: a name ends where none follows. */
const WORD = /[\p{L}\p{N}]/u;

/**
 * Who of these people is mentioned in a text: `@` and their full name, in any case. Of two names that begin
 * alike the longer counts ("@Ann Marsh" does not mention an Ann); two people of one name are both meant.
 */
export const mentionedIn = <P extends { readonly name: string }>(
  body: string,
  people: readonly P[],
): P[] => {
  const text = body.normalize('NFC').toLowerCase();
  const named = people.map((person) => ({
    person,
    name: person.name.normalize('NFC').trim().toLowerCase(),
  }));
  const mentioned = new Set<P>();
  for (let at = text.indexOf('@'); at >= 0; at = text.indexOf('@', at + 1)) {
    if (at > 0 && WORD.test(text[at - 1])) continue;
    const fitting = named.filter(
      ({ name }) =>
        name.length > 0 &&
        text.startsWith(name, at + 1) &&
        !WORD.test(text.charAt(at + 1 + name.length)),
    );
    const longest = Math.max(0, ...fitting.map(({ name }) => name.length));
    for (const { name, person } of fitting) if (name.length === longest) mentioned.add(person);
  }
  return people.filter((person) => mentioned.has(person));
};

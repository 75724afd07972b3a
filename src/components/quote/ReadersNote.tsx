import { TriangleAlert } from 'lucide-react';
import type { QuoteReader } from '@/api-types/quotes';

const named = (names: readonly string[]): string =>
  names.length < 2
    ? (names[0] ?? '')
    : `${names.slice(0, -1).join(', ')} and ${names[names.length - 1]}`;

/** Who gets the quote when it is sent; where nobody does, that and what would mend it. */
export function ReadersNote({
  clients,
  projectId,
}: {
  clients: readonly QuoteReader[];
  projectId: string;
}) {
  const people = (
    <a className="link" href={`/projects/${projectId}#people`}>
      the project’s page
    </a>
  );
  const byLetter = clients.filter((client) => client.byLetter);
  if (clients.length === 0) {
    return (
      <div className="mt-3 bg-amber-wash p-3" data-testid="no-client">
        <p className="flex items-center gap-1.5 font-bold text-amber">
          <TriangleAlert size={16} aria-hidden /> No client is on this project
        </p>
        <p className="mt-1">
          Sent now, the quote is numbered and kept, and nobody gets it. Put the client on the
          project or invite them, on {people}, and then send it; or hand the PDF over yourself.
        </p>
      </div>
    );
  }
  const without = clients.filter((client) => !client.byLetter);
  return (
    <p className="mt-3 text-sm text-slate">
      {byLetter.length > 0 && `It goes to ${named(byLetter.map(({ name }) => name))} by e-mail. `}
      {without.length > 0 &&
        `${named(without.map(({ name }) => name))} ${without.length === 1 ? 'takes' : 'take'} no letters and will see it on the version’s page. `}
      Clients are put on and taken off on {people}.
    </p>
  );
}

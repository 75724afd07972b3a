import type { LiveLayout, LiveState } from '@/api-types/live';

/** What has changed in a project from one state to the next. */
export interface LiveChanges {
  /** Layouts whose name, draft or list of versions is another, and those that came or went. */
  readonly layouts: readonly string[];
  /** Versions that came, went or stand otherwise. */
  readonly versions: readonly string[];
  /** Versions whose comments are others, or are read. */
  readonly comments: readonly string[];
  /** Versions on which the crew has sent more from site. */
  readonly site: readonly string[];
  /** Whether the client's choices were picked anew. */
  readonly choices: boolean;
}

const versionsOf = (state: LiveState | null) =>
  new Map(
    state?.layouts.flatMap(({ versions }) => versions.map((version) => [version.id, version])),
  );

const layoutMark = (layout: LiveLayout | undefined) =>
  layout && JSON.stringify([layout.name, layout.draft?.revision, layout.versions.map((v) => v.id)]);

const differing = <T>(
  before: ReadonlyMap<string, T>,
  now: ReadonlyMap<string, T>,
  mark: (value: T | undefined) => unknown,
): string[] =>
  [...new Set([...before.keys(), ...now.keys()])].filter(
    (id) => mark(before.get(id)) !== mark(now.get(id)),
  );

/** Who is at a drafting table is no change: it is told by the state itself. */
export function liveChanges(before: LiveState, now: LiveState): LiveChanges {
  const byId = (state: LiveState) => new Map(state.layouts.map((layout) => [layout.id, layout]));
  const [old, fresh] = [versionsOf(before), versionsOf(now)];
  return {
    layouts: differing(byId(before), byId(now), layoutMark),
    versions: differing(old, fresh, (version) => version?.state),
    comments: differing(old, fresh, (version) =>
      version ? `${version.commentsStamp} ${version.comments} ${version.unread}` : undefined,
    ),
    site: differing(old, fresh, (version) => version?.siteEntries),
    choices: before.choices !== now.choices,
  };
}

import {
  projectSorts,
  projectStages,
  type ProjectQuery,
  type ProjectSort,
  type ProjectTotal,
} from '@/api-types/projects';
import { formatCount } from '@/paving/count';

/** What a list of projects shows; kept in the page's address, so that a list can be gone back to and sent. */
export interface ListLook {
  readonly search: string;
  readonly stage: (typeof projectStages)[number] | '';
  readonly archived: boolean;
  readonly sort: ProjectSort;
  readonly view: 'drawings' | 'table';
}

export const PLAIN_LOOK: ListLook = {
  search: '',
  stage: '',
  archived: false,
  sort: 'updated',
  view: 'drawings',
};

export const PAGE_SIZE = 24;

const oneOf = <T extends string>(all: readonly T[], value: string | null): T | undefined =>
  all.find((each) => each === value);

export function lookRead(params: URLSearchParams): ListLook {
  return {
    search: (params.get('search') ?? '').slice(0, 120),
    stage: oneOf(projectStages, params.get('stage')) ?? '',
    archived: params.get('archived') === 'only',
    sort: oneOf(projectSorts, params.get('sort')) ?? PLAIN_LOOK.sort,
    view: oneOf(['drawings', 'table'] as const, params.get('view')) ?? PLAIN_LOOK.view,
  };
}

/** The address's part for a look; what is plain is left out. */
export function lookWritten(look: ListLook): string {
  const params = new URLSearchParams();
  if (look.search.trim()) params.set('search', look.search.trim());
  if (look.stage) params.set('stage', look.stage);
  if (look.archived) params.set('archived', 'only');
  if (look.sort !== PLAIN_LOOK.sort) params.set('sort', look.sort);
  if (look.view !== PLAIN_LOOK.view) params.set('view', look.view);
  const text = params.toString();
  return text ? `?${text}` : '';
}

/** What the server is asked for a look, a page at a time. */
export function lookAsked(look: ListLook, after: string): ProjectQuery {
  return {
    ...(look.search.trim() ? { search: look.search.trim() } : {}),
    ...(look.stage ? { stage: look.stage } : {}),
    archived: look.archived ? 'only' : 'no',
    sort: look.sort,
    size: PAGE_SIZE,
    ...(after ? { after } : {}),
  };
}

export const isNarrowed = (look: ListLook): boolean =>
  look.search.trim() !== '' || look.stage !== '';

/** How far down the list one is: `48 of 137 projects`. */
export function shownWords(shown: number, total: ProjectTotal | null): string {
  const all = total?.count ?? shown;
  const projects = (count: number) =>
    `${formatCount(count)} ${count === 1 ? 'project' : 'projects'}`;
  if (total?.more) return `${formatCount(shown)} of more than ${projects(all)}`;
  return shown < all ? `${formatCount(shown)} of ${projects(all)}` : projects(shown);
}

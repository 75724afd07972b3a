import type { Visitor } from './site';

/** Who asks: the four roles on the project, two who are not on it, another firm's owner, and nobody. */
export const askers = [
  'owner',
  'designer',
  'installer',
  'client',
  'installer elsewhere',
  'client elsewhere',
  'stranger',
  'nobody',
] as const;
export type Asker = (typeof askers)[number];

export interface World {
  readonly people: Record<Asker, { readonly visitor: Visitor; readonly email: string }>;
  readonly firmId: string;
  /** The installer who is on the project. */
  readonly installerId: string;
  readonly project: string;
  /** With three versions: one only saved, one shared, one issued. */
  readonly layout: string;
  /** Of the same project, with a draft only. */
  readonly unshown: string;
  readonly saved: string;
  readonly shared: string;
  readonly issued: string;
  readonly aside: string;
  /** Of another project with the same people on it: versions to take steps with. */
  readonly stepsProject: string;
  readonly stepsLayout: string;
  /** Shared, accepted and issued: everybody on the project sees it. */
  readonly seenByAll: string;
  /** The owner's own, on `seenByAll`. */
  readonly thread: string;
}

export type Statuses = Readonly<Record<Asker, number>>;

export const statuses = (
  inOrder: readonly [number, number, number, number, number, number, number, number],
): Statuses =>
  Object.fromEntries(askers.map((asker, n) => [asker, inOrder[n]])) as Record<Asker, number>;

/** Read against product.md's table: [owner, designer, installer, client | elsewhere: installer, client | stranger, nobody]. */
export interface Row {
  /** The row of the table, or why there is none. */
  readonly row: string;
  readonly endpoint: string;
  readonly id?: (world: World) => string | Promise<string>;
  readonly query?: (world: World, asker: Asker) => string | Promise<string>;
  readonly body?: (world: World, asker: Asker, id: string) => unknown;
  /** Who asks in the asker's stead, where asking changes who one is. */
  readonly visitor?: (world: World, asker: Asker) => Visitor | Promise<Visitor>;
  readonly expected: Statuses;
}

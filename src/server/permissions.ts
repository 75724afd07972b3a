import type { Role } from '@/api-types/people';
import { notAllowed, type Refusal } from './outcomes';

/** Who acts, in which firm and role. Every service takes one, and its firm is in every query. */
export interface Actor {
  readonly personId: string;
  readonly firmId: string;
  readonly role: Role;
}

/** Who may do what: the one table. Other modules ask it and never compare roles themselves. */
export const permissions = {
  'people, roles, firm settings': { owner: true, designer: false, installer: false, client: false },
  'catalogue and cost prices': { owner: true, designer: true, installer: false, client: false },
  'projects, drafts, saving and sharing versions': {
    owner: true,
    designer: true,
    installer: false,
    client: false,
  },
  'see a project': { owner: 'all', designer: 'all', installer: 'put on', client: 'put on' },
  'see a version': { owner: 'any', designer: 'any', installer: 'issued', client: 'shared' },
  'comment on a version': { owner: true, designer: true, installer: true, client: true },
  'accept, ask for a change, pay': {
    owner: false,
    designer: false,
    installer: false,
    client: true,
  },
  'issue an accepted version for set-out': {
    owner: true,
    designer: true,
    installer: false,
    client: false,
  },
  'set-out pack': { owner: 'any', designer: 'any', installer: 'issued', client: 'plan sheet' },
  'check measurements, course progress': {
    owner: 'enter',
    designer: 'enter',
    installer: 'enter',
    client: 'see',
  },
  'quote totals': { owner: true, designer: true, installer: false, client: true },
  'cost and margin': { owner: true, designer: true, installer: false, client: false },
} as const satisfies Record<string, Record<Role, boolean | string>>;

/** Whether a role draws up projects, drafts and versions. */
export const mayDraft = (role: Role): boolean =>
  permissions['projects, drafts, saving and sharing versions'][role];

/** Asked only after what it is about was found to be seen: what is not seen is `not-found`. */
export const refuseUnlessDrafting = (actor: Actor): Refusal | null =>
  mayDraft(actor.role)
    ? null
    : notAllowed('Only the firm’s owner and designers draw up projects, drafts and versions.');

/** People, roles and the firm's settings are its owners' alone. */
export const refuseUnlessManaging = (actor: Actor): Refusal | null =>
  permissions['people, roles, firm settings'][actor.role]
    ? null
    : notAllowed('Only an owner of the firm manages its people and settings.');

/** What things cost the firm, and what it earns on them, is its owners' and designers' alone. */
export const seesCosts = (role: Role): boolean => permissions['catalogue and cost prices'][role];

/** Null for who sees the catalogue, costs and orders. */
export const refuseUnlessPricing = (actor: Actor): Refusal | null =>
  seesCosts(actor.role)
    ? null
    : notAllowed('Only the firm’s owner and designers see its catalogue, costs and orders.');

/** Whether somebody in this role sees only the projects that they are put on. */
export const isPutOnProjects = (role: Role): boolean =>
  permissions['see a project'][role] === 'put on';

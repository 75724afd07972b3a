import { and, desc, eq, ne } from 'drizzle-orm';
import type { z } from 'zod';
import {
  steps,
  type AcceptanceRecord,
  type acceptVersionSchema,
  type Agreement,
  type askChangeSchema,
  type Step,
} from '@/api-types/agreement';
import type { VersionDetail } from '@/api-types/versions';
import { acceptances, people, versions } from '@/db/schema';
import { recordAudit } from './audit';
import { addToChoices, notAChoice, refuseUnlessChoice } from './choices';
import type { Db } from './database';
import { lockDraft } from './drafts';
import { newId } from './ids';
import {
  changedMeanwhile,
  done,
  notAllowed,
  notFound,
  type Outcome,
  type Refusal,
} from './outcomes';
import type { Actor } from './permissions';
import { touchProject } from './projects';
import { seenVersion, type SeenVersion } from './seen-version';
import { postStepLetters } from './step-letters';
import { openThread } from './threads';
import { versionState } from './version-rows';
import { STEP_LEADS, stepNotNow, stepNotTheirs, stepStanding } from './version-steps';
import { addVersionEvent, openVersion } from './versions';
import { versionSeen } from './visibility';

interface Beside {
  /** Asked under the lock, before anything is written. */
  readonly check?: (version: SeenVersion, tx: Db) => Refusal | null | Promise<Refusal | null>;
  /** What else the step writes; the number of the version that is superseded by it, if one is. */
  readonly write?: (tx: Db, version: SeenVersion, eventId: string) => Promise<number | void>;
}

/**
 * One step in a version's life: its event, its record, what goes with it and the letters, all or nothing. Steps of one
 * layout, and saves of versions, go one by one by the lock of its draft; the state is read under that lock.
 */
const takeStep = async (
  db: Db,
  actor: Actor,
  versionId: string,
  step: Step,
  note: string,
  { check, write }: Beside = {},
): Promise<Outcome<VersionDetail>> => {
  const seen = await seenVersion(db, actor, versionId);
  if (!seen) return notFound('version');
  const notTheirs = stepNotTheirs(step, actor.role);
  if (notTheirs) return notAllowed(notTheirs);
  const refused = await db.transaction(async (tx): Promise<Refusal | null> => {
    await lockDraft(tx, actor, seen.layoutId);
    const version = await seenVersion(tx, actor, versionId);
    if (!version) return notFound('version');
    const notNow = stepNotNow(step, version.state);
    if (notNow) return changedMeanwhile(notNow);
    const checked = await check?.(version, tx);
    if (checked) return checked;
    const kind = STEP_LEADS[step].to;
    const eventId = await addVersionEvent(tx, actor, versionId, kind, note);
    const superseded = (await write?.(tx, version, eventId)) ?? undefined;
    await recordAudit(
      tx,
      actor,
      `version.${kind.replace('_', '-')}`,
      { type: 'version', id: versionId },
      { layoutId: version.layoutId, projectId: version.projectId, number: version.number },
    );
    await postStepLetters(tx, actor, version, { kind, note, superseded });
    await touchProject(tx, actor.firmId, version.layoutId);
    return null;
  });
  return refused ?? openVersion(db, actor, versionId);
};

/** Shows a saved version to the project’s clients. */
export const shareVersion = (
  db: Db,
  actor: Actor,
  id: string,
  { note }: { readonly note: string },
): Promise<Outcome<VersionDetail>> =>
  takeStep(db, actor, id, 'share', note, { write: (tx, version) => addToChoices(tx, version) });

/** Asks for a change to a shared version; each pin begins a thread of comments at its spot. */
export const askForChange = (
  db: Db,
  actor: Actor,
  id: string,
  { note, pins }: z.output<typeof askChangeSchema>,
): Promise<Outcome<VersionDetail>> =>
  takeStep(db, actor, id, 'askChange', note, {
    write: async (tx, version) => {
      for (const { at, body } of pins) await openThread(tx, actor, version, { body, pin: at });
    },
  });

/** Issues an accepted version for setting out. The layout's version issued before, if any, is superseded. */
export const issueVersion = (
  db: Db,
  actor: Actor,
  id: string,
  { note }: { readonly note: string },
): Promise<Outcome<VersionDetail>> =>
  takeStep(db, actor, id, 'issue', note, {
    write: async (tx, version) => {
      const before = await tx
        .select({ id: versions.id, number: versions.number })
        .from(versions)
        .where(
          and(
            eq(versions.firmId, actor.firmId),
            eq(versions.layoutId, version.layoutId),
            ne(versions.id, version.id),
            eq(versionState, 'issued'),
          ),
        );
      for (const old of before) {
        const why = `Version ${version.number} was issued in its place.`;
        await addVersionEvent(tx, actor, old.id, 'superseded', why);
        await recordAudit(
          tx,
          actor,
          'version.superseded',
          { type: 'version', id: old.id },
          { by: version.id },
        );
      }
      return before.at(0)?.number;
    },
  });

const recordOf = async (db: Db, version: SeenVersion): Promise<AcceptanceRecord | null> => {
  const [row] = await db
    .select({ acceptance: acceptances, person: { id: people.id, name: people.name } })
    .from(acceptances)
    .innerJoin(people, eq(people.id, acceptances.personId))
    .where(and(eq(acceptances.firmId, version.firmId), eq(acceptances.versionId, version.id)))
    .orderBy(desc(acceptances.at))
    .limit(1);
  if (!row) return null;
  const { projectName, layoutName, firmName, number, label } = version;
  const { typedName, terms, fingerprint, at } = row.acceptance;
  return {
    versionId: version.id,
    projectName,
    layoutName,
    firmName,
    number,
    label,
    person: row.person,
    typedName,
    terms,
    fingerprint,
    at: at.toISOString(),
  };
};

/** Accepts a shared version, as it and the firm's terms were shown, and keeps the record of it. */
export const acceptVersion = async (
  db: Db,
  actor: Actor,
  id: string,
  { typedName, fingerprint, terms, note }: z.output<typeof acceptVersionSchema>,
): Promise<Outcome<AcceptanceRecord>> => {
  const accepted = await takeStep(db, actor, id, 'accept', note, {
    check: async (version, tx) => {
      if (fingerprint !== version.fingerprint) {
        return changedMeanwhile('What you were shown is not this version. Open it again and look.');
      }
      if (terms !== version.terms) {
        return changedMeanwhile(
          'The firm’s terms have changed since they were shown to you. Read them again first.',
          { terms: version.terms },
        );
      }
      return refuseUnlessChoice(tx, version);
    },
    write: async (tx, _version, eventId) => {
      await tx.insert(acceptances).values({
        id: newId(),
        firmId: actor.firmId,
        versionId: id,
        eventId,
        personId: actor.personId,
        typedName,
        terms,
        fingerprint,
        at: new Date(),
      });
    },
  });
  return accepted.ok ? openAcceptance(db, actor, id) : accepted;
};

/** The record of acceptance of a version. Not found: no such version, or nobody accepted it. */
export const openAcceptance = async (
  db: Db,
  actor: Actor,
  id: string,
): Promise<Outcome<AcceptanceRecord>> => {
  const version = await seenVersion(db, actor, id);
  if (!version) return notFound('version');
  const record = await recordOf(db, version);
  return record ? done(record) : notFound('acceptance');
};

/** Where a version stands and what the actor may do about it. */
export const openAgreement = async (
  db: Db,
  actor: Actor,
  id: string,
): Promise<Outcome<Agreement>> => {
  const version = await seenVersion(db, actor, id);
  if (!version) return notFound('version');
  const [issued] = await db
    .select({ id: versions.id, number: versions.number })
    .from(versions)
    .where(
      and(versionSeen(actor), eq(versions.layoutId, version.layoutId), eq(versionState, 'issued')),
    );
  const standings = Object.fromEntries(
    steps.map((step) => [step, stepStanding(step, actor.role, version.state)]),
  ) as unknown as Agreement['steps'];
  const takenBack = standings.accept.may ? await notAChoice(db, version) : null;
  return done({
    versionId: version.id,
    state: version.state,
    steps: takenBack ? { ...standings, accept: { may: false, why: takenBack } } : standings,
    terms: version.terms,
    fingerprint: version.fingerprint,
    acceptance: await recordOf(db, version),
    issued: issued ?? null,
  });
};

import { and, eq, isNull, sql } from 'drizzle-orm';
import { outbox } from '@/db/schema';
import type { Db } from '../database';
import { newId } from '../ids';
import { logError } from '../log';
import { backOffSeconds } from './back-off';
import type { Delivery, Post, PostedLetter } from './post';

/**
 * Each letter is sent once. A sender claims a letter for the length of a lease, and other senders, in
 * this process or in another on the same PostgreSQL, pass over it (SKIP LOCKED while it is being claimed, the lease
 * afterwards). All times are the database's, so that clocks of servers need not agree.
 *
 * SMTP has no transaction across two machines, so between "at most once" and "at least once" something must be
 * chosen for the one moment when the last byte of a letter is gone and the server's answer has not come: the server
 * may have taken it. Letters are invitations and agreements, and one that is lost is worse than one that comes twice,
 * so that moment counts as failed, as RFC 5321 (4.5.4.1) asks of any sender. It is made as small as
 * SMTP allows:
 *
 * - a letter is sent to one recipient, in one conversation, with all of it composed beforehand;
 * - the claim is asked for again, and its lease renewed, when the server is already waiting for the letter: a sender
 *   that was held up past its lease finds out before it says anything, not after;
 * - a letter has a deadline shorter than the lease, so that two senders never have the same one in hand;
 * - once the server has answered 250 nothing but writing that down is left, and that is tried until it works, while
 *   the letter is still claimed;
 * - a server that is told to stop finishes the letter in hand.
 *
 * What is left is a process killed, or a connection broken, within that one moment. The letter then goes again with
 * the same Message-ID, which is how receiving servers and mail programs know a second copy.
 */
export interface SenderSettings {
  /** How long a claim holds, s. Longer than a letter may take: see `SMTP_PATIENCE`. */
  readonly leaseSeconds: number;
  /** How often the outbox is looked into when there was nothing to do, ms. */
  readonly restMs: number;
}

/** As the server runs it; tests are quicker. */
export const SENDER_SETTINGS: SenderSettings = { leaseSeconds: 180, restMs: 1000 };

/** Sends what lies in the outbox. */
export interface Sender {
  /** Sends what is due, until nothing is. How many letters it had in hand. */
  readonly drain: () => Promise<number>;
  readonly start: () => void;
  /** Takes no further letter, and resolves when the one in hand is done. */
  readonly stop: () => Promise<void>;
}

interface Claimed extends PostedLetter {
  readonly claim: string;
  readonly tries: number;
}

const secondsOn = (seconds: number) => sql`now() + make_interval(secs => ${seconds})`;

const unsettled = () => and(isNull(outbox.sentAt), isNull(outbox.refusedAt));

/** Takes the letter that is longest due, if there is one that nobody has in hand. */
const claimNext = async (db: Db, leaseSeconds: number): Promise<Claimed | null> => {
  const claim = newId();
  const [row] = await db
    .update(outbox)
    .set({
      claimedBy: claim,
      claimedUntil: secondsOn(leaseSeconds),
      tries: sql`${outbox.tries} + 1`,
    })
    .where(
      sql`${outbox.id} = (select id from ${outbox}
        where sent_at is null and refused_at is null and due_at <= now()
        and (claimed_until is null or claimed_until < now())
        order by due_at, id limit 1 for update skip locked)`,
    )
    .returning();
  return row ? { ...row, attachments: row.attachments ?? [], claim } : null;
};

/** Whether the claim still holds; it then holds for a whole lease again. */
const renewClaim = async (db: Db, { id, claim }: Claimed, leaseSeconds: number): Promise<boolean> =>
  (
    await db
      .update(outbox)
      .set({ claimedUntil: secondsOn(leaseSeconds) })
      .where(
        and(
          eq(outbox.id, id),
          eq(outbox.claimedBy, claim),
          unsettled(),
          sql`${outbox.claimedUntil} > now()`,
        ),
      )
      .returning({ id: outbox.id })
  ).length > 0;

/** A letter that is done with is no longer kept word for word: it may hold a link that lets somebody in. */
const SPENT = {
  claimedBy: null,
  claimedUntil: null,
  text: '',
  html: '',
  attachments: null,
} as const;

const writeDown = async (db: Db, letter: Claimed, delivery: Delivery): Promise<void> => {
  switch (delivery.kind) {
    case 'sent':
      // Whoever has claimed it meanwhile: it is gone.
      await db
        .update(outbox)
        .set({ ...SPENT, sentAt: sql`now()`, lastError: null })
        .where(and(eq(outbox.id, letter.id), unsettled()));
      return;
    case 'refused':
      await db
        .update(outbox)
        .set({ ...SPENT, refusedAt: sql`now()`, lastError: delivery.reason })
        .where(and(eq(outbox.id, letter.id), eq(outbox.claimedBy, letter.claim), unsettled()));
      return;
    case 'failed':
      await db
        .update(outbox)
        .set({
          claimedBy: null,
          claimedUntil: null,
          dueAt: secondsOn(backOffSeconds(letter.tries)),
          lastError: delivery.reason,
        })
        .where(and(eq(outbox.id, letter.id), eq(outbox.claimedBy, letter.claim), unsettled()));
      return;
    case 'not-ours':
      return;
  }
};

const pause = (ms: number) => new Promise<void>((resolve) => setTimeout(resolve, ms));

/** A sender on one database and one post. Any number may run beside each other. */
export const letterSender = (
  db: Db,
  post: Post,
  settings: SenderSettings = SENDER_SETTINGS,
): Sender => {
  let stopped = false;
  let running: Promise<void> | null = null;
  let wake = () => {};

  const rest = () =>
    new Promise<void>((resolve) => {
      const timer = setTimeout(resolve, settings.restMs);
      timer.unref();
      wake = () => {
        clearTimeout(timer);
        resolve();
      };
    });

  /** What the server has taken must not be forgotten: tried until the database has it. */
  const settle = async (letter: Claimed, delivery: Delivery): Promise<void> => {
    for (;;) {
      try {
        return await writeDown(db, letter, delivery);
      } catch (error) {
        logError(`letter ${letter.id} is ${delivery.kind}, which could not be written down`, error);
        if (delivery.kind !== 'sent') return;
        await pause(settings.restMs);
      }
    }
  };

  const drain = async (): Promise<number> => {
    let handled = 0;
    try {
      while (!stopped) {
        const letter = await claimNext(db, settings.leaseSeconds);
        if (!letter) break;
        handled += 1;
        const delivery = await post.deliver(letter, () =>
          renewClaim(db, letter, settings.leaseSeconds),
        );
        await settle(letter, delivery);
      }
    } finally {
      post.rest();
    }
    return handled;
  };

  const run = async () => {
    while (!stopped) {
      await drain().catch((error: unknown) => logError('the outbox could not be sent', error));
      if (!stopped) await rest();
    }
  };

  return {
    drain,
    start: () => {
      running ??= run();
    },
    stop: async () => {
      stopped = true;
      wake();
      await running;
    },
  };
};

import { createHash } from 'node:crypto';
import type { Request } from 'express';
import session, { type SessionData } from 'express-session';
import connectPgSimple from 'connect-pg-simple';
import type { Pool } from 'pg';
import { isStaff, type Actor } from '../accounts/actor';
import { ACTOR_COLUMNS } from '../accounts/actor-columns';
import type { Clock } from '../app-context';
import type { Transaction } from '../database/client';

const MINUTE = 60_000;
/** 45 CFR 164.312(a)(2)(iii) asks for an automatic log-off and leaves the time to the program; these are common practice. */
const STAFF_IDLE = 15 * MINUTE;
const PATIENT_IDLE = 30 * MINUTE;
const ABSOLUTE = 12 * 60 * MINUTE;
const TOUCH_EVERY = MINUTE;

/** Session and user in one statement: what changed about the user counts from the next request on. */
const READ = `
  SELECT s.sess, s.expire, ${ACTOR_COLUMNS}
    FROM sessions s JOIN users u ON u.id = s.user_id
   WHERE s.sid = $1 AND s.expire > $2 AND s.created_at > $3 AND u.disabled_at IS NULL`;

interface Row extends Actor {
  readonly sess: SessionData;
  readonly expire: Date;
}

/** Kept beside what express-session stores and hashes: it passes over symbols. */
const READ_WITH = Symbol('what was read with the session');
type ReadSession = SessionData & { [READ_WITH]?: { actor: Actor; expire: Date } };

declare module 'express-serve-static-core' {
  interface Request {
    /** Who is signed in; undefined for a visitor. */
    actor?: Actor;
  }
}

/** Only this is stored, so that a copy of the table opens no session. */
export const sessionHash = (sid: string): string =>
  createHash('sha256').update(sid).digest('base64url');

const idleMs = (actor: Actor): number => (isStaff(actor) ? STAFF_IDLE : PATIENT_IDLE);

function withActor(row: Row): ReadSession {
  const { sess, expire, ...actor } = row;
  return Object.assign(sess, { [READ_WITH]: { actor, expire } });
}

/** Who holds a session as of now, for what stays open after its call; null once it has ended. */
export async function actorOfSession(pool: Pool, hash: string, now: Date): Promise<Actor | null> {
  const values = [hash, now, new Date(now.getTime() - ABSOLUTE)];
  const { rows } = await pool.query<Row>({ name: 'read-session', text: READ, values });
  return rows[0] ?? null;
}

/** Makes the session that `request.session.regenerate` prepared, in the transaction of the sign-in. */
export async function insertSession(
  tx: Transaction,
  sid: string,
  actor: Actor,
  now: Date,
): Promise<void> {
  const expire = new Date(now.getTime() + idleMs(actor));
  await tx.connection.query(
    'INSERT INTO sessions (sid, sess, expire, user_id, created_at) VALUES ($1, $2, $3, $4, $5)',
    [sessionHash(sid), '{"cookie":{}}', expire, actor.id, now],
  );
}

/** Keeps this call from putting off the session's end: a page made it by itself. */
export function leaveUntouched(request: Request): void {
  delete (request.session as ReadSession)[READ_WITH];
}

/**
 * The session table of connect-pg-simple with our own rules: reading brings the user along, by the given clock; a
 * session that was ended never comes back, since writing changes rows that are there and makes none; its expiry is
 * moved at most once a minute.
 */
export class SessionStore extends connectPgSimple(session) {
  readonly #pool: Pool;
  readonly #clock: Clock;

  constructor(pool: Pool, clock: Clock) {
    super({ pool, tableName: 'sessions', pruneSessionInterval: false });
    this.#pool = pool;
    this.#clock = clock;
  }

  override get(sid: string, done: (error: unknown, found?: SessionData | null) => void): void {
    const now = this.#clock.now();
    const values = [sessionHash(sid), now, new Date(now.getTime() - ABSOLUTE)];
    this.#pool
      .query<Row>({ name: 'read-session', text: READ, values })
      .then(({ rows: [row] }) => done(null, row ? withActor(row) : null), done);
  }

  override createSession(request: Request, data: ReadSession) {
    const made = super.createSession(request, data);
    const found = data[READ_WITH];
    if (!found) return made;
    request.actor = found.actor;
    return Object.assign(made, { [READ_WITH]: found });
  }

  override set(sid: string, data: SessionData, done?: (error?: unknown) => void): void {
    this.#write('UPDATE sessions SET sess = $2 WHERE sid = $1', [sessionHash(sid), data], done);
  }

  override touch(sid: string, data: ReadSession, done?: (error?: unknown) => void): void {
    const found = data[READ_WITH];
    const idle = found && idleMs(found.actor);
    const now = this.#clock.now().getTime();
    if (!found || !idle || now + idle - found.expire.getTime() < TOUCH_EVERY) {
      done?.();
      return;
    }
    this.#write(
      'UPDATE sessions SET expire = $2 WHERE sid = $1 AND expire < $2',
      [sessionHash(sid), new Date(now + idle)],
      done,
    );
  }

  override destroy(sid: string, done?: (error?: unknown) => void): void {
    this.#write('DELETE FROM sessions WHERE sid = $1', [sessionHash(sid)], done);
  }

  #write(text: string, values: unknown[], done: ((error?: unknown) => void) | undefined): void {
    this.#pool.query(text, values).then(
      () => done?.(),
      (error: unknown) => done?.(error),
    );
  }
}

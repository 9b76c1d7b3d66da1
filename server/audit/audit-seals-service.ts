import { createHash } from 'node:crypto';
import { setTimeout as sleep } from 'node:timers/promises';
import type { Pool, PoolClient } from 'pg';
import { v7 as uuidv7 } from 'uuid';
import type { Database } from '../database/client';
import { inTransaction } from '../database/transaction';

/** Events a seal at most: what one statement gathers. */
const LARGEST_RANGE = 20_000;
/** An event is numbered a moment before it is written; nothing so young is sealed. */
const QUIET_SECONDS = 5;
const PATIENCE_MS = 30_000;

type Connection = Pool | PoolClient;

export interface Seal {
  readonly from: number;
  readonly to: number;
  readonly digest: string;
  readonly previous: string | null;
}

/** The same bytes for the same events whatever the session's settings, since instants are told in microseconds. */
const EVENTS = `
  SELECT string_agg(jsonb_build_array(sequence, id, (extract(epoch FROM at) * 1000000)::bigint, actor_id, action,
           object_type, object_id, patient_id, ip, session_hash, outcome, details)::text, E'\\n' ORDER BY sequence) AS text
    FROM audit_events WHERE sequence BETWEEN $1 AND $2`;

async function digestOf(
  connection: Connection,
  from: number,
  to: number,
  previous: string | null,
): Promise<string> {
  const { rows } = await connection.query<{ text: string | null }>(EVENTS, [from, to]);
  const hash = createHash('sha256');
  return hash.update(`${previous ?? ''}\n${from}-${to}\n${rows[0]?.text ?? ''}`).digest('hex');
}

async function sealsOf(connection: Connection, order: 'ASC' | 'DESC', limit: number, after = 0) {
  const { rows } = await connection.query<{ [K in keyof Seal]: string }>(
    `SELECT from_sequence AS "from", to_sequence AS "to", digest, previous_digest AS previous
       FROM audit_seals WHERE from_sequence > $2 ORDER BY from_sequence ${order} LIMIT $1`,
    [limit, after],
  );
  return rows.map((row): Seal => ({ ...row, from: Number(row.from), to: Number(row.to) }));
}

/** Every transaction that was writing when this was called has ended, or too much time has passed. */
async function writersEnded(connection: Connection): Promise<boolean> {
  const { rows } = await connection.query<{ next: string }>(
    'SELECT pg_snapshot_xmax(pg_current_snapshot())::text AS next',
  );
  const end = Date.now() + PATIENCE_MS;
  while (Date.now() < end) {
    const { rows: oldest } = await connection.query<{ ended: boolean }>(
      'SELECT pg_snapshot_xmin(pg_current_snapshot()) >= $1::xid8 AS ended',
      [rows[0]?.next],
    );
    if (oldest[0]?.ended) return true;
    await sleep(50);
  }
  return false;
}

async function newestSettled(connection: Connection, quietSeconds: number): Promise<number> {
  const { rows } = await connection.query<{ newest: string | null }>(
    `SELECT coalesce((SELECT min(sequence) - 1 FROM audit_events WHERE at > now() - make_interval(secs => $1)),
                     (SELECT max(sequence) FROM audit_events)) AS newest`,
    [quietSeconds],
  );
  return Number(rows[0]?.newest ?? 0);
}

/** @returns the seal that was made, null when there was nothing to seal or another process sealed it */
function sealNext(database: Database, upTo: number): Promise<Seal | null> {
  return inTransaction(database, async ({ connection }) => {
    const [last] = await sealsOf(connection, 'DESC', 1);
    const from = (last?.to ?? 0) + 1;
    const to = Math.min(upTo, from + LARGEST_RANGE - 1);
    if (to < from) return null;
    const previous = last?.digest ?? null;
    const digest = await digestOf(connection, from, to, previous);
    const made = await connection.query(
      `INSERT INTO audit_seals (id, from_sequence, to_sequence, digest, previous_digest)
       VALUES ($1, $2, $3, $4, $5) ON CONFLICT (from_sequence) DO NOTHING`,
      [uuidv7(), from, to, digest, previous],
    );
    return made.rowCount === 1 ? { from, to, digest, previous } : null;
  });
}

/**
 * Seals what was recorded since the last seal, in ranges that touch each other, each chained to the one before, so that
 * nothing recorded can be changed, removed or put in between unseen.
 * @returns the seals that were made; the last digest belongs into a log that the database's owner cannot rewrite
 */
export async function sealAudit(
  database: Database,
  quietSeconds: number = QUIET_SECONDS,
): Promise<Seal[]> {
  const upTo = await newestSettled(database.$client, quietSeconds);
  const made: Seal[] = [];
  if (!(await writersEnded(database.$client))) return made;
  for (;;) {
    const seal = await sealNext(database, upTo);
    if (!seal) return made;
    made.push(seal);
  }
}

/**
 * Recomputes every seal from the events.
 * @returns the seals whose range no longer holds what it held, or that no longer follow each other; [] when all is well
 */
export async function verifyAudit({ $client }: Database): Promise<Seal[]> {
  const broken: Seal[] = [];
  let before: Seal | undefined;
  for (;;) {
    const [seal] = await sealsOf($client, 'ASC', 1, before?.from ?? 0);
    if (!seal) return broken;
    const follows =
      seal.from === (before?.to ?? 0) + 1 && seal.previous === (before?.digest ?? null);
    const digest = await digestOf($client, seal.from, seal.to, seal.previous);
    if (!follows || digest !== seal.digest) broken.push(seal);
    before = seal;
  }
}

import { Client } from 'pg';
import type { Logger } from 'pino';
import { changeTopics, type ChangeTopic } from '@shared/contracts/live-contract';
import type { Database } from '../database/client';

/** The channel that the database's triggers tell on. */
const CHANNEL = 'plimsoll_changes';
const firstWaitMs = 250;
const longestWaitMs = 10_000;

/** Whose record changed; null for both: anybody's. */
export interface RecordChange {
  readonly topic: ChangeTopic;
  readonly patientId: string | null;
  readonly siteId: string | null;
}

export interface ChangeListener {
  readonly changed: (change: RecordChange) => void;
  /** The feed was cut: what came in between is not known, so read everything again. */
  readonly missed: () => void;
  /** The process stops. */
  readonly ended: () => void;
}

/** What is committed anywhere, told to this process: one connection of its own, made for the first who listens. */
export interface ChangeFeed {
  /** Resolves once nothing more is missed, to a function that stops listening. */
  readonly listen: (listener: ChangeListener) => Promise<() => void>;
  readonly close: () => Promise<void>;
}

function readChange(payload: string | undefined): RecordChange | null {
  const told = JSON.parse(payload ?? 'null') as RecordChange | null;
  return told !== null && changeTopics.includes(told.topic) ? told : null;
}

/** @param log is told when the connection is lost */
export function createChangeFeed(database: Database, log: Pick<Logger, 'warn'>): ChangeFeed {
  const { connectionString } = database.$client.options;
  const listeners = new Set<ChangeListener>();
  let closed = false;
  let connection: Promise<Client> | null = null;

  const tell = (act: (listener: ChangeListener) => void): void => [...listeners].forEach(act);

  async function open(): Promise<Client> {
    const client = new Client({
      connectionString,
      application_name: 'plimsoll-changes',
      keepAlive: true,
    });
    client.on('notification', ({ payload }) => {
      const change = readChange(payload);
      if (change) tell((listener) => listener.changed(change));
    });
    client.on('error', (error) => log.warn({ err: error }, 'the feed of changes was cut'));
    client.once('end', () => void (closed || reopen(firstWaitMs)));
    try {
      await client.connect();
      await client.query(`LISTEN ${CHANNEL}`);
    } catch (error) {
      client.removeAllListeners('end');
      await client.end().catch(() => undefined);
      throw error;
    }
    return client;
  }

  async function reopen(waitMs: number): Promise<void> {
    await new Promise((resolve) => setTimeout(resolve, waitMs).unref());
    if (closed) return;
    connection = open();
    try {
      await connection;
      tell((listener) => listener.missed());
    } catch (error) {
      log.warn({ err: error }, 'the feed of changes is not back yet');
      await reopen(Math.min(waitMs * 2, longestWaitMs));
    }
  }

  return {
    listen: async (listener) => {
      connection ??= open();
      try {
        await connection;
      } catch (error) {
        if (listeners.size === 0) connection = null;
        throw error;
      }
      listeners.add(listener);
      return () => void listeners.delete(listener);
    },
    close: async () => {
      closed = true;
      tell((listener) => listener.ended());
      listeners.clear();
      const client = await connection?.catch(() => null);
      await client?.end();
    },
  };
}

import { mkdir, readdir, readFile, rename, rm, writeFile } from 'node:fs/promises';
import { join } from 'node:path';
import { v7 as uuid } from 'uuid';

/** A message as it came over the wire. */
export interface Caught {
  /** UUIDv7, so that ids sort by time of receipt. */
  id: string;
  receivedAt: string;
  from: string;
  recipients: string[];
  /** Every byte as one character (latin1), so that nothing is lost on the way through JSON. */
  raw: string;
}

export interface MessageFolder {
  /** Oldest first. */
  all(): readonly Caught[];
  find(id: string): Caught | undefined;
  add(message: Omit<Caught, 'id' | 'receivedAt'>): Promise<Caught>;
  clear(): Promise<void>;
}

/**
 * Messages in a folder, a file each, read once at the start.
 * @param path null keeps them in memory only
 */
export async function openMessageFolder(path: string | null): Promise<MessageFolder> {
  const messages = new Map<string, Caught>();
  if (path !== null) for (const message of await readAll(path)) messages.set(message.id, message);
  return {
    all: () => [...messages.values()],
    find: (id) => messages.get(id),
    async add(received) {
      const message: Caught = { id: uuid(), receivedAt: new Date().toISOString(), ...received };
      if (path !== null) await write(path, message);
      messages.set(message.id, message);
      return message;
    },
    async clear() {
      const ids = [...messages.keys()];
      messages.clear();
      if (path !== null) {
        await Promise.all(ids.map((id) => rm(fileOf(path, id), { force: true })));
      }
    },
  };
}

const fileOf = (path: string, id: string): string => join(path, `${id}.json`);

async function readAll(path: string): Promise<Caught[]> {
  await mkdir(path, { recursive: true });
  const names = (await readdir(path)).filter((name) => name.endsWith('.json')).sort();
  return Promise.all(
    names.map(async (name) => JSON.parse(await readFile(join(path, name), 'utf8')) as Caught),
  );
}

async function write(path: string, message: Caught): Promise<void> {
  const file = fileOf(path, message.id);
  await writeFile(`${file}.new`, JSON.stringify(message), { mode: 0o600 });
  await rename(`${file}.new`, file);
}

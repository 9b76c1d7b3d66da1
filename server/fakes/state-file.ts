import { mkdir, readFile, rename, writeFile } from 'node:fs/promises';
import { dirname } from 'node:path';

export interface StateFile<T> {
  /** The state itself; change it in place, then save. */
  value: T;
  /** Resolves when the state as it stands now, or a later one, is on disk. */
  save(): Promise<void>;
}

/**
 * A JSON document in a file, written whole beside it and renamed: a kill leaves the old one or
 * the new one, never half of one. Saves that come while one is being written become one.
 * @param path where it is kept; null keeps it in memory only
 * @throws Error when the file is there and is not JSON
 */
export async function openStateFile<T>(path: string | null, empty: () => T): Promise<StateFile<T>> {
  let writing: Promise<void> = Promise.resolve();
  let queued: Promise<void> | null = null;
  const state: StateFile<T> = {
    value: path === null ? empty() : await readOr(path, empty),
    save() {
      if (path === null) return Promise.resolve();
      queued ??= writing
        .catch(() => undefined)
        .then(() => {
          queued = null;
          writing = write(path, state.value);
          return writing;
        });
      return queued;
    },
  };
  return state;
}

async function readOr<T>(path: string, empty: () => T): Promise<T> {
  let text: string;
  try {
    text = await readFile(path, 'utf8');
  } catch (error) {
    if ((error as NodeJS.ErrnoException).code === 'ENOENT') return empty();
    throw error;
  }
  try {
    return JSON.parse(text) as T;
  } catch (cause) {
    throw new Error(`${path} is not readable as JSON. Remove it to start empty.`, { cause });
  }
}

async function write(path: string, value: unknown): Promise<void> {
  await mkdir(dirname(path), { recursive: true });
  const beside = `${path}.new`;
  await writeFile(beside, JSON.stringify(value), { mode: 0o600 });
  await rename(beside, path);
}

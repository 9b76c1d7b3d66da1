import { createHash } from 'node:crypto';
import { existsSync, mkdirSync, readdirSync, readFileSync, statSync, writeFileSync } from 'node:fs';
import { join, relative } from 'node:path';
import { lastLines, runCommand } from '../command.mjs';
import { SetupFailure } from '../failure.mjs';
import { packageProgram, ROOT } from '../paths.mjs';

const SOURCES = ['src', 'shared', 'public', 'angular.json', 'tsconfig.json', 'package-lock.json'];
const STAMP = join(ROOT, 'dist', 'client.stamp');
const BUILT = join(ROOT, 'dist', 'client', 'browser', 'index.html');

/** @param {string} source */
function filesOf(source) {
  const path = join(ROOT, source);
  if (!existsSync(path)) return [];
  if (statSync(path).isFile()) return [path];
  return readdirSync(path, { recursive: true, withFileTypes: true })
    .filter((entry) => entry.isFile() && !entry.name.endsWith('.spec.ts'))
    .map((entry) => join(entry.parentPath, entry.name))
    .sort();
}

/** A hash of all that the client is built from. */
export function clientSourcesHash() {
  const hash = createHash('sha256').update(process.versions.node);
  for (const file of SOURCES.flatMap(filesOf)) {
    hash.update(`${relative(ROOT, file)}\0`).update(readFileSync(file));
  }
  return hash.digest('hex');
}

/**
 * Builds the client into dist/client, unless it was built from the same sources.
 * @param {(outcome: string) => void} tell
 */
export async function buildClient(tell) {
  const hash = clientSourcesHash();
  const stamp = existsSync(STAMP) && existsSync(BUILT) ? readFileSync(STAMP, 'utf8') : '';
  if (stamp === hash) return tell('built from the same sources before');
  const built = await runCommand(packageProgram('ng'), ['build'], {
    cwd: ROOT,
    // Chunks that always load together become one file: the first screen asks for 12 files and not 17.
    env: { ...process.env, NG_CLI_ANALYTICS: 'false', CI: 'true', NG_BUILD_OPTIMIZE_CHUNKS: '1' },
  });
  if (built.code !== 0) {
    throw new SetupFailure({
      did: 'Built the client into dist/client.',
      why: lastLines(`${built.output}\n${built.errors}`, 40),
      type: 'npm run build:client',
    });
  }
  mkdirSync(join(ROOT, 'dist'), { recursive: true });
  writeFileSync(STAMP, hash);
  return tell('built');
}

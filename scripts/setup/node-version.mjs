import { readFileSync } from 'node:fs';
import { SetupFailure } from '../failure.mjs';

/**
 * Whether a version is at least another; both as `20.19.0`.
 * @param {string} version
 * @param {string} least
 */
export function isAtLeast(version, least) {
  const [have, want] = [version, least].map((text) => text.split('.').map(Number));
  for (const place of [0, 1, 2]) {
    const difference = (have?.[place] ?? 0) - (want?.[place] ?? 0);
    if (difference !== 0) return difference > 0;
  }
  return true;
}

/** Refuses a Node that is older than package.json asks for. */
export function requireNodeVersion() {
  const manifest = JSON.parse(readFileSync(new URL('../../package.json', import.meta.url), 'utf8'));
  const least = manifest.engines.node.replace('>=', '');
  if (isAtLeast(process.versions.node, least)) return;
  throw new SetupFailure({
    why: `Plimsoll needs Node ${least} or later, and this is Node ${process.versions.node}: install a newer Node, then start again.`,
  });
}

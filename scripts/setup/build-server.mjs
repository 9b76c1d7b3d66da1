import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { SetupFailure } from '../failure.mjs';
import { ROOT } from '../paths.mjs';

/** Everything that runs by itself, each to dist/server/NAME.js. */
export const ENTRY_POINTS = {
  main: 'server/main.ts',
  config: 'server/config.ts',
  migrate: 'server/database/migrate.ts',
  'payment-service': 'server/fakes/payment-service.ts',
  'mail-catcher': 'server/fakes/mail-catcher.ts',
  demo: 'server/demo/main.ts',
};

/** CommonJS whose names plain Node cannot import: goes into the bundle. */
const BUNDLED = ['rrule'];

function externalPackages() {
  const manifest = JSON.parse(readFileSync(join(ROOT, 'package.json'), 'utf8'));
  const names = Object.keys({ ...manifest.dependencies, ...manifest.devDependencies });
  return names.filter((name) => !BUNDLED.includes(name));
}

/** @returns {import('esbuild').BuildOptions} */
export function serverBuildOptions() {
  return {
    absWorkingDir: ROOT,
    entryPoints: ENTRY_POINTS,
    outdir: 'dist/server',
    bundle: true,
    platform: 'node',
    target: 'node20',
    format: 'esm',
    alias: { '@shared': './shared' },
    external: externalPackages(),
    sourcemap: true,
    logLevel: 'silent',
  };
}

/** Bundles the server and what runs beside it into dist/server. */
export async function buildServer() {
  const esbuild = await import('esbuild');
  try {
    await esbuild.build(serverBuildOptions());
  } catch (error) {
    const { errors = [] } = /** @type {import('esbuild').BuildFailure} */ (error);
    const messages = await esbuild.formatMessages(errors, { kind: 'error' });
    throw new SetupFailure({
      did: 'Bundled the server into dist/server.',
      why: messages.join('').trim() || String(error),
      type: 'npm run build:server',
    });
  }
}

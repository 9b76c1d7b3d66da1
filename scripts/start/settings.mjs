import { join } from 'node:path';
import { pathToFileURL } from 'node:url';
import { SetupFailure } from '../failure.mjs';
import { ROOT } from '../paths.mjs';

/** Stands for the own cluster, whose port is not known yet when the settings are checked. */
const OWN_CLUSTER = 'postgres://plimsoll_app@127.0.0.1/plimsoll';

/**
 * Checks the settings by the server's own rules before anything is started.
 * @param {NodeJS.ProcessEnv} env
 * @returns {Promise<import('../../server/config').Config>}
 */
export async function checkSettings(env) {
  const { loadConfig, ConfigError } = await import(
    pathToFileURL(join(ROOT, 'dist/server/config.js')).href
  );
  try {
    return loadConfig({ ...env, DATABASE_URL: env['DATABASE_URL'] || OWN_CLUSTER });
  } catch (error) {
    if (!(error instanceof ConfigError)) throw error;
    throw new SetupFailure({ why: /** @type {Error} */ (error).message });
  }
}

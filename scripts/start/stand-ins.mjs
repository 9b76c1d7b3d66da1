import { join } from 'node:path';
import { findFreePort } from '../ports.mjs';
import { startChild, waitUntilHealthy } from './child.mjs';

const STAND_IN_KEY = 'sk_test_standin';

/**
 * @typedef {object} StandIn
 * @property {string} about what a person may want to know
 * @property {NodeJS.ProcessEnv} settings what the server is told
 */

/**
 * @typedef {object} Surroundings
 * @property {number} port the server's
 * @property {string} folder the data folder
 * @property {string} webhookSecret
 * @property {import('../cleanup.mjs').Cleanup} cleanup
 */

/**
 * @param {string} name
 * @param {NodeJS.ProcessEnv} settings
 * @param {Surroundings} surroundings
 */
async function launch(name, settings, { folder, cleanup }) {
  const child = startChild({
    name,
    env: { PATH: process.env['PATH'], TZ: 'UTC', ...settings },
    logFolder: join(folder, 'logs'),
  });
  cleanup.add(() => child.stop());
  await waitUntilHealthy(child, `http://127.0.0.1:${settings['PORT']}/_health`);
}

/**
 * @param {Surroundings} surroundings
 * @param {Set<number>} taken
 * @returns {Promise<StandIn>}
 */
async function startPaymentService(surroundings, taken) {
  const port = await takePort(surroundings.port + 1, taken);
  const webhookSecret = `whsec_${surroundings.webhookSecret}`;
  await launch(
    'payment-service',
    {
      PORT: String(port),
      STATE_FILE: join(surroundings.folder, 'payment-service.json'),
      WEBHOOK_URL: `http://127.0.0.1:${surroundings.port}/api/payments/webhook`,
      WEBHOOK_SECRET: webhookSecret,
      API_KEY: STAND_IN_KEY,
    },
    surroundings,
  );
  return {
    about: `Payment service (stand-in; no money moves): http://127.0.0.1:${port}`,
    settings: {
      STRIPE_SECRET_KEY: STAND_IN_KEY,
      STRIPE_WEBHOOK_SECRET: webhookSecret,
      STRIPE_API_BASE: `http://127.0.0.1:${port}`,
    },
  };
}

/**
 * @param {Surroundings} surroundings
 * @param {Set<number>} taken
 * @returns {Promise<StandIn>}
 */
async function startMailCatcher(surroundings, taken) {
  const port = await takePort(surroundings.port + 2, taken);
  const smtpPort = await takePort(surroundings.port + 3, taken);
  await launch(
    'mail-catcher',
    {
      PORT: String(port),
      SMTP_PORT: String(smtpPort),
      STATE_FILE: join(surroundings.folder, 'mail-catcher.json'),
    },
    surroundings,
  );
  return {
    about: `E-mail (stand-in; nothing leaves this machine): http://127.0.0.1:${port}`,
    settings: { SMTP_URL: `smtp://127.0.0.1:${smtpPort}` },
  };
}

/**
 * @param {number} preferred
 * @param {Set<number>} taken
 */
async function takePort(preferred, taken) {
  const port = await findFreePort(Math.min(preferred, 65_000), taken);
  taken.add(port);
  return port;
}

/**
 * Starts the local stand-in of each hosted service whose real settings are unset.
 * @param {NodeJS.ProcessEnv} env
 * @param {Surroundings} surroundings
 * @returns {Promise<StandIn[]>}
 */
export async function startStandIns(env, surroundings) {
  const taken = new Set([surroundings.port]);
  const standIns = [];
  if (!env['STRIPE_SECRET_KEY']) standIns.push(await startPaymentService(surroundings, taken));
  if (!env['SMTP_URL']) standIns.push(await startMailCatcher(surroundings, taken));
  return standIns;
}

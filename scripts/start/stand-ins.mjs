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
 * @param {number} port
 * @returns {Promise<StandIn>}
 */
async function startPaymentService(surroundings, port) {
  const webhookSecret = `whsec_${surroundings.webhookSecret}`;
  await launch(
    'payment-service',
    {
      PORT: String(port),
      STATE_FILE: join(surroundings.folder, 'payment-service.json'),
      WEBHOOK_URL: `http://127.0.0.1:${surroundings.port}/api/payments/webhook`,
      WEBHOOK_SECRET: webhookSecret,
      API_KEY: STAND_IN_KEY,
      KNOWN_PAYMENTS: join(surroundings.folder, 'demo-payments.json'),
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
 * @param {number} port
 * @param {number} smtpPort
 * @returns {Promise<StandIn>}
 */
async function startMailCatcher(surroundings, port, smtpPort) {
  await launch(
    'mail-catcher',
    {
      PORT: String(port),
      SMTP_PORT: String(smtpPort),
      MAIL_FOLDER: join(surroundings.folder, 'mail'),
    },
    surroundings,
  );
  return {
    about: `E-mail (stand-in; nothing leaves this machine): http://127.0.0.1:${port}`,
    settings: { SMTP_URL: `smtp://127.0.0.1:${smtpPort}` },
  };
}

/**
 * The three ports after the server's, each moved up when taken.
 * @param {number} serverPort
 * @returns {Promise<[number, number, number]>}
 */
async function takePorts(serverPort) {
  const taken = new Set([serverPort]);
  const take = async (/** @type {number} */ distance) => {
    const port = await findFreePort(Math.min(serverPort, 65_000) + distance, taken);
    taken.add(port);
    return port;
  };
  return [await take(1), await take(2), await take(3)];
}

/**
 * Starts the local stand-in of each hosted service whose real settings are unset.
 * @param {NodeJS.ProcessEnv} env
 * @param {Surroundings} surroundings
 * @returns {Promise<StandIn[]>}
 */
export async function startStandIns(env, surroundings) {
  const [payments, mail, smtp] = await takePorts(surroundings.port);
  const standIns = [];
  if (!env['STRIPE_SECRET_KEY']) standIns.push(startPaymentService(surroundings, payments));
  if (!env['SMTP_URL']) standIns.push(startMailCatcher(surroundings, mail, smtp));
  return Promise.all(standIns);
}

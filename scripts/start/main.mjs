import { Cleanup, stopRequest } from '../cleanup.mjs';
import { explain } from '../steps.mjs';
import { accountsTable } from './announce.mjs';
import { startProduct } from './product.mjs';

/** @param {Awaited<ReturnType<typeof startProduct>>} product */
async function announce({ config, standIns }) {
  console.log(`Plimsoll is ready at http://127.0.0.1:${config.port}`);
  if (config.secureCookies) console.log(`People reach it at ${config.origin}`);
  if (!config.demo) return;
  console.log(`\n${await accountsTable(config.port)}\n`);
  for (const standIn of standIns) console.log(standIn.about);
  console.log(
    'Stop with Ctrl-C; the data stay. Everything here is invented: enter no real patient.',
  );
}

/**
 * `npm start`: brings everything up, serves until it is asked to stop, and stops everything again.
 * @returns {Promise<number>} exit status
 */
export async function main() {
  const cleanup = new Cleanup();
  const stopping = stopRequest();
  try {
    const product = await Promise.race([startProduct(process.env, cleanup), stopping]);
    if (typeof product === 'string') return 0;
    await announce(product);
    const end = await Promise.race([stopping, product.server.ended.then(() => null)]);
    if (end !== null) return 0;
    console.error(`The server has ended by itself. It said last:\n${product.server.lastLines()}`);
    return 1;
  } catch (error) {
    console.error(explain(error));
    return 1;
  } finally {
    await cleanup.run();
  }
}

import { requireNodeVersion } from './setup/node-version.mjs';
import { explain } from './steps.mjs';

/**
 * Runs a command to its end and leaves with its exit status. The command's own modules are loaded after Node's version
 * has been checked, so that an old Node is told in a sentence.
 * @param {() => Promise<{ main: () => Promise<number> }>} load
 * @returns {Promise<never>}
 */
export async function runMain(load) {
  try {
    requireNodeVersion();
    const { main } = await load();
    process.exitCode = await main();
  } catch (error) {
    console.error(explain(error));
    process.exitCode = 1;
  }
  // What was under way when the person stopped the command must not hold the process.
  return process.exit();
}

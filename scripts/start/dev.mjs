import { spawn } from 'node:child_process';
import { Cleanup, stopRequest } from '../cleanup.mjs';
import { packageProgram, ROOT } from '../paths.mjs';
import { serverBuildOptions } from '../setup/build-server.mjs';
import { explain, say } from '../steps.mjs';
import { prepareProduct, startServer } from './product.mjs';

const CLIENT_PORT = 4200;

/**
 * Bundles the server again at each change and calls back when that has succeeded; errors are shown.
 * @param {() => Promise<void>} rebuilt
 */
async function watchServer(rebuilt) {
  const esbuild = await import('esbuild');
  let first = true;
  const context = await esbuild.context({
    ...serverBuildOptions(),
    logLevel: 'warning',
    plugins: [
      {
        name: 'restart',
        setup: (build) =>
          build.onEnd(async ({ errors }) => {
            if (errors.length === 0 && !first) await rebuilt();
            first = false;
          }),
      },
    ],
  });
  await context.watch();
  return context;
}

/** @param {import('../../server/config').Config} config */
function serveClient({ port }) {
  return spawn(packageProgram('ng'), ['serve', '--port', String(CLIENT_PORT)], {
    cwd: ROOT,
    env: { ...process.env, PORT: String(port), NG_CLI_ANALYTICS: 'false' },
    stdio: ['ignore', 'inherit', 'inherit'],
  });
}

/** @param {Cleanup} cleanup */
async function develop(cleanup) {
  // The browser's own origin is the client's development server, which passes /api on.
  const env = { ...process.env, PLIMSOLL_ORIGIN: `http://127.0.0.1:${CLIENT_PORT}` };
  const { config, serverEnv, standIns } = await prepareProduct(env, cleanup, {
    buildsClient: false,
  });
  let server = await startServer(config, serverEnv);
  cleanup.add(() => server.stop());
  const context = await watchServer(async () => {
    await server.stop();
    try {
      server = await startServer(config, serverEnv);
      say('Server: started again');
    } catch (error) {
      say(explain(error));
    }
  });
  cleanup.add(() => context.dispose());
  const client = serveClient(config);
  cleanup.add(() => client.kill('SIGTERM'));
  for (const standIn of standIns) say(standIn.about);
}

/**
 * `npm run dev`: the product with a server that starts again, and a page that reloads, at each change.
 * @returns {Promise<number>} exit status
 */
export async function main() {
  const cleanup = new Cleanup();
  const stopping = stopRequest();
  try {
    await Promise.race([develop(cleanup), stopping]);
    await stopping;
    return 0;
  } catch (error) {
    console.error(explain(error));
    return 1;
  } finally {
    await cleanup.run();
  }
}

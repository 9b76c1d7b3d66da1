import { runMain } from './run-main.mjs';

await runMain(async () => {
  const { buildServer } = await import('./setup/build-server.mjs');
  const { step } = await import('./steps.mjs');
  return { main: () => step('Server: bundle into dist/server', () => buildServer()).then(() => 0) };
});

import { spawnSync } from 'node:child_process';

// The pictures start the product as the browser journeys and the benchmark do, in TypeScript.
const { status } = spawnSync(process.execPath, ['--import', 'tsx', 'scripts/screenshots/main.ts'], {
  stdio: 'inherit',
});
process.exitCode = status ?? 1;

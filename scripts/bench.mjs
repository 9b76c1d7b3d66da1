import { spawnSync } from 'node:child_process';

// The benchmark records the product's own statements, so it loads the server's TypeScript.
const { status } = spawnSync(process.execPath, ['--import', 'tsx', 'scripts/bench/main.ts'], {
  stdio: 'inherit',
});
process.exitCode = status ?? 1;

import { runMain } from './run-main.mjs';

await runMain(() => import('./start/main.mjs'));

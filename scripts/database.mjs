import { runMain } from './run-main.mjs';

await runMain(() => import('./database/main.mjs'));

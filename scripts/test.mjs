import { runMain } from './run-main.mjs';

await runMain(() => import('./test/main.mjs'));

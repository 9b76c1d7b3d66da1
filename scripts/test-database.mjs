/** `npm run test:database -- stop` removes the throw-away cluster that specs run by hand leave running, for speed. */
import { removeTestCluster, startTestCluster } from './test-cluster.mjs';

const [action = 'start'] = process.argv.slice(2);
if (action === 'start') {
  console.log(await startTestCluster('specs'));
} else if (action === 'stop') {
  await removeTestCluster('specs');
} else {
  console.error('Use: npm run test:database -- start|stop');
  process.exitCode = 1;
}

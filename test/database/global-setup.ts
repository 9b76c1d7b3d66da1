import type { TestProject } from 'vitest/node';
import { startTestCluster } from '../../scripts/test-cluster.mjs';
import { prepareTemplate, type TestServer } from './template';

declare module 'vitest' {
  export interface ProvidedContext {
    testServer: TestServer;
  }
}

/**
 * Uses the server that `npm test` made (TEST_DATABASE_URL), else one of the developer's own that stays running between
 * runs: `npm run test:database -- stop` removes it.
 */
export default async function setup(project: TestProject): Promise<void> {
  const superuserUrl = process.env['TEST_DATABASE_URL'] ?? (await startTestCluster('specs'));
  project.provide('testServer', await prepareTemplate(superuserUrl));
}

import { Logger, runOnce } from 'graphile-worker';
import { featureJobs } from '../../server/features';
import type { TestApp } from './test-app';

const silent = new Logger(() => () => undefined);

/** Runs what waits in the queue and is due; with names, these jobs alone. */
export async function runJobs({ context }: TestApp, names?: readonly string[]): Promise<void> {
  const jobs = featureJobs.filter((job) => !names || names.includes(job.name));
  await runOnce({
    pgPool: context.database.$client,
    noHandleSignals: true,
    logger: silent,
    taskList: Object.fromEntries(
      jobs.map((job) => [job.name, (payload: unknown) => job.run(payload, context)]),
    ),
  });
}

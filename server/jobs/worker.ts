import { Logger as WorkerLogger, parseCronItems, run, type TaskList } from 'graphile-worker';
import type { AppContext } from '../app-context';
import type { JobDefinition } from './job';

export interface Worker {
  /** Takes no more jobs and resolves when those at work are done. */
  readonly stop: () => Promise<void>;
}

const CONCURRENCY = 4;
const NEEDS_A_PERSON: readonly string[] = ['error', 'warning'];

function tasksOf(jobs: readonly JobDefinition[], context: AppContext): TaskList {
  return Object.fromEntries(
    jobs.map((job) => [
      job.name,
      async (payload: unknown) => {
        try {
          await job.run(payload, context);
        } catch (error) {
          context.log.error({ err: error, job: job.name }, 'a job failed and will be tried again');
          throw error;
        }
      },
    ]),
  );
}

const cronOf = (jobs: readonly JobDefinition[]) =>
  parseCronItems(
    jobs.flatMap(({ name, schedule }) =>
      schedule ? [{ task: name, match: schedule, identifier: name }] : [],
    ),
  );

/** The queue's own chatter stays out of the log but for what needs a person. */
const loggerOf = ({ log }: AppContext): WorkerLogger =>
  new WorkerLogger(() => (level, message) => {
    if (NEEDS_A_PERSON.includes(level)) log.warn({ queue: level }, message.split('\n')[0]);
  });

/** Works on the queue inside this process; any number of processes share one queue. */
export async function startWorker(
  jobs: readonly JobDefinition[],
  context: AppContext,
): Promise<Worker> {
  const runner = await run({
    // With a delay the ends of jobs are gathered, and stopping waits until they are written; without, it does not.
    preset: { worker: { completeJobBatchDelay: 0, failJobBatchDelay: 0 } },
    pgPool: context.database.$client,
    concurrency: CONCURRENCY,
    taskList: tasksOf(jobs, context),
    parsedCronItems: cronOf(jobs),
    noHandleSignals: true,
    logger: loggerOf(context),
  });
  for (const { name } of jobs.filter(({ atStart }) => atStart)) {
    await runner.addJob(name, {}, { jobKey: `${name} at start` });
  }
  return {
    stop: async () => {
      await runner.stop();
      await runner.promise;
    },
  };
}

import * as z from 'zod';
import { jobSource, recordAuditAlone } from '../audit/audit-service';
import { job } from '../jobs/job';
import { planClassDates } from './class-dates-service';
import { counterDifferences } from './counters-service';

const planClassDatesJob = job({
  name: 'plan-class-dates',
  payload: z.object({}),
  schedule: '12 3 * * *',
  atStart: true,
  run: async (_, { database, clock, log }) => {
    const outcome = await planClassDates(database, clock.now());
    if (outcome.made + outcome.moved > 0) log.info(outcome, 'class dates were made ahead');
  },
});

/** Proves each night that the counters are what the appointments say; a difference is a fault of ours and is not mended here. */
const proveCountersJob = job({
  name: 'prove-counters',
  payload: z.object({}),
  schedule: '40 7 * * *',
  run: async (_, { database, clock, log }) => {
    const differences = await counterDifferences(database);
    if (differences.length === 0) return;
    log.error({ differences }, 'counters of places differ from the appointments');
    await recordAuditAlone(database, jobSource(clock.now()), [
      {
        action: 'counters.differ',
        objectType: 'schedule',
        outcome: 'failure',
        details: { differences },
      },
    ]);
  },
});

export const scheduleJobs = [planClassDatesJob, proveCountersJob];

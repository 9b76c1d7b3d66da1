import * as z from 'zod';
import { job } from '../jobs/job';
import { sealAudit } from './audit-seals-service';

export const auditJobs = [
  job({
    name: 'seal-audit',
    payload: z.object({}),
    schedule: '* * * * *',
    run: async (_payload, { database, log }) => {
      const seals = await sealAudit(database);
      const last = seals.at(-1);
      if (last) log.info({ to: last.to, digest: last.digest }, 'audit sealed');
    },
  }),
];

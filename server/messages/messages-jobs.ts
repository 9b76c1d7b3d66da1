import * as z from 'zod';
import { inTransaction } from '../database/transaction';
import { addJob, job, type JobDefinition } from '../jobs/job';
import { overdueMessages } from './outbox-repository';
import { forgetOldLinks } from './preferences-service';
import { sendMessage } from './sending-service';

const send = job({
  name: 'send-message',
  payload: z.object({ outboxId: z.uuid() }),
  run: ({ outboxId }, context) => sendMessage(context, outboxId),
});

/** Takes up what a dead worker held and what waited for a mail server to be set up. */
const sendOverdue = job({
  name: 'send-overdue-messages',
  payload: z.object({}),
  schedule: '* * * * *',
  atStart: true,
  run: async (_, { mailer, database, clock }) => {
    if (!mailer) return;
    await inTransaction(database, async (tx) => {
      for (const { id, dedupeKey } of await overdueMessages(tx, clock.now())) {
        await addJob(tx, 'send-message', { outboxId: id }, { jobKey: dedupeKey });
      }
    });
  },
});

const forgetLinks = job({
  name: 'forget-unsubscribe-links',
  payload: z.object({}),
  schedule: '37 3 * * *',
  run: (_, { database, clock }) => inTransaction(database, (tx) => forgetOldLinks(tx, clock.now())),
});

export const messagesJobs: readonly JobDefinition[] = [send, sendOverdue, forgetLinks];

import * as z from 'zod';
import { awaitingListSchema, tasksSchema } from '@shared/contracts/prescriptions-waiting-contract';
import { worksheetSchema } from '@shared/contracts/prescriptions-worksheet-contract';
import { ok } from '../http/answers';
import { route } from '../http/route';
import { policyInForce } from './policy-queries';
import { presentAwaiting, presentTasks } from './present-prescription';
import { prescribingRoles } from './prescriptions-policy';
import { rangesOf } from './range-in-force-queries';
import { awaitingPhysician, prescribingTasks } from './waiting-queries';
import { worksheetOf } from './worksheet-queries';

/** What pages of ranges begin with: the worksheet, and what waits for somebody. */
export const waitingRoutes = [
  route({
    method: 'get',
    path: '/api/patients/:id/worksheet',
    summary: 'What the record says today for a range, with the policy to work it out by',
    access: { roles: prescribingRoles },
    patient: ({ params }) => params.id,
    audit: {
      action: 'worksheet.read',
      objectType: 'patient',
      objectId: ({ input }) => input.params.id,
      patientId: ({ input }) => input.params.id,
    },
    request: { params: z.object({ id: z.uuid() }) },
    response: { 200: worksheetSchema },
    handler: async ({ tx, actor, input, context }) =>
      ok(await worksheetOf(tx, actor, input.params.id, context.clock.now())),
  }),
  route({
    method: 'get',
    path: '/api/prescriptions/awaiting-signature',
    summary: 'Ranges that staff signed and that wait for a physician, the longest waiting first',
    access: { roles: ['physician'] },
    audit: {
      action: 'prescriptions.awaiting-read',
      objectType: 'prescription',
      patientId: ({ result }) => result.body.items.map(({ patient }) => patient.id),
    },
    request: {},
    response: { 200: awaitingListSchema },
    handler: async ({ tx, actor, context }) => {
      const now = context.clock.now();
      const rows = await awaitingPhysician(tx, actor.siteIds);
      const policy = await policyInForce(tx.connection, now);
      const rangeOf = await rangesOf(
        tx,
        rows.map(({ patient }) => patient.id),
        now,
      );
      const items = rows.map((row) => presentAwaiting(row, rangeOf(row.patient.id), policy, now));
      return ok({ items, total: rows[0]?.total ?? 0 });
    },
  }),
  route({
    method: 'get',
    path: '/api/prescriptions/tasks',
    summary: 'What to see to: ranges withdrawn, missing, unsigned, waiting or due for review',
    access: { roles: prescribingRoles },
    audit: {
      action: 'prescriptions.tasks-read',
      objectType: 'prescription',
      patientId: ({ result }) => [
        ...new Set(
          result.body.groups.flatMap(({ items }) => items.map(({ patient }) => patient.id)),
        ),
      ],
    },
    request: {},
    response: { 200: tasksSchema },
    handler: async ({ tx, actor, context }) => {
      const now = context.clock.now();
      return ok(presentTasks(await prescribingTasks(tx, actor.siteIds, now), now));
    },
  }),
];

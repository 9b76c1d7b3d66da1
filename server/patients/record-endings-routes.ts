import * as z from 'zod';
import { followUpsSchema } from '@shared/contracts/follow-ups-contract';
import {
  closeFollowUpRequestSchema,
  liftRestrictionRequestSchema,
  recordEntrySchema,
  retireThresholdRequestSchema,
  supersedeThresholdRequestSchema,
  type RecordEntry,
  type RecordKind,
} from '@shared/contracts/record-contract';
import type { Role } from '@shared/contracts/accounts-contract';
import { ok } from '../http/answers';
import { route, type RouteDefinition } from '../http/route';
import { openFollowUps } from './follow-ups-queries';
import { chartRoles, retiringRoles } from './patients-policy';
import {
  closeFollowUp,
  liftRestriction,
  retireThreshold,
  supersedeByTest,
} from './record-endings-service';
import type { RecordCall } from './record-service';

interface Ending<Body extends z.ZodType> {
  readonly kind: RecordKind;
  readonly verb: string;
  readonly summary: string;
  readonly roles: readonly Role[];
  readonly action: string;
  readonly body: Body;
  readonly run: (call: RecordCall, entryId: string, body: z.output<Body>) => Promise<RecordEntry>;
}

/** A route by which a person ends what an entry says, with the reason. */
const ending = <Body extends z.ZodType>(end: Ending<Body>): RouteDefinition =>
  route({
    method: 'post',
    path: `/api/patients/:id/record/${end.kind}/:entryId/${end.verb}`,
    summary: end.summary,
    access: { roles: end.roles },
    patient: ({ params }) => params.id,
    audit: {
      action: end.action,
      objectType: end.kind,
      objectId: ({ input }) => input.params.entryId,
      patientId: ({ input }) => input.params.id,
    },
    request: { params: z.object({ id: z.uuid(), entryId: z.uuid() }), body: end.body },
    response: { 200: recordEntrySchema },
    handler: async ({ tx, actor, input: { params, body }, context }) => {
      const call = { tx, actor, patientId: params.id, now: context.clock.now() };
      return ok(await end.run(call, params.entryId, body as z.output<Body>));
    },
  });

export const recordEndingsRoutes: RouteDefinition[] = [
  ending({
    kind: 'thresholds',
    verb: 'retire',
    summary: 'Retires a threshold, by a physician, with the reason',
    roles: retiringRoles,
    action: 'threshold.retired',
    body: retireThresholdRequestSchema,
    run: (call, entryId, { reason }) => retireThreshold(call, entryId, reason),
  }),
  ending({
    kind: 'thresholds',
    verb: 'supersede',
    summary: 'Takes a later clean test for the end of a threshold, confirmed by a person',
    roles: chartRoles,
    action: 'threshold.superseded',
    body: supersedeThresholdRequestSchema,
    run: (call, entryId, { exerciseTestId }) => supersedeByTest(call, entryId, exerciseTestId),
  }),
  ending({
    kind: 'restrictions',
    verb: 'lift',
    summary: 'Lifts a restriction, with who did so and why',
    roles: chartRoles,
    action: 'restriction.lifted',
    body: liftRestrictionRequestSchema,
    run: (call, entryId, { reason }) => liftRestriction(call, entryId, reason),
  }),
  ending({
    kind: 'questionnaires',
    verb: 'close-follow-up',
    summary: 'Closes the follow-up of a PHQ-9 whose ninth answer is above zero, with what was done',
    roles: chartRoles,
    action: 'follow-up.closed',
    body: closeFollowUpRequestSchema,
    run: (call, entryId, { done }) => closeFollowUp(call, entryId, done),
  }),
  route({
    method: 'get',
    path: '/api/follow-ups',
    summary:
      'Patients whose PHQ-9 tells of thoughts of self-harm and with whom nobody has spoken yet',
    access: { roles: chartRoles },
    audit: {
      action: 'follow-ups.read',
      objectType: 'questionnaires',
      patientId: ({ result }) => [...new Set(result.body.items.map(({ patient }) => patient.id))],
    },
    request: {},
    response: { 200: followUpsSchema },
    handler: async ({ tx, actor }) => ok({ items: await openFollowUps(tx, actor) }),
  }),
];

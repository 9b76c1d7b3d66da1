import {
  policyPreviewRequestSchema,
  policyPreviewSchema,
  policyPublishRequestSchema,
  policyVersionsSchema,
} from '@shared/contracts/policy-change-contract';
import { policyInForceSchema } from '@shared/contracts/policy-in-force-contract';
import { created, ok } from '../http/answers';
import { fail, Failure } from '../http/failure';
import { route, type RouteDefinition } from '../http/route';
import { policyEffect } from './policy-effect-queries';
import { policyVersions, policyWithHistory } from './policy-history-queries';
import { proposedPolicy, publishPolicy } from './policy-service';
import { mayChangePolicy, policyReaders } from './prescriptions-policy';

const read = route({
  method: 'get',
  path: '/api/policy',
  summary: 'The program’s policy in force: each number, its default, bounds, source and age',
  access: { roles: policyReaders },
  audit: 'none',
  transaction: 'none',
  request: {},
  response: { 200: policyInForceSchema },
  handler: async ({ actor, context: { database, clock } }) => {
    const policy = await policyWithHistory(database.$client, clock.now());
    return ok({ ...policy, mayChange: mayChangePolicy(actor) });
  },
});

const versions = route({
  method: 'get',
  path: '/api/policy/versions',
  summary: 'Every version of the policy: who published it, when and why, and its numbers',
  access: { roles: policyReaders },
  audit: 'none',
  transaction: 'none',
  request: {},
  response: { 200: policyVersionsSchema },
  handler: async ({ context: { database, clock } }) =>
    ok(await policyVersions(database.$client, clock.now())),
});

const preview = route({
  method: 'post',
  path: '/api/policy/preview',
  summary: 'What other numbers would make of the ranges in force; stores nothing',
  access: { roles: ['administrator', 'physician'] },
  audit: {
    action: 'policy.previewed',
    objectType: 'policy',
    patientId: ({ result }) =>
      result.body.items.flatMap(({ patient }) => (patient ? [patient.id] : [])),
  },
  request: { body: policyPreviewRequestSchema },
  response: { 200: policyPreviewSchema },
  handler: async ({ tx, actor, input: { body }, context }) => {
    if (!mayChangePolicy(actor)) return fail('forbidden');
    const now = context.clock.now();
    const found = await proposedPolicy(tx, body, now);
    if (found instanceof Failure) return found;
    const ranges = { present: found.present.prescribing, proposed: found.proposed.prescribing };
    return ok(await policyEffect(tx, actor, ranges, { offset: body.offset, now }));
  },
});

const publish = route({
  method: 'post',
  path: '/api/policy/versions',
  summary: 'Publishes the next version of the policy, in force at once',
  access: { roles: ['administrator', 'physician'] },
  audit: {
    action: 'policy.published',
    objectType: 'policy',
    objectId: ({ result }) => String(result.body.version),
    details: ({ input }) => ({ values: input.body.values }),
  },
  request: { body: policyPublishRequestSchema },
  response: { 201: policyInForceSchema },
  constraints: { policies_pkey: 'stale-version', policies_within_bounds: 'invalid-request' },
  handler: async ({ tx, actor, input: { body }, context }) => {
    if (!mayChangePolicy(actor)) return fail('forbidden');
    const now = context.clock.now();
    const refused = await publishPolicy(tx, { actor, now }, body);
    if (refused) return refused;
    return created({ ...(await policyWithHistory(tx.connection, now)), mayChange: true });
  },
});

export const policyRoutes: RouteDefinition[] = [read, versions, preview, publish];

import { policyInForceSchema } from '@shared/contracts/policy-in-force-contract';
import { ok } from '../http/answers';
import { route } from '../http/route';
import { policyWithHistory } from './policy-history-queries';
import { policyInForce } from './policy-queries';

export const policyRoutes = [
  route({
    method: 'get',
    path: '/api/policy',
    summary: 'The prescribing policy in force: each number, its default, bounds, source and age',
    access: { roles: ['administrator', 'physician', 'exercise-physiologist'] },
    audit: 'none',
    transaction: 'none',
    request: {},
    response: { 200: policyInForceSchema },
    handler: async ({ context: { database, clock } }) => {
      const { version } = await policyInForce(database.$client, clock.now());
      return ok(await policyWithHistory(database.$client, version));
    },
  }),
];

import { myProgressSchema } from '@shared/contracts/my-progress-contract';
import { ok } from '../http/answers';
import { fail } from '../http/failure';
import { route, type RouteDefinition } from '../http/route';
import { myProgress } from './my-progress-queries';

const read = route({
  method: 'get',
  path: '/api/my/progress',
  summary: 'How far a patient’s own course has come',
  access: { roles: ['patient'] },
  audit: {
    action: 'my-progress.read',
    objectType: 'patient',
    objectId: ({ actor }) => actor?.patientId ?? null,
    patientId: ({ actor }) => actor?.patientId ?? null,
  },
  request: {},
  response: { 200: myProgressSchema },
  handler: async ({ tx, actor, context }) =>
    actor.patientId === null
      ? fail('not-found')
      : ok(await myProgress(tx, actor.patientId, context.clock.now())),
});

export const myProgressRoutes: RouteDefinition[] = [read];

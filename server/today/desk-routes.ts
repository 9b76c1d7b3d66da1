import { deskTodaySchema } from '@shared/contracts/desk-contract';
import { ok } from '../http/answers';
import { route } from '../http/route';
import { deskToday } from './desk-queries';

export const deskRoutes = [
  route({
    method: 'get',
    path: '/api/desk/today',
    summary: 'Who comes today, what is due, and places that came free, at the sites of who asks',
    access: { roles: ['front-desk'] },
    audit: {
      action: 'desk.today-read',
      objectType: 'schedule',
      patientId: ({ result }) => [
        ...new Set(
          result.body.sites.flatMap(({ classes, freed }) => [
            ...classes.flatMap(({ arrivals }) => arrivals.map(({ patientId }) => patientId)),
            ...freed.map(({ patientId }) => patientId),
          ]),
        ),
      ],
    },
    request: {},
    response: { 200: deskTodaySchema },
    handler: async ({ tx, actor, context }) => {
      const now = context.clock.now();
      return ok({ at: now.toISOString(), sites: await deskToday(tx, actor.siteIds, now) });
    },
  }),
];

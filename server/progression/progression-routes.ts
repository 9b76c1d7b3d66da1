import * as z from 'zod';
import {
  courseSoFarSchema,
  decisionRequestSchema,
  proposalSchema,
} from '@shared/contracts/progression-contract';
import { ok } from '../http/answers';
import { fail, Failure } from '../http/failure';
import { route, type RouteDefinition } from '../http/route';
import { rangeInForce } from '../prescriptions/range-in-force-queries';
import { patientById } from '../patients/patients-queries';
import { progressionDeciders, progressionReaders } from './progression-policy';
import { courseSoFar } from './course-queries';
import { findProposal, latestProposal, presentProposal } from './progression-queries';
import { decideProposal } from './progression-service';

const idParams = z.object({ id: z.uuid() });

/** How a course goes, and the next step after its last session. */
export const progressionRoutes: RouteDefinition[] = [
  route({
    method: 'get',
    path: '/api/patients/:id/course-so-far',
    summary: 'Rate, effort and work of each session against the range, and the next step proposed',
    access: { roles: progressionReaders },
    patient: ({ params }) => params.id,
    audit: {
      action: 'course-so-far.read',
      objectType: 'patient',
      objectId: ({ input }) => input.params.id,
      patientId: ({ input }) => input.params.id,
    },
    request: { params: idParams },
    response: { 200: courseSoFarSchema },
    handler: async ({ tx, input, context }) => {
      const { id } = input.params;
      const proposal = await latestProposal(tx, id);
      const range = await rangeInForce(tx, id, context.clock.now());
      const holds = range?.withdrawn.length === 0;
      const patient = await patientById(tx, id);
      if (!patient) return fail('not-found');
      return ok({
        sessions: await courseSoFar(tx, id),
        proposal: proposal ? presentProposal(proposal, holds) : null,
        timeZone: patient.site.timeZone,
      });
    },
  }),
  route({
    method: 'post',
    path: '/api/progression-proposals/:id/decision',
    summary: 'Accepts, changes or dismisses the next step proposed after a session',
    access: { roles: progressionDeciders },
    audit: 'handler',
    request: { params: idParams, body: decisionRequestSchema },
    response: { 200: proposalSchema },
    handler: async ({ tx, actor, input, context, audit }) => {
      const { id } = input.params;
      const now = context.clock.now();
      const outcome = await decideProposal(tx, actor, id, input.body, now);
      if (outcome instanceof Failure) return outcome;
      const { patientId } = outcome;
      audit({
        action: `progression.${input.body.decision}`,
        objectType: 'progression-proposal',
        objectId: id,
        patientId,
      });
      const decided = await findProposal(tx, id);
      if (!decided) throw new Error('A decided proposal is gone');
      const range = await rangeInForce(tx, patientId, now);
      return ok(presentProposal(decided, range?.withdrawn.length === 0));
    },
  }),
];

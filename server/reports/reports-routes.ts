import * as z from 'zod';
import {
  completionFileQuerySchema,
  completionPatientsQuerySchema,
  completionPatientsSchema,
  completionQuerySchema,
  completionReportSchema,
  reportSettingsRequestSchema,
  reportSettingsSchema,
  type CompletionQuery,
  type CompletionReport,
} from '@shared/contracts/reports-contract';
import type { Actor } from '../accounts/actor';
import type { AppContext } from '../app-context';
import type { Queryable } from '../database/client';
import { ok } from '../http/answers';
import { decodeCursor, pageOf } from '../http/cursor';
import { route, textAnswer, type RouteDefinition } from '../http/route';
import { completionCsv } from './completion-csv';
import { completionCounts, completionCourses, type CourseAfter } from './completion-queries';
import { completionReport, presentCourse } from './completion-service';
import type { CompletionScope } from './completion-sql';
import { definitionRoles, reportRoles } from './reports-policy';
import { readCompletionDefinition, writeCompletionDefinition } from './settings-repository';

async function scopeOf(
  from: Queryable,
  query: CompletionQuery,
  { actor, now }: { readonly actor: Actor; readonly now: Date },
): Promise<CompletionScope> {
  const definition = await readCompletionDefinition(from);
  return { ...query, definition, now, siteIds: actor.siteIds };
}

async function report(
  context: AppContext,
  actor: Actor,
  query: CompletionQuery,
): Promise<CompletionReport> {
  const { reportsDatabase, clock } = context;
  const scope = await scopeOf(reportsDatabase, query, { actor, now: clock.now() });
  return completionReport(await completionCounts(reportsDatabase, scope), scope);
}

const completion = route({
  method: 'get',
  path: '/api/reports/completion',
  summary: 'Completion of courses, as counts and rates with their intervals',
  access: { roles: reportRoles },
  audit: 'none',
  transaction: 'none',
  request: { query: completionQuerySchema },
  response: { 200: completionReportSchema },
  handler: async ({ actor, context, input }) => ok(await report(context, actor, input.query)),
});

const completionFile = route({
  method: 'get',
  path: '/api/reports/completion.csv',
  summary: 'The same as comma-separated values, for inside the program or for sharing outside',
  access: { roles: reportRoles },
  audit: {
    action: 'report.exported',
    objectType: 'report',
    objectId: () => 'completion',
    details: ({ input }) => ({ sharing: input.query.sharing }),
  },
  request: { query: completionFileQuerySchema },
  response: { 200: textAnswer('text/csv; charset=utf-8') },
  handler: async ({ actor, context, input: { query } }) => {
    const { sharing, ...asked } = query;
    const name = sharing === 'outside' ? 'completion-shared.csv' : 'completion.csv';
    const headers = { 'Content-Disposition': `attachment; filename="${name}"` };
    return { ...ok(completionCsv(await report(context, actor, asked), query)), headers };
  },
});

const position: z.ZodType<CourseAfter> = z.tuple([z.string(), z.string(), z.uuid()]);

const completionPatients = route({
  method: 'get',
  path: '/api/reports/completion/patients',
  summary: 'The patients behind one of the counts, by name',
  access: { roles: reportRoles },
  audit: {
    action: 'report.patients-read',
    objectType: 'report',
    objectId: () => 'completion',
    patientId: ({ result }) => result.body.items.map(({ patientId }) => patientId),
  },
  request: { query: completionPatientsQuerySchema },
  response: { 200: completionPatientsSchema },
  handler: async ({ tx, actor, context, input: { query } }) => {
    const { part, group, cursor, limit, ...scoped } = query;
    const scope = await scopeOf(tx, scoped, { actor, now: context.clock.now() });
    const after = cursor === undefined ? undefined : decodeCursor(position, cursor);
    const found = await completionCourses(tx, scope, { part, group, after, limit });
    const page = pageOf(found, limit, (row) => [row.familyName, row.givenName, row.enrollmentId]);
    return ok({ ...page, total: found[0]?.total ?? 0, items: page.items.map(presentCourse) });
  },
});

const readSettings = route({
  method: 'get',
  path: '/api/reports/settings',
  summary: 'How the program defines its measures',
  access: { roles: [...reportRoles, 'administrator'] },
  audit: 'none',
  request: {},
  response: { 200: reportSettingsSchema },
  handler: async ({ tx }) => ok({ completionDefinition: await readCompletionDefinition(tx) }),
});

const changeSettings = route({
  method: 'put',
  path: '/api/reports/settings',
  summary: 'Chooses how completion is defined',
  access: { roles: definitionRoles },
  audit: {
    action: 'report.definition-changed',
    objectType: 'setting',
    objectId: () => 'completion-definition',
    details: ({ input }) => ({ value: input.body.completionDefinition }),
  },
  request: { body: reportSettingsRequestSchema },
  response: { 200: reportSettingsSchema },
  handler: async ({ tx, actor, context, input: { body } }) => {
    const now = context.clock.now();
    const value = body.completionDefinition;
    await writeCompletionDefinition(tx, { value, changedBy: actor.id, now });
    return ok(body);
  },
});

export const reportsRoutes: RouteDefinition[] = [
  completion,
  completionFile,
  completionPatients,
  readSettings,
  changeSettings,
];

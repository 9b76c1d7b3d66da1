import type pg from 'pg';
import type { Test } from 'supertest';
import { v7 as uuidv7 } from 'uuid';
import { agentFor, type Agent } from './agent';
import { buildVisit, recordBody, type VisitOptions } from './floor';
import { buildSite, buildUser } from './people';
import { buildClassDate } from './schedule';
import { createTestApp, type TestApp } from './test-app';

/** A nurse on the floor of one site, over HTTP. */
export interface FloorWorld {
  readonly house: TestApp;
  readonly site: Awaited<ReturnType<typeof buildSite>>;
  readonly nurse: Agent;
  readonly close: () => Promise<void>;
  readonly sql: (text: string, values?: unknown[]) => Promise<pg.QueryResult>;
  /** A patient of a class of today, checked in. */
  readonly visit: (options?: VisitOptions) => Promise<Visit>;
  /** A visit whose record is begun. */
  readonly begun: (options?: VisitOptions) => Promise<Visit & { readonly recordId: string }>;
  readonly put: (id: string, body: object) => Test;
  readonly sign: (id: string, body?: object) => Test;
  /** What the audit holds of an object, in order. */
  readonly auditOf: (objectId: string) => Promise<string[]>;
}

type Visit = Awaited<ReturnType<typeof buildVisit>> & {
  readonly classDate: Awaited<ReturnType<typeof buildClassDate>>;
};

export async function buildFloorWorld(): Promise<FloorWorld> {
  const house = await createTestApp();
  const { database } = house.context;
  const site = await buildSite(database);
  const nurse = await agentFor(
    house,
    await buildUser(database, { roles: ['nurse'], siteIds: [site.id] }),
  );
  const sql = (text: string, values: unknown[] = []) => database.$client.query(text, values);
  const visit = async (options: VisitOptions = {}) => {
    const classDate = await buildClassDate(database, site, { localDate: '2026-12-01' });
    return { ...(await buildVisit(database, site, classDate, options)), classDate };
  };
  return {
    house,
    site,
    nurse,
    close: () => house.close(),
    sql,
    visit,
    begun: async (options) => {
      const built = await visit(options);
      const recordId = uuidv7();
      const body = recordBody(built.appointment.id);
      await nurse.put(`/api/session-records/${recordId}`).send(body).expect(201);
      return { ...built, recordId };
    },
    put: (id, body) => nurse.put(`/api/vital-signs/${id}`).send(body),
    sign: (id, body) => {
      const call = nurse.post(`/api/session-records/${id}/sign`);
      return body ? call.send(body) : call;
    },
    auditOf: async (objectId) => {
      const { rows } = await sql(
        'SELECT action FROM audit_events WHERE object_id = $1 ORDER BY at, id',
        [objectId],
      );
      return (rows as { action: string }[]).map(({ action }) => action);
    },
  };
}

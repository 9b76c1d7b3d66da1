import { randomUUID } from 'node:crypto';
import fc from 'fast-check';
import pg from 'pg';
import { describe, expect, it, vi } from 'vitest';
import type { Role } from '@shared/contracts/accounts-contract';
import { allPages, pageOf, patientsHouse } from '../../test/builders/patients-house';
import { buildSite } from '../../test/builders/people';
import { buildPrescription } from '../../test/builders/prescriptions';
import { buildEnrollment } from '../../test/builders/schedule';

const house = patientsHouse();
const { at, patient } = house;

describe('search', () => {
  it.each([
    ['verne'],
    ['VER'],
    ['oda'],
    ['ver oda'],
    ['Verne, Odalys'],
    ['lúcia'],
    ['lucia'],
    ['verne 1961'],
    ['verne 5/14/1961'],
    ['1961-05-14'],
    ['QY-10'],
    ['qy104'],
    ['104'],
  ])('%s finds Odalys Lúcia Verne', async (q) => {
    await patient({ familyName: 'Sørensen', givenName: 'Per', birthDate: '1950-01-02' });
    const { id } = await patient({
      familyName: 'Verne',
      givenName: 'Odalys Lúcia',
      birthDate: '1961-05-14',
      recordNumber: `QY-104${randomUUID().slice(0, 4)}`,
    });
    expect((await pageOf(house.nurse, { q })).items.map((item) => item.id)).toEqual([id]);
  });

  it.each([['rne'], ['verne x'], ['verne 1962'], ['###'], ["' or 1=1 --"], ['(a+)+$'], ['%']])(
    '%s does not',
    async (q) => {
      await patient({
        familyName: 'Verne',
        givenName: 'Odalys',
        birthDate: '1961-05-14',
        recordNumber: `Z${randomUUID().replaceAll('-', '')}`,
      });
      expect((await pageOf(house.nurse, { q })).items).toEqual([]);
    },
  );

  it.each([
    ["O'Brien", 'obrien'],
    ["O'Brien", "o'bri"],
    ["O'Brien", 'brien'],
    ['van den Berg', 'vandenberg'],
    ['van den Berg', 'berg'],
    ['Łukasik', 'luk'],
    ['Sørensen', 'sorensen'],
    ['Smith-Jones', 'jones'],
    ['Smith-Jones', 'smithjones'],
  ])('finds %s by %s', async (familyName, q) => {
    await patient({ familyName });
    expect((await pageOf(house.nurse, { q })).items).toHaveLength(1);
  });

  it('tells what a person needs in a list', async () => {
    const { id, recordNumber } = await patient({ familyName: 'Verne', givenName: 'Odalys' });
    const enrollment = await buildEnrollment(house.testApp.context.database, {
      patientId: id,
      siteId: house.siteId,
      plannedSessions: 24,
    });
    await buildPrescription(house.testApp.context.database, {
      patientId: id,
      enrollmentId: enrollment.id,
    });
    const { items } = await pageOf(house.nurse, {});
    expect(items).toEqual([
      {
        id,
        displayName: 'Odalys Verne',
        familyName: 'Verne',
        givenName: 'Odalys',
        recordNumber,
        birthDate: '1961-04-17',
        ageYears: 65,
        site: { id: house.siteId, name: expect.any(String), timeZone: 'America/New_York' },
        course: { enrollmentId: enrollment.id, status: 'active', attended: 0, planned: 24 },
        range: {
          prescriptionId: expect.any(String),
          leadBy: 'heart-rate',
          target: { lower: 91, upper: 108 },
          ceiling: 108,
          perceivedExertion: { lower: 11, upper: 14 },
          since: expect.any(String),
        },
        flags: [],
      },
    ]);
  });

  it('shows the running course before an older or a later ended one', async () => {
    const { id } = await patient();
    const build = (given: Partial<Parameters<typeof buildEnrollment>[1]>) =>
      buildEnrollment(house.testApp.context.database, {
        patientId: id,
        siteId: house.siteId,
        ...given,
      });
    await build({ status: 'completed', enrolledOn: '2025-01-01' });
    const running = await build({ enrolledOn: '2026-03-01' });
    await build({ status: 'discontinued', enrolledOn: '2026-05-01' });
    const { items } = await pageOf(house.nurse, {});
    expect(items[0]?.course?.enrollmentId).toBe(running.id);
  });

  it.each([
    [{ limit: 0 }, 'limit'],
    [{ limit: 101 }, 'limit'],
    [{ limit: '5' }, 'limit'],
    [{ cursor: 'bm9uc2Vuc2U' }, 'cursor'],
    [{ cursor: Buffer.from('["a\\u0000","b","c"]').toString('base64url') }, 'cursor'],
    [{ q: 'x'.repeat(101) }, 'q'],
    [{ name: 'Verne' }, 'name'],
  ])('refuses %j', async (body, path) => {
    const reply = await house.nurse.post('/api/patients/search').send(body).expect(422);
    expect(reply.body.errors).toMatchObject([{ path }]);
  });

  it('refuses a NUL in a query without breaking', async () => {
    await house.nurse.post('/api/patients/search').send({ q: 'a\u0000b' }).expect(422);
  });

  it.each<[Role, number]>([
    ['patient', 403],
    ['nurse', 200],
    ['exercise-physiologist', 200],
    ['physician', 200],
    ['front-desk', 200],
    ['director', 200],
    ['administrator', 200],
  ])('a %s gets %i', async (role, status) => {
    const agent = await at([role], [house.siteId]);
    await agent.post('/api/patients/search').send({}).expect(status);
  });

  it('records who looked and whom it showed, and no name', async () => {
    const { id } = await patient({ familyName: 'Verne' });
    await pageOf(house.nurse, { q: 'Verne' });
    const { rows } = await house.testApp.context.database.$client.query<{ details: unknown }>(
      `SELECT details FROM audit_events WHERE action = 'patients.searched' ORDER BY sequence DESC LIMIT 1`,
    );
    expect(rows[0]?.details).toEqual({ shown: [id] });
  });
});

describe('paging', () => {
  it('gives every patient once, in the order of people’s names, also equal ones', async () => {
    const names = fc.constantFrom('Öz', 'Oz', 'oz', 'Ö z', 'Zed', 'Ab', 'áb', 'Ab-c', 'É');
    await fc.assert(
      fc.asyncProperty(
        fc.array(fc.tuple(names, names), { minLength: 0, maxLength: 14 }),
        fc.integer({ min: 1, max: 5 }),
        async (people, limit) => {
          const site = await buildSite(house.testApp.context.database);
          for (const [familyName, givenName] of people) {
            await patient({ siteId: site.id, familyName, givenName });
          }
          const agent = await at(['nurse'], [site.id]);
          const listed = await allPages(agent, { limit });
          const { rows } = await house.testApp.context.database.$client.query<{ id: string }>(
            'SELECT id FROM patients WHERE site_id = $1 ORDER BY family_name, given_name, id',
            [site.id],
          );
          expect(listed.map(({ id }) => id)).toEqual(rows.map(({ id }) => id));
        },
      ),
      { numRuns: 8 },
    );
  });

  it('keeps its place while patients are added, each earlier one shown once', async () => {
    const before = await Promise.all(
      Array.from({ length: 9 }, (_, each) => patient({ familyName: `F${each % 3}` })),
    );
    let added = 0;
    const listed = await allPages(house.nurse, { limit: 2 }, () => {
      added += 1;
      return added > 6 ? Promise.resolve() : patient({ familyName: `F${added % 4}` });
    });
    const ids = listed.map(({ id }) => id);
    expect(new Set(ids).size).toBe(ids.length);
    expect(ids).toEqual(expect.arrayContaining(before.map(({ id }) => id)));
    const names = listed.map(({ familyName }) => familyName);
    expect(names).toEqual([...names].sort());
  });

  it('takes as many statements for many as for one', async () => {
    const statements = async (limit: number) => {
      const spy = vi.spyOn(pg.Client.prototype, 'query');
      await pageOf(house.nurse, { limit });
      const count = spy.mock.calls.length;
      spy.mockRestore();
      return count;
    };
    for (let each = 0; each < 30; each += 1) await patient();
    await statements(1);
    const [one, many] = [await statements(1), await statements(30)];
    expect(many).toBe(one);
  });
});

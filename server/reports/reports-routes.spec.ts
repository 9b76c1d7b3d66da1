import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { visitsFrom } from '../../test/builders/courses';
import {
  buildReportsWorld,
  readBehind,
  readCompletionCsv,
  type ReportsWorld,
} from '../../test/builders/reports-world';

describe('the routes of reports', () => {
  let world: ReportsWorld;

  beforeAll(async () => {
    world = await buildReportsWorld();
    const visits = visitsFrom('2025-02-03', 2);
    for (const payer of ['=1+1', '@SUM(A1)', '-2', '+3', '\t=4', 'Plan "A", silver']) {
      await world.addCourse({ visits, enrollment: { payer, plannedSessions: 2 } });
    }
  });
  afterAll(() => world.close());

  const audited = async (action: string): Promise<Record<string, unknown>[]> => {
    const { rows } = await world.house.context.database.$client.query<Record<string, unknown>>(
      `SELECT object_type, object_id, patient_id, details FROM audit_events
        WHERE action = $1 AND outcome = 'success' ORDER BY sequence`,
      [action],
    );
    return rows;
  };

  it('give a file headed by its definition, dates and columns', async () => {
    const reply = await readCompletionCsv(world.director);
    expect(reply.headers['content-type']).toBe('text/csv; charset=utf-8');
    expect(reply.headers['content-disposition']).toBe('attachment; filename="completion.csv"');
    const [definition, dates, columns, ...rows] = reply.text.split('\r\n');
    expect(definition).toBe(
      'Of those who started: all planned sessions attended within 36 weeks of the first.',
    );
    expect(dates).toBe(
      'First sessions from 2025-01-01 to before 2027-01-01. As of 2026-12-01T15:00:00.000Z. ' +
        'Every course here is closed or past its window.',
    );
    expect(columns).toBe(
      'Group,Started,Completed,Ongoing,Rate,95 % low,95 % high,Mean sessions,Rate at most',
    );
    // 6 of 6: Wilson's lower end is 6 / (6 + 1.96²).
    expect(rows).toEqual([expect.stringMatching(/^All,6,6,0,1,0\.6096\d*,1,2,1$/), rows[0], '']);
    expect(await audited('report.exported')).toHaveLength(1);
  });

  it('write no cell that a spreadsheet would run', async () => {
    const { text } = await readCompletionCsv(world.director, { groupBy: 'payer' });
    const groups = text.split('\r\n').slice(3, -2);
    expect(groups.map((row) => row.slice(0, row.indexOf(',1,1,0,'))).sort()).toEqual(
      ["'=1+1", "'@SUM(A1)", "'-2", "'+3", "'\t=4", '"Plan ""A"", silver"'].sort(),
    );
  });

  it('keep back what would tell of a few people in a file for sharing outside', async () => {
    const reply = await readCompletionCsv(world.director, { sharing: 'outside', groupBy: 'sex' });
    expect(reply.headers['content-disposition']).toBe(
      'attachment; filename="completion-shared.csv"',
    );
    const [, , note, columns, ...rows] = reply.text.split('\r\n');
    expect(note).toContain('counts of 1 to 10 people and what would give them away read');
    expect(columns).toMatch(/^Group,Started/);
    for (const row of rows.slice(0, -1)) {
      expect(row).toMatch(/^[^,]+,suppressed,suppressed,0(,suppressed){5}$/);
    }
    const details = (await audited('report.exported')).map(({ details: one }) => one);
    expect(details.at(-1)).toEqual({ sharing: 'outside' });
    const world11 = await buildReportsWorld();
    for (let each = 0; each < 11; each += 1) {
      await world11.addCourse({
        visits: visitsFrom('2025-02-03', 1),
        enrollment: { plannedSessions: 1 },
      });
    }
    const large = await readCompletionCsv(world11.director, { sharing: 'outside' });
    expect(large.text).toMatch(/\r\nAll,11,11,0,1,/);
    await world11.close();
  });

  it('record each patient whose name a list showed', async () => {
    const { items } = await readBehind(world.director, { part: 'completed', limit: '100' });
    expect(items).toHaveLength(6);
    const events = await audited('report.patients-read');
    expect(events.map(({ patient_id }) => patient_id).sort()).toEqual(
      items.map(({ patientId }) => patientId).sort(),
    );
  });

  it('record who changed the definition, and keep it', async () => {
    const path = '/api/reports/settings';
    expect((await world.director.get(path).expect(200)).body).toEqual({
      completionDefinition: 'B',
    });
    const administrator = await world.agentOf('administrator', []);
    await administrator.put(path).send({ completionDefinition: 'A' }).expect(200);
    await world.director.put(path).send({ completionDefinition: 'B' }).expect(200);
    const about = { object_type: 'setting', object_id: 'completion-definition', patient_id: null };
    expect(await audited('report.definition-changed')).toEqual([
      { ...about, details: { value: 'A' } },
      { ...about, details: { value: 'B' } },
    ]);
    await administrator.put(path).send({ completionDefinition: 'C' }).expect(422);
    const physician = await world.agentOf('physician');
    await physician.put(path).send({ completionDefinition: 'A' }).expect(403);
    expect((await physician.get(path).expect(200)).body).toEqual({ completionDefinition: 'B' });
  });

  it.each([
    ['no dates', ''],
    ['no end', 'from=2026-01-01'],
    ['an empty span', 'from=2026-01-01&to=2026-01-01'],
    ['a span that runs backwards', 'from=2026-02-01&to=2026-01-01'],
    ['no day of the calendar', 'from=2026-02-30&to=2026-04-01'],
    ['a year before the calendar', 'from=0000-01-01&to=2026-01-01'],
    ['an unknown group', 'from=2026-01-01&to=2026-02-01&groupBy=name'],
    ['an unknown filter', 'from=2026-01-01&to=2026-02-01&name=x'],
  ])('refuse %s', async (_, query) => {
    for (const path of ['completion', 'completion.csv', 'completion/patients']) {
      const part = path.endsWith('patients') ? '&part=enrolled' : '';
      await world.director.get(`/api/reports/${path}?${query}${part}`).expect(422);
    }
  });

  it('are closed to those who deliver care and book it', async () => {
    for (const role of ['nurse', 'front-desk', 'patient'] as const) {
      const agent = await world.agentOf(role);
      const span = 'from=2025-01-01&to=2027-01-01';
      await agent.get(`/api/reports/completion?${span}`).expect(403);
      await agent.get(`/api/reports/completion.csv?${span}`).expect(403);
      await agent.get(`/api/reports/completion/patients?${span}&part=enrolled`).expect(403);
    }
  });
});

import { randomUUID } from 'node:crypto';
import { v7 as uuidv7 } from 'uuid';
import { evaluatePrescription, type PrescriptionRequest } from '@shared/clinical/prescribing';
import { defaultPolicy } from '@shared/clinical/prescribing';
import type { RosterItem } from '@shared/contracts/floor-contract';
import type { ClassDate } from '@shared/contracts/schedule-contract';
import { signIn, type Caller } from './caller';
import { timeCompletion } from './completion';
import { COURSES, fillLargeNetwork } from './large-network';
import { measure, startBare, type Figure, type Load } from './load';
import { startProduct, type Product } from '../demonstration-product';
import { startRecorder } from './recorder';

interface Row {
  readonly what: string;
  readonly product: Figure;
  readonly bare: Figure | null;
}

const DAY = 86_400_000;
const dateAt = (ms: number): string => new Date(ms).toISOString().slice(0, 10);

/** The class dates of every site from yesterday on, those of a clinic's days to come included. */
async function classDatesOf(caller: Caller, days: number): Promise<ClassDate[]> {
  const { items: sites } = await caller.call<{ items: { id: string }[] }>('GET', '/api/sites');
  const span = `from=${dateAt(Date.now() - DAY)}&to=${dateAt(Date.now() + days * DAY)}`;
  const lists = await Promise.all(
    sites.map(({ id }) =>
      caller.call<{ items: ClassDate[] }>('GET', `/api/class-dates?siteId=${id}&${span}`),
    ),
  );
  return lists.flatMap(({ items }) => items);
}

interface Visit {
  readonly classDateId: string;
  readonly sessionRecordId: string;
}

/** A visit that takes readings: someone of today who can be checked in, with a record begun. */
async function openVisit(nurse: Caller): Promise<Visit> {
  const dates = (await classDatesOf(nurse, 2)).filter(({ booked }) => booked > 2);
  for (const { id: classDateId } of dates) {
    const path = `/api/class-dates/${classDateId}/roster`;
    const { items } = await nurse.call<{ items: RosterItem[] }>('GET', path);
    const waiting = items.find(({ status }) => status === 'booked');
    if (!waiting) continue;
    try {
      await checkIn(nurse, waiting);
    } catch {
      continue; // A class of another day takes nobody in yet.
    }
    const sessionRecordId = uuidv7();
    const { appointmentId } = waiting;
    const begun = { appointmentId, startedAt: new Date().toISOString() };
    await nurse.call('PUT', `/api/session-records/${sessionRecordId}`, begun);
    return { classDateId, sessionRecordId };
  }
  throw new Error('No class of today has anybody to check in');
}

async function checkIn(nurse: Caller, { appointmentId, version }: RosterItem): Promise<void> {
  const path = `/api/appointments/${appointmentId}`;
  for (const [step, status] of ['arrived', 'checked-in'].entries()) {
    await nurse.call('PATCH', path, { status, version: version + step });
  }
}

const readingOf = (sessionRecordId: string) => ({
  sessionRecordId,
  phase: 'exercise',
  measuredAt: new Date().toISOString(),
  heartRate: 104,
  systolic: 138,
  diastolic: 78,
  perceivedExertion: 12,
});

async function againstBare(product: Product, nurse: Caller): Promise<Row[]> {
  const { classDateId, sessionRecordId } = await openVisit(nurse);
  const body = JSON.stringify({ q: '', limit: 25 });
  const roster = `/api/class-dates/${classDateId}/roster`;
  const recorder = await startRecorder(product);
  const { headers } = nurse;
  // Twice, so that what a process learns once is not counted as the cost of a call.
  const record = async (path: string, init: RequestInit) => {
    await recorder.record(path, init);
    return recorder.record(path, init);
  };
  await recorder.record(`/api/vital-signs/${uuidv7()}`, writing(headers, sessionRecordId));
  const freshId = uuidv7();
  const calls = {
    roster: { statements: await record(roster, { headers }) },
    patients: {
      statements: await record('/api/patients/search', { method: 'POST', headers, body }),
    },
    reading: {
      freshId,
      statements: await recorder.record(
        `/api/vital-signs/${freshId}`,
        writing(headers, sessionRecordId),
      ),
    },
  };
  await recorder.close();
  const bare = await startBare(product.databaseUrl, calls);
  const both = async (what: string, name: keyof typeof calls, load: Omit<Load, 'headers'>) => ({
    what: `${what} (${calls[name].statements.length} statements)`,
    product: await measure({ ...load, headers }),
    bare: await measure({ url: `${bare.url}/${name}`, method: load.method }),
  });
  const rows = [
    await both('roster', 'roster', { url: `${product.url}${roster}`, method: 'GET' }),
    await both('patient list', 'patients', {
      url: `${product.url}/api/patients/search`,
      method: 'POST',
      body: { q: '', limit: 25 },
    }),
    await both('write of a reading', 'reading', {
      url: `${product.url}/api/vital-signs/`,
      method: 'PUT',
      next: () => ({ path: `/api/vital-signs/${uuidv7()}`, body: readingOf(sessionRecordId) }),
    }),
  ];
  bare.stop();
  return rows;
}

const writing = (headers: Caller['headers'], sessionRecordId: string): RequestInit => ({
  method: 'PUT',
  headers: { ...headers },
  body: JSON.stringify(readingOf(sessionRecordId)),
});

/** Everyone at once into the next classes that are nearly full: most are refused, and none too many gets in. */
async function bookingUnderContention(product: Product, desk: Caller): Promise<Figure> {
  const dates = (await classDatesOf(desk, 30)).filter(
    ({ startsAt, status, capacity, booked }) =>
      status === 'scheduled' && Date.parse(startsAt) > Date.now() + DAY && capacity > booked,
  );
  const people = await desk.call<{ items: { id: string }[] }>('POST', '/api/patients/search', {
    q: '',
    limit: 100,
  });
  let turn = 0;
  return measure({
    url: `${product.url}/api/appointments`,
    method: 'POST',
    headers: desk.headers,
    next: () => {
      const patientId = people.items[turn % people.items.length]?.id;
      const classDateId = dates[Math.floor(turn / 40) % dates.length]?.id;
      turn += 1;
      return { body: { patientId, classDateId }, headers: { 'idempotency-key': randomUUID() } };
    },
  });
}

function evaluationsPerSecond(request: PrescriptionRequest): number {
  const until = performance.now() + 2000;
  let done = 0;
  for (; performance.now() < until; done += 1) evaluatePrescription(request, defaultPolicy);
  return done / 2;
}

const shown = (value: number): string => Math.round(value).toLocaleString('en-US');

function print(rows: readonly Row[]): void {
  console.log('\nCalls a second (p99 in ms), 16 connections, load and servers on one machine\n');
  for (const { what, product, bare } of rows) {
    const ratio = bare ? ` | ratio ${(product.perSecond / bare.perSecond).toFixed(2)}` : '';
    const against = bare ? ` | bare ${shown(bare.perSecond)} (${bare.p99Ms})` : '';
    const refused = product.refused > 0 ? ` | ${shown(product.refused)} refused` : '';
    console.log(
      `${what.padEnd(40)} ${shown(product.perSecond)} (${product.p99Ms})${against}${ratio}${refused}`,
    );
  }
}

async function storedRequest(nurse: Caller): Promise<PrescriptionRequest> {
  const search = { q: '', limit: 50 };
  const { items } = await nurse.call<{ items: { id: string }[] }>(
    'POST',
    '/api/patients/search',
    search,
  );
  for (const { id } of items) {
    const path = `/api/patients/${id}/prescriptions`;
    const found = await nurse.call<{ items: { inputs: PrescriptionRequest }[] }>('GET', path);
    if (found.items[0]) return found.items[0].inputs;
  }
  throw new Error('The demonstration holds no prescription');
}

async function bench(product: Product): Promise<void> {
  if (COURSES > 0) await fillLargeNetwork(product.superuserUrl);
  const nurse = await signIn(product.url, 'nurse');
  const desk = await signIn(product.url, 'frontdesk');
  const request = await storedRequest(nurse);
  const rows: Row[] = await againstBare(product, nurse);
  rows.push({
    what: 'evaluate over HTTP',
    product: await measure({
      url: `${product.url}/api/prescriptions/evaluate`,
      method: 'POST',
      headers: nurse.headers,
      body: request,
    }),
    bare: null,
  });
  rows.push({
    what: 'booking attempts under contention',
    product: await bookingUnderContention(product, desk),
    bare: null,
  });
  print(rows);
  console.log(
    `${'evaluate, the function alone'.padEnd(40)} ${shown(evaluationsPerSecond(request))}`,
  );
  await timeCompletion(await signIn(product.url, 'director'));
}

const product = await startProduct('bench');
try {
  await bench(product);
} finally {
  await product.stop();
}

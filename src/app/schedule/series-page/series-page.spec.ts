import type { HarnessLoader } from '@angular/cdk/testing';
import { TestbedHarnessEnvironment } from '@angular/cdk/testing/testbed';
import { provideHttpClient, withInterceptors } from '@angular/common/http';
import { HttpTestingController, provideHttpClientTesting } from '@angular/common/http/testing';
import { type ComponentFixture, TestBed } from '@angular/core/testing';
import { MatButtonHarness } from '@angular/material/button/testing';
import { provideRouter } from '@angular/router';
import { problemInterceptor } from '../../core/problem-interceptor';
import { SiteChoice } from '../site-choice';
import { SeriesPage } from './series-page';

const id = (number: number) => `019ae2f0-7e55-7000-8000-00000000000${number}`;
const site = { id: id(1), name: 'Quayside', timeZone: 'America/New_York' };
const patient = {
  id: id(2),
  recordNumber: 'HL-1002',
  displayName: 'Tobias Renner',
  birthDate: '1961-04-17',
  enrollments: [
    {
      id: id(3),
      number: 1,
      site,
      phase: 2,
      status: 'active',
      enrolledOn: '2026-11-10',
      closedOn: null,
      closedReason: null,
      payer: 'commercial',
      plannedSessions: 36,
      sessionLimit: 36,
      dailyLimit: 2,
      monitored: true,
      booked: 34,
      attended: 0,
      firstSessionOn: null,
      lastSessionOn: null,
      qualifying: null,
      version: 1,
    },
  ],
};
const planned = [
  {
    classDateId: id(5),
    localDate: '2026-12-07',
    startsAt: '2026-12-07T14:00:00Z',
    conflict: null,
    alternatives: [],
  },
  {
    classDateId: id(6),
    localDate: '2026-12-09',
    startsAt: '2026-12-09T14:00:00Z',
    conflict: 'class-full',
    alternatives: [{ classDateId: id(7), startsAt: '2026-12-09T19:00:00Z' }],
  },
];
const appointment = (number: number, startsAt: string) => ({
  id: id(number),
  classDateId: id(number),
  patientId: patient.id,
  status: 'booked',
  startsAt,
  endsAt: startsAt,
  version: 1,
});

describe('SeriesPage', () => {
  let fixture: ComponentFixture<SeriesPage>;
  let loader: HarnessLoader;
  let server: HttpTestingController;

  const page = () => fixture.nativeElement as HTMLElement;
  const words = () => page().textContent.replace(/\s+/g, ' ');

  async function settle(): Promise<void> {
    await new Promise((resolve) => setTimeout(resolve));
    fixture.detectChanges();
  }

  async function press(text: string | RegExp): Promise<void> {
    await (await loader.getHarness(MatButtonHarness.with({ text }))).click();
  }

  beforeEach(async () => {
    TestBed.configureTestingModule({
      providers: [
        provideRouter([{ path: '**', children: [] }]),
        provideHttpClient(withInterceptors([problemInterceptor])),
        provideHttpClientTesting(),
        SiteChoice,
      ],
    });
    server = TestBed.inject(HttpTestingController);
    fixture = TestBed.createComponent(SeriesPage);
    fixture.componentRef.setInput('patient', patient.id);
    loader = TestbedHarnessEnvironment.loader(fixture);
    fixture.detectChanges();
    await settle();
    server.expectOne('/api/sites').flush({ items: [site] });
    server.expectOne(`/api/patients/${patient.id}`).flush(patient);
    await settle();
    answerClassDates();
    await settle();
  });

  afterEach(() => {
    server.verify();
  });

  function answerClassDates(): void {
    const request = server.expectOne(({ url }) => url === '/api/class-dates');
    const localDate = request.request.params.get('from') ?? '';
    const items = ['09:00', '14:00'].map((localStart, index) => ({
      id: id(index),
      siteId: site.id,
      name: 'Class',
      kind: 'exercise',
      startsAt: `${localDate}T14:00:00Z`,
      endsAt: `${localDate}T15:00:00Z`,
      localDate: '2026-12-07',
      localStart,
      capacity: 12,
      booked: index * 12,
      monitoredCapacity: 6,
      monitoredBooked: 0,
      status: 'scheduled',
      price: null,
    }));
    request.flush({ items, nextCursor: null });
  }

  async function find(): Promise<void> {
    page().querySelector<HTMLInputElement>('input[type=radio]')?.click();
    await press('Find places');
    const request = server.expectOne('/api/appointments/series/preview');
    expect(request.request.body).toMatchObject({
      patientId: patient.id,
      siteId: site.id,
      weekdays: [1, 3, 5],
      startTime: '09:00',
      count: 2,
    });
    request.flush({ items: planned });
    await settle();
  }

  it('says whom it books, how many are left, and where there is room', () => {
    expect(words()).toContain('Tobias Renner');
    expect(words()).toContain('2 sessions of the course are not booked yet.');
    expect(words()).toContain('9:00 AMfree on 1 of 1');
    expect(words()).toContain('2:00 PMfree on 0 of 1');
  });

  it('asks for what is missing', async () => {
    await press('Find places');
    await settle();
    expect(page().querySelector('.missing')?.textContent).toContain('Choose an hour.');
  });

  it('books what is free and the alternative that was chosen, and says it back', async () => {
    await find();
    expect(words()).toContain('1 of 2 dates are free');
    const select = page().querySelector<HTMLSelectElement>('app-series-plan select');
    expect([...(select?.options ?? [])].map(({ text }) => text.trim())).toEqual([
      'Leave out',
      'Same day, 2:00 PM',
    ]);
    if (select) select.value = id(7);
    select?.dispatchEvent(new Event('change'));
    await settle();
    await press('Book 2 sessions');
    const request = server.expectOne('/api/appointments/series');
    expect(request.request.body).toEqual({
      patientId: patient.id,
      classDateIds: [id(5), id(7)],
    });
    request.flush({
      items: [appointment(5, '2026-12-07T14:00:00Z'), appointment(7, '2026-12-09T19:00:00Z')],
    });
    await settle();
    expect(words()).toContain('2 sessions: Mondays, Wednesdays, and Fridays at 9:00 AM');
    expect(words()).toContain('Wednesday, December 9, 2:00 PM');
  });

  it('shows what is free now when someone was quicker', async () => {
    await find();
    await press('Book 1 session');
    const title = 'This class is full. Choose another date.';
    server.expectOne('/api/appointments/series').flush(
      {
        type: '/problems/class-full',
        title,
        status: 409,
        code: 'class-full',
        id: 'x',
        errors: [],
      },
      { status: 409, statusText: 'Conflict' },
    );
    await settle();
    server.expectOne('/api/appointments/series/preview').flush({
      items: [{ ...planned[0], conflict: 'class-full' }, planned[1]],
    });
    await settle();
    expect(words()).toContain('This class is full.');
    expect(words()).toContain('0 of 2 dates are free');
  });
});

import type { HarnessLoader } from '@angular/cdk/testing';
import { TestbedHarnessEnvironment } from '@angular/cdk/testing/testbed';
import { provideHttpClient, withInterceptors } from '@angular/common/http';
import { HttpTestingController, provideHttpClientTesting } from '@angular/common/http/testing';
import { type ComponentFixture, TestBed } from '@angular/core/testing';
import { MatButtonHarness } from '@angular/material/button/testing';
import { MatInputHarness } from '@angular/material/input/testing';
import type { ClassDate } from '@shared/contracts/schedule-contract';
import { Notices } from '../../core/notices';
import { problemInterceptor } from '../../core/problem-interceptor';
import { Session } from '../../core/session';
import { ClassPanel } from './class-panel';

const id = (number: number) => `019ae2f0-7e55-7000-8000-00000000000${number}`;
const site = { id: id(1), name: 'Quayside', timeZone: 'America/New_York' };
const day = new Date(Date.now() + 5 * 86_400_000).toISOString().slice(0, 10);

const date: ClassDate = {
  id: id(2),
  siteId: site.id,
  name: 'Morning class',
  kind: 'exercise',
  startsAt: `${day}T14:00:00Z`,
  endsAt: `${day}T15:00:00Z`,
  localDate: day,
  localStart: '09:00',
  capacity: 12,
  booked: 7,
  monitoredCapacity: 6,
  monitoredBooked: 5,
  status: 'scheduled',
  price: null,
};
const appointment = {
  id: id(3),
  classDateId: date.id,
  patientId: id(4),
  status: 'booked',
  startsAt: date.startsAt,
  endsAt: date.endsAt,
  version: 1,
};
const row = {
  ...appointment,
  displayName: 'Odalys Verne',
  recordNumber: 'HL-1001',
  monitored: true,
  cancelledReason: null,
};
const person = {
  id: id(4),
  displayName: 'Tobias Renner',
  familyName: 'Renner',
  givenName: 'Tobias',
  recordNumber: 'HL-1002',
  birthDate: '1961-04-17',
  ageYears: 65,
  site,
  course: null,
  range: null,
  flags: [],
};

describe('ClassPanel', () => {
  let fixture: ComponentFixture<ClassPanel>;
  let loader: HarnessLoader;
  let server: HttpTestingController;
  let undo: (() => void) | undefined;
  const said: string[] = [];

  async function open(roles: string[]): Promise<void> {
    said.length = 0;
    TestBed.configureTestingModule({
      providers: [
        provideHttpClient(withInterceptors([problemInterceptor])),
        provideHttpClientTesting(),
        {
          provide: Notices,
          useValue: {
            say: (words: string) => Promise.resolve(said.push(words)),
            offerUndo: (words: string, back: () => void) => {
              undo = back;
              return Promise.resolve(said.push(words));
            },
          },
        },
      ],
    });
    server = TestBed.inject(HttpTestingController);
    const loaded = TestBed.inject(Session).load();
    const user = { id: id(9), displayName: 'F', email: 'f@harborlane.example', roles };
    server.expectOne('/api/auth/session').flush({
      user: { ...user, patientId: null },
      demo: false,
      demoAccounts: [],
    });
    await loaded;
    fixture = TestBed.createComponent(ClassPanel);
    fixture.componentRef.setInput('date', date);
    fixture.componentRef.setInput('site', site);
    fixture.componentRef.setInput('others', [
      { ...date, id: id(5), startsAt: `${day}T19:00:00Z`, localStart: '14:00', booked: 0 },
    ]);
    loader = TestbedHarnessEnvironment.loader(fixture);
    fixture.detectChanges();
  }

  afterEach(() => {
    server.verify();
  });

  function roster(items: object[]): void {
    server.expectOne(`/api/class-dates/${date.id}/appointments`).flush({ items });
  }

  const words = () => (fixture.nativeElement as HTMLElement).textContent.replace(/\s+/g, ' ');

  async function settle(): Promise<void> {
    await new Promise((resolve) => setTimeout(resolve));
    fixture.detectChanges();
  }

  async function press(text: string | RegExp): Promise<void> {
    const found = await loader.getHarness(MatButtonHarness.with({ text }));
    await found.click();
  }

  async function choosePerson(): Promise<void> {
    const input = await loader.getHarness(MatInputHarness);
    await input.setValue('renner');
    await new Promise((resolve) => setTimeout(resolve, 300));
    const search = server.expectOne('/api/patients/search');
    expect(search.request.body).toEqual({ q: 'renner', limit: 8 });
    search.flush({ items: [person], nextCursor: null });
    await settle();
    const found = (fixture.nativeElement as HTMLElement).querySelector<HTMLButtonElement>(
      'app-patient-search li button',
    );
    expect(found?.textContent).toContain('HL-1002');
    found?.click();
    await settle();
  }

  it('shows who is in and the numbers in words', async () => {
    await open(['front-desk']);
    roster([row]);
    await settle();
    expect(words()).toContain('7 of 12 places taken');
    expect(words()).toContain('5 of 6 monitors taken');
    expect(words()).toContain('9:00 AM to 10:00 AM');
    expect(words()).toContain('Odalys Verne');
  });

  it('books a patient found by name, with a key of its own', async () => {
    await open(['front-desk']);
    roster([]);
    await settle();
    await choosePerson();
    await press('Book this place');
    const request = server.expectOne('/api/appointments');
    expect(request.request.body).toEqual({ classDateId: date.id, patientId: person.id });
    expect(request.request.headers.get('Idempotency-Key')).toMatch(/^[0-9a-f-]{36}$/);
    request.flush(appointment);
    await settle();
    roster([row]);
    await settle();
    expect(said[0]).toContain('Tobias Renner is booked');
  });

  it('says beside a refusal where there is still a place', async () => {
    await open(['front-desk']);
    roster([]);
    await settle();
    await choosePerson();
    await press('Book this place');
    const title = 'This class is full. Choose another date.';
    server.expectOne('/api/appointments').flush(
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
    roster([]);
    await settle();
    const chosen: string[] = [];
    fixture.componentInstance.chosen.subscribe((one) => chosen.push(one));
    expect(words()).toContain('This class is full.');
    await press(/2:00 PM/);
    expect(chosen).toEqual([id(5)]);
  });

  it('cancels with a reason and takes it back by booking again', async () => {
    await open(['nurse']);
    roster([row]);
    await settle();
    await press('Cancel…');
    const reason = await loader.getAllHarnesses(MatInputHarness);
    await reason.at(-1)?.setValue('Unwell');
    await press('Cancel this place');
    const request = server.expectOne(`/api/appointments/${row.id}`);
    expect(request.request.body).toEqual({ status: 'cancelled', version: 1, reason: 'Unwell' });
    request.flush({ ...appointment, status: 'cancelled', version: 2 });
    await settle();
    roster([]);
    await settle();
    undo?.();
    await settle();
    server.expectOne('/api/appointments').flush(appointment);
    await settle();
    roster([row]);
    await settle();
    expect(words()).toContain('Odalys Verne');
  });

  it('shows the director the numbers and nobody’s name', async () => {
    await open(['director']);
    server.expectNone(`/api/class-dates/${date.id}/appointments`);
    expect(words()).toContain('7 of 12 places taken');
    expect(words()).not.toContain('Book a patient');
  });
});

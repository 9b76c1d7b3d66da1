import type { HarnessLoader } from '@angular/cdk/testing';
import { TestbedHarnessEnvironment } from '@angular/cdk/testing/testbed';
import { provideHttpClient, withInterceptors } from '@angular/common/http';
import {
  HttpTestingController,
  type TestRequest,
  provideHttpClientTesting,
} from '@angular/common/http/testing';
import { type ComponentFixture, TestBed } from '@angular/core/testing';
import { MatButtonHarness } from '@angular/material/button/testing';
import { MatInputHarness } from '@angular/material/input/testing';
import { Router, provideRouter } from '@angular/router';
import type { PatientListItem } from '@shared/contracts/patients-contract';
import { problemInterceptor } from '../../core/problem-interceptor';
import { Session } from '../../core/session';
import { PatientsPage } from './patients-page';

const site = {
  id: '019ae2f0-7e55-7000-8000-000000000010',
  name: 'Quayside',
  timeZone: 'America/New_York',
};

const item = (number: number, given: Partial<PatientListItem> = {}): PatientListItem => ({
  id: `019ae2f0-7e55-7000-8000-0000000001${String(number).padStart(2, '0')}`,
  displayName: `Odalys Verne${number}`,
  familyName: `Verne${number}`,
  givenName: 'Odalys',
  recordNumber: `HL-10${number}`,
  birthDate: '1961-05-14',
  ageYears: 65,
  site,
  course: {
    enrollmentId: '019ae2f0-7e55-7000-8000-000000000020',
    status: 'active',
    attended: 9,
    planned: 36,
  },
  range: null,
  flags: [],
  ...given,
});

describe('PatientsPage', () => {
  let fixture: ComponentFixture<PatientsPage>;
  let loader: HarnessLoader;
  let server: HttpTestingController;

  async function signIn(roles: string[]): Promise<void> {
    const loaded = TestBed.inject(Session).load();
    const id = '019ae2f0-7e55-7000-8000-000000000001';
    const user = { id, displayName: 'N', email: 'n@x.example', roles, patientId: null };
    server.expectOne('/api/auth/session').flush({ user, demo: false, demoAccounts: [] });
    await loaded;
  }

  async function open(roles = ['nurse']): Promise<void> {
    await signIn(roles);
    fixture = TestBed.createComponent(PatientsPage);
    loader = TestbedHarnessEnvironment.loader(fixture);
    document.body.append(fixture.nativeElement as HTMLElement);
    fixture.detectChanges();
  }

  beforeEach(() => {
    TestBed.configureTestingModule({
      providers: [
        provideRouter([{ path: '**', children: [] }]),
        provideHttpClient(withInterceptors([problemInterceptor])),
        provideHttpClientTesting(),
      ],
    });
    server = TestBed.inject(HttpTestingController);
  });
  afterEach(() => {
    server.verify();
    fixture.destroy();
  });

  async function search(): Promise<TestRequest> {
    return vi.waitFor(() => server.expectOne('/api/patients/search'));
  }

  async function answer(
    items: PatientListItem[],
    nextCursor: string | null = null,
  ): Promise<TestRequest> {
    const request = await search();
    request.flush({ items, nextCursor });
    await fixture.whenStable();
    return request;
  }

  const text = () => (fixture.nativeElement as HTMLElement).textContent.replace(/\s+/g, ' ');
  const links = () => [
    ...(fixture.nativeElement as HTMLElement).querySelectorAll<HTMLElement>('a.open'),
  ];
  const field = () => loader.getHarness(MatInputHarness);
  const press = (key: string) =>
    document.activeElement?.dispatchEvent(
      new KeyboardEvent('keydown', { key, bubbles: true, cancelable: true }),
    );

  it('shows everybody at first, with what a person needs', async () => {
    await open();
    const range = {
      prescriptionId: site.id,
      leadBy: 'heart-rate' as const,
      target: { lower: 91, upper: 108 },
      ceiling: 108,
      perceivedExertion: { lower: 11, upper: 14 },
      since: '2026-11-24T15:00:00Z',
    };
    const request = await answer([item(1, { range, flags: ['review-due'] })]);
    expect(request.request.body).toEqual({ cursor: null });
    expect(text()).toContain('Verne1, Odalys');
    expect(text()).toContain('65 years');
    expect(text()).toContain('Session 9 of 36');
    expect(text()).toContain('91–108 bpm');
    expect(text()).toContain('ceiling 108');
    expect(text()).toContain('Review due');
  });

  it('searches as one types, in the body, and asks once for the last word', async () => {
    await open();
    await answer([item(1), item(2)]);
    const input = await field();
    await input.setValue('ver');
    await input.setValue('verne 1961');
    const request = await answer([item(2)]);
    expect(request.request.body).toEqual({ q: 'verne 1961', cursor: null });
    expect(request.request.urlWithParams).toBe('/api/patients/search');
    expect(links()).toHaveLength(1);
  });

  it('drops an answer that comes after a later question', async () => {
    await open();
    const first = await search();
    await (await field()).setValue('verne');
    const second = await search();
    expect(first.cancelled).toBe(true);
    second.flush({ items: [item(2)], nextCursor: null });
    await fixture.whenStable();
    expect(links().map((link) => link.textContent.trim())).toEqual(['Verne2, Odalys']);
  });

  it('says so when nobody is found, and what to type', async () => {
    await open();
    await answer([item(1)]);
    await (await field()).setValue('zzz');
    await answer([]);
    expect(text()).toContain('Nobody found for “zzz”');
    expect(text()).toContain('a birth date as 5/14/1961');
  });

  it('adds the next page below, and goes on there', async () => {
    await open();
    await answer([item(1), item(2)], 'next');
    await (await loader.getHarness(MatButtonHarness.with({ text: 'Show more' }))).click();
    const request = await answer([item(3)]);
    expect(request.request.body).toEqual({ cursor: 'next' });
    expect(links()).toHaveLength(3);
    await vi.waitFor(() => {
      expect(document.activeElement).toBe(links()[2]);
    });
    expect(await loader.getAllHarnesses(MatButtonHarness.with({ text: 'Show more' }))).toEqual([]);
  });

  it('is walked with arrows, and Enter opens', async () => {
    await open();
    await answer([item(1), item(2)]);
    const input = await field();
    await input.focus();
    press('ArrowDown');
    expect(document.activeElement).toBe(links()[0]);
    press('ArrowDown');
    press('ArrowDown');
    expect(document.activeElement).toBe(links()[1]);
    press('ArrowUp');
    press('ArrowUp');
    expect(await input.isFocused()).toBe(true);
    press('Enter');
    await vi.waitFor(() => {
      expect(TestBed.inject(Router).url).toBe(`/patients/${item(1).id}`);
    });
  });

  it('tells a failure and tries again', async () => {
    await open();
    (await search()).error(new ProgressEvent('error'));
    await fixture.whenStable();
    expect(text()).toContain('Plimsoll can’t be reached');
    await (await loader.getHarness(MatButtonHarness.with({ text: 'Try again' }))).click();
    await answer([item(1)]);
    expect(text()).not.toContain('can’t be reached');
    expect(links()).toHaveLength(1);
  });

  it('shows the front desk no range', async () => {
    await open(['front-desk']);
    await answer([item(1)]);
    expect(text()).not.toContain('Range in force');
  });

  it('stands as it was left when one comes back, but not for another person', async () => {
    await open();
    await answer([item(1)]);
    await (await field()).setValue('verne');
    await answer([item(1)]);
    fixture.destroy();
    await open();
    expect((await answer([item(1)])).request.body).toEqual({ q: 'verne', cursor: null });
    fixture.destroy();
    TestBed.inject(Session).forget();
    fixture = TestBed.createComponent(PatientsPage);
    fixture.detectChanges();
    expect((await answer([])).request.body).toEqual({ cursor: null });
  });
});

import { provideHttpClient, withInterceptors } from '@angular/common/http';
import { HttpTestingController, provideHttpClientTesting } from '@angular/common/http/testing';
import { type ComponentFixture, TestBed } from '@angular/core/testing';
import { FormControlDirective } from '@angular/forms';
import { By } from '@angular/platform-browser';
import { provideRouter } from '@angular/router';
import type { Role } from '@shared/contracts/accounts-contract';
import { defaultPolicy } from '@shared/clinical/prescribing';
import type { PrescriptionRequestInput } from '@shared/contracts/prescriptions-contract';
import {
  answerTo,
  type Change,
  prescriptionInput,
  workedExample,
} from '../../../../test/builders/prescription-request';
import { Notices } from '../../core/notices';
import { problemInterceptor } from '../../core/problem-interceptor';
import { Session } from '../../core/session';
import { Confirm, type Question } from '../../ui/confirm/confirm';
import { WorksheetPage } from './worksheet-page';

const id = (last: number) => `019ae2f0-7e55-7000-8000-0000000000${String(last).padStart(2, '0')}`;
const patientId = id(1);
const person = { id: id(9), displayName: 'I. Brandt' };
const site = { id: id(8), name: 'Quayside', timeZone: 'America/New_York' };
const at = '2026-12-01T15:00:00.000Z';

const worksheet = (inputs: object = workedExample, given: object = {}) => ({
  patient: {
    id: patientId,
    displayName: 'Odalys Verne',
    recordNumber: 'HL-104',
    birthDate: '1962-05-14',
    ageYears: 64,
    site,
  },
  course: {
    status: 'active',
    attended: 9,
    planned: 36,
    diagnosis: 'stent',
    eventOn: '2026-09-03',
  },
  today: '2026-12-01',
  record: {
    inputs: { ...inputs, intensity: null, percentOfPeak: null },
    missing: [],
    origins: {
      resting: { text: 'Seated, last 3', date: '2026-10-01', old: true, entryId: null },
    },
  },
  policy: defaultPolicy,
  first: true,
  student: false,
  inForce: null,
  lastPeak: { heartRate: 96, on: '2026-11-30' },
  ...given,
});

const prescription = (changes: Change[] = [], given: object = {}) => ({
  id: id(2),
  patientId,
  status: 'draft',
  version: 1,
  inputs: prescriptionInput((it) => (it.intensity = null), ...changes),
  result: answerTo([(it) => (it.intensity = null), ...changes]),
  policyVersion: 1,
  engineVersion: '1.0.0',
  createdAt: at,
  createdBy: person,
  changedAt: null,
  signedAt: null,
  signedBy: null,
  awaiting: null,
  physicianSignedAt: null,
  physicianSignedBy: null,
  activatedAt: null,
  endedAt: null,
  supersedes: null,
  ...given,
});

describe('WorksheetPage', () => {
  let asked: Question | null;
  let fixture: ComponentFixture<WorksheetPage>;
  let server: HttpTestingController;
  const page = () => fixture.nativeElement as HTMLElement;
  const text = (selector = '') =>
    ((selector ? page().querySelector(selector) : page())?.textContent ?? '').replace(/\s+/g, ' ');
  const settle = () => fixture.whenStable();

  beforeEach(() => {
    asked = null;
    TestBed.configureTestingModule({
      providers: [
        provideRouter([{ path: '**', children: [] }]),
        provideHttpClient(withInterceptors([problemInterceptor])),
        provideHttpClientTesting(),
        { provide: Notices, useValue: { say: vi.fn() } },
        {
          provide: Confirm,
          useValue: {
            ask: (question: Question) => {
              asked = question;
              return Promise.resolve(true);
            },
          },
        },
      ],
    });
    server = TestBed.inject(HttpTestingController);
  });

  async function signIn(role: Role): Promise<void> {
    const loaded = TestBed.inject(Session).load();
    const user = { ...person, email: 'i@x.example', roles: [role], patientId: null };
    server.expectOne('/api/auth/session').flush({ user, demo: false, demoAccounts: [] });
    await loaded;
  }

  async function open(
    sheet: object = worksheet(),
    stored: ReturnType<typeof prescription> | null = null,
    role: Role = 'exercise-physiologist',
  ): Promise<void> {
    await signIn(role);
    fixture = TestBed.createComponent(WorksheetPage);
    if (stored) {
      fixture.componentRef.setInput('prescriptionId', stored.id);
      TestBed.tick();
      server.expectOne(`/api/prescriptions/${stored.id}`).flush(stored);
      await Promise.resolve();
    } else fixture.componentRef.setInput('patientId', patientId);
    await vi.waitFor(() => {
      TestBed.tick();
      server.expectOne(`/api/patients/${patientId}/worksheet`).flush(sheet);
    });
    server
      .expectOne(`/api/patients/${patientId}/prescriptions`)
      .flush({ items: stored ? [stored] : [], nextCursor: null });
    await settle();
  }

  const buttons = () => [...page().querySelectorAll('button')];
  function button(name: string | RegExp): HTMLButtonElement {
    const found = buttons().find((one) => {
      const label = one.getAttribute('aria-label') ?? one.textContent.trim();
      return typeof name === 'string' ? label === name : name.test(label);
    });
    if (!found) throw new Error(`No button ${name}`);
    return found;
  }
  async function press(name: string | RegExp): Promise<void> {
    button(name).click();
    await settle();
  }
  async function type(label: string, value: string): Promise<void> {
    const field = [...page().querySelectorAll('mat-form-field')].find(
      (one) => one.querySelector('mat-label')?.textContent === label,
    );
    const input = field?.querySelector('input');
    if (!input) throw new Error(`No field ${label}`);
    input.value = value;
    input.dispatchEvent(new Event('input'));
    await settle();
  }

  it('shows the record’s inputs with their source, and what they come to', async () => {
    await open();
    expect(text('h1')).toBe('Odalys Verne');
    expect(text('app-result-panel .big')).toContain('91–108');
    expect(text('app-result-panel')).toContain('Ceiling 108 bpm');
    expect(text('app-result-panel')).toContain('10 below ischemia at 118. It binds before 80 %');
    expect(text('app-result-panel')).toContain('The patient is told: 91–105 beats a minute.');
    expect(text('app-input-row')).toContain('Seated, last 3 · Oct 1, 2026');
    expect(text('app-input-row')).toContain('old');
    expect(text('.whose')).toContain('A physician signs too: it is the first range of this course');
    expect(page().querySelector('app-load-line svg')?.getAttribute('aria-label')).toContain(
      'Last peak: 96',
    );
  });

  it('works out anew as one types, and says that the value is not the record’s', async () => {
    await open();
    await press('Try another Resting rate');
    await type('Seated', '70');
    expect(text('app-result-panel .big')).toContain('96–108');
    expect(text('app-input-row')).toContain('Not as in the record');
    expect(text('app-input-row')).toContain('The record says 62 bpm');
    await press('Take the record’s');
    expect(text('app-result-panel .big')).toContain('91–108');
  });

  it('keeps the last picture while a field is at fault, marked as not computed', async () => {
    await open();
    await press('Try another Resting rate');
    await type('Seated', '7');
    expect(text('app-result-panel .big')).toContain('91–108');
    expect(text('.status')).toContain('Not computed: correct the marked fields');
    expect(page().querySelectorAll('.stale').length).toBeGreaterThan(1);
    expect(text('mat-error')).toContain('Seated resting rate must be a number from 30 to 130 bpm');
    expect(button('Keep as draft').getAttribute('aria-disabled')).toBe('true');
    expect(button('Sign range').getAttribute('aria-disabled')).toBe('true');
    await type('Seated', '62');
    expect(text('.status').trim()).toBe('');
  });

  it('asks for what nobody has entered, and begins as soon as it is', async () => {
    const inputs = { ...workedExample, resting: { seated: null, standing: null, spread: null } };
    await open(worksheet(inputs));
    expect(text('section.line')).toContain('Not enough to work out a range yet');
    expect(page().querySelector('app-result-panel')).toBeNull();
    await press('Enter');
    await type('Seated', '62');
    expect(text('app-result-panel .big')).toContain('91–108');
  });

  it('lets another way be used where it applies, and says why where it does not', async () => {
    await open();
    const rows = [...page().querySelectorAll('app-ways-table tbody tr')];
    const tanaka = rows.find((row) => row.textContent.includes('Tanaka'));
    expect(tanaka?.textContent).toMatch(/No: .+/);
    expect(tanaka?.querySelector('button')).toBeNull();
    await press(/^Use Percent of peak/);
    expect(text('app-result-panel .big')).toContain('88–107');
    expect(text('app-ways-table')).toContain('chosen');
    await press('Leave it to the rules');
    expect(text('app-result-panel .big')).toContain('91–108');
  });

  it('shows with reasons when effort leads, the ceiling beside it', async () => {
    await open(worksheet(prescriptionInput((it) => (it.rhythm = 'atrial-fibrillation'))));
    expect(text('app-result-panel')).toContain('Effort leads');
    expect(text('app-result-panel')).toContain('The rhythm does not let heart rate follow effort.');
    expect(text('app-result-panel')).toContain('Ceiling 108 bpm');
    expect(text('app-load-line')).toBeDefined();
  });

  it('reaches every field of the request', async () => {
    const whole: PrescriptionRequestInput = {
      ...workedExample,
      devices: {
        icd: { status: 'present', zones: [{ rate: 170, kind: 'shock' }] },
        upperTrackingRate: 140,
      },
      observedWork: {
        medianHeartRate: 98,
        sessions: 3,
        perceivedExertion: { lower: 10, upper: 12 },
      },
      walkTest: { distanceMeters: 420 },
      intensity: { lower: 0.4, upper: 0.7 },
      percentOfPeak: { lower: 0.6, upper: 0.8 },
    };
    await open(worksheet(), { ...prescription(), inputs: whole });
    for (const one of buttons().filter((each) => each.ariaExpanded === 'false')) one.click();
    await settle();
    const shown = new Set(
      fixture.debugElement
        .queryAll(By.directive(FormControlDirective))
        .map((each) => each.injector.get(FormControlDirective).control),
    );
    const { form } = fixture.componentInstance['state'];
    const leaves = (value: unknown, path: string): string[] =>
      typeof value === 'object' && value !== null
        ? Object.entries(value).flatMap(([key, each]) => leaves(each, `${path}.${key}`))
        : [path.slice(1)];
    const missing = leaves(whole, '').filter((path) => {
      if (path.startsWith('rateActingDrugs') || path.startsWith('choice')) return false;
      const control = form.get(path);
      return control === null || !shown.has(control as never);
    });
    expect(missing).toEqual([]);
    expect(page().querySelectorAll('app-drug-choice input')).toHaveLength(8);
    expect(page().querySelectorAll('app-ways-table tbody tr')).toHaveLength(12);
  });

  it('keeps a draft of what was tried', async () => {
    await open();
    await press('Try another Risk and week');
    await type('Week of the program', '6');
    await press('Keep as draft');
    const sent = server.expectOne({
      method: 'POST',
      url: `/api/patients/${patientId}/prescriptions`,
    });
    expect(sent.request.body.inputs).toEqual({ ...workedExample, intensity: null, programWeek: 6 });
    sent.flush(prescription(), { status: 201, statusText: 'Created' });
    await settle();
    expect(fixture.componentInstance.hasUnkept()).toBe(false);
  });

  it('asks before a signature what will be in force and who must still sign', async () => {
    await open();
    button('Sign range').click();
    await vi.waitFor(() => {
      expect(asked).not.toBeNull();
    });
    expect(asked?.lines).toContain('91–108 bpm, effort 11–14, ceiling 108 bpm.');
    expect(asked?.lines).toContain(
      'It enters into force when a physician has signed too: it is the first range of this course.',
    );
    await vi.waitFor(() => {
      server
        .expectOne({ method: 'POST', url: `/api/patients/${patientId}/prescriptions` })
        .flush(prescription());
    });
    await vi.waitFor(() => {
      const sent = server.expectOne(`/api/prescriptions/${id(2)}/sign`);
      expect(sent.request.body).toEqual({ version: 1 });
      sent.flush(
        prescription([], { version: 2, signedAt: at, signedBy: person, awaiting: 'physician' }),
      );
    });
  });

  it('reads a signed range as it was signed, with who signed and by which policy', async () => {
    const signed = prescription([], {
      status: 'active',
      version: 3,
      signedAt: at,
      signedBy: person,
      physicianSignedAt: at,
      physicianSignedBy: { id: id(7), displayName: 'A. Castellane' },
      activatedAt: at,
    });
    await open(worksheet(prescriptionInput((it) => (it.resting.seated = 80))), signed);
    expect(text('app-result-panel .big')).toContain('91–108');
    expect(text('app-input-row')).toContain('62');
    expect(page().querySelectorAll('.edit, app-ways-table button')).toHaveLength(0);
    expect(text('.provenance')).toContain('policy 1 and engine 1.0.0');
    expect(text('.provenance')).toContain('I. Brandt, Dec 1, 2026, 10:00 AM');
    expect(text('.provenance')).toContain('A. Castellane (physician)');
    expect(buttons().map((one) => one.textContent.trim())).not.toContain('Sign range');
  });

  it('offers a nurse a draft and no signature', async () => {
    await open(worksheet(), null, 'nurse');
    expect(buttons().map((one) => one.textContent.trim())).not.toContain('Sign range');
    expect(button('Keep as draft')).toBeDefined();
  });

  it('tells what the server refuses, beside the field where it names one', async () => {
    await open(worksheet(), prescription());
    await press('Try another Resting rate');
    await type('Seated', '64');
    await press('Keep as draft');
    server.expectOne({ method: 'PUT', url: `/api/prescriptions/${id(2)}` }).flush(
      {
        type: '/problems/stale-version',
        title: 'Someone changed this in the meantime.',
        status: 409,
        code: 'stale-version',
        id: 'abc',
        errors: [],
      },
      { status: 409, statusText: 'Conflict' },
    );
    await vi.waitFor(() => {
      expect(text('app-problem-message')).toContain('Someone changed this in the meantime.');
    });
    expect(fixture.componentInstance.hasUnkept()).toBe(true);
  });
});

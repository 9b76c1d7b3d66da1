import type { HarnessLoader } from '@angular/cdk/testing';
import { TestbedHarnessEnvironment } from '@angular/cdk/testing/testbed';
import { provideHttpClient, withInterceptors } from '@angular/common/http';
import { HttpTestingController, provideHttpClientTesting } from '@angular/common/http/testing';
import { type ComponentFixture, TestBed } from '@angular/core/testing';
import { MatCheckboxHarness } from '@angular/material/checkbox/testing';
import { provideRouter } from '@angular/router';
import { defaultPolicy } from '@shared/clinical/prescribing';
import {
  answerTo,
  type Change,
  prescriptionInput,
  workedExample,
} from '../../../../test/builders/prescription-request';
import { problemInterceptor } from '../../core/problem-interceptor';
import { ComparePage } from './compare-page';

const id = (last: number) => `019ae2f0-7e55-7000-8000-0000000000${String(last).padStart(2, '0')}`;
const patientId = id(1);
const person = { id: id(9), displayName: 'I. Brandt' };

const version = (last: number, createdAt: string, changes: Change[], given: object = {}) => ({
  id: id(last),
  patientId,
  status: 'active',
  version: 1,
  inputs: prescriptionInput(...changes),
  result: answerTo(changes),
  policyVersion: 1,
  engineVersion: '1.0.0',
  createdAt,
  createdBy: person,
  changedAt: null,
  signedAt: createdAt,
  signedBy: person,
  awaiting: null,
  physicianSignedAt: null,
  physicianSignedBy: null,
  activatedAt: createdAt,
  endedAt: null,
  supersedes: null,
  ...given,
});

const worksheet = {
  patient: {
    id: patientId,
    displayName: 'Odalys Verne',
    recordNumber: 'HL-104',
    birthDate: '1962-05-14',
    ageYears: 64,
    site: { id: id(8), name: 'Quayside', timeZone: 'America/New_York' },
  },
  course: null,
  today: '2026-12-01',
  record: {
    inputs: { ...workedExample, intensity: null, percentOfPeak: null },
    missing: [],
    origins: {},
  },
  policy: defaultPolicy,
  first: false,
  student: false,
  inForce: null,
  lastPeak: null,
};

const later: Change[] = [
  (it) => (it.resting.seated = 68),
  (it) => (it.thresholds = []),
  (it) => (it.conditions.pulmonaryHypertension = true),
];
const earlierOne = version(2, '2026-11-01T15:00:00.000Z', []);
const laterOne = version(3, '2026-12-01T15:00:00.000Z', later);

describe('ComparePage', () => {
  let fixture: ComponentFixture<ComparePage>;
  let loader: HarnessLoader;
  const page = () => fixture.nativeElement as HTMLElement;
  /** What is read; a sign is hidden from it. */
  const words = (element: Element | null | undefined) => {
    const read = element?.cloneNode(true) as Element | undefined;
    for (const sign of read?.querySelectorAll('app-icon') ?? []) sign.remove();
    return (read?.textContent ?? '').replace(/\s+/g, ' ').trim();
  };
  const rowsOf = (label: string) =>
    [...page().querySelectorAll(`table[aria-label="${label}"] tr`)].map((row) =>
      [...row.children].map(words).join(' | '),
    );

  async function open(one: { id: string }, other: { id: string }): Promise<void> {
    TestBed.configureTestingModule({
      providers: [
        provideRouter([{ path: '**', children: [] }]),
        provideHttpClient(withInterceptors([problemInterceptor])),
        provideHttpClientTesting(),
      ],
    });
    const server = TestBed.inject(HttpTestingController);
    fixture = TestBed.createComponent(ComparePage);
    loader = TestbedHarnessEnvironment.loader(fixture);
    fixture.componentRef.setInput('oneId', one.id);
    fixture.componentRef.setInput('otherId', other.id);
    TestBed.tick();
    server.expectOne(`/api/prescriptions/${one.id}`).flush(one);
    server.expectOne(`/api/prescriptions/${other.id}`).flush(other);
    await vi.waitFor(() => {
      TestBed.tick();
      server.expectOne(`/api/patients/${patientId}/worksheet`).flush(worksheet);
    });
    await fixture.whenStable();
  }

  it('puts the one written first on the left, whatever the order of the address', async () => {
    await open(laterOne, earlierOne);
    expect(words(page().querySelector('h1'))).toBe('Odalys Verne');
    expect([...page().querySelectorAll('.lines h3')].map(words)).toEqual([
      'Earlier: Nov 1, 2026, 10:00 AM',
      'Later: Dec 1, 2026, 10:00 AM',
    ]);
    expect(page().querySelectorAll('app-load-line')).toHaveLength(2);
  });

  it('says in words what changed in the inputs, and shows the rest when asked', async () => {
    await open(earlierOne, laterOne);
    expect(words(page())).toContain('3 of ');
    const changed = rowsOf('What they rest on');
    expect(changed).toContain('Seated | 62 bpm | 68 bpm | 6 higher');
    expect(changed).toContain('Pulmonary hypertension | No | Yes | changed');
    expect(changed.some((row) => row.endsWith('| same'))).toBe(false);
    const only = await loader.getHarness(MatCheckboxHarness.with({ label: 'Only what changed' }));
    await only.uncheck();
    expect(rowsOf('What they rest on')).toContain('Peak heart rate | 134 bpm | 134 bpm | same');
  });

  it('tells of each limit, machine and caution what was gained and lost', async () => {
    await open(earlierOne, laterOne);
    expect(rowsOf('Limits')).toContain('Ischemia | 108 bpm: 10 below 118 | none | gone');
    expect(rowsOf('What they come to')).toContain('Ceiling | 108 bpm | none | gone');
    expect(rowsOf('What they come to')).toContain('Oxygen saturation at least | none | 88 % | new');
    const parts = [...page().querySelectorAll('[aria-labelledby="cautions"] h3')].map(
      (heading) => [words(heading), words(heading.nextElementSibling)] as const,
    );
    expect(parts.map(([heading]) => heading)).toEqual(['Gained', 'Lost', 'In both']);
    expect(parts[0]?.[1]).toMatch(/oxygen|saturation/i);
    expect(parts[1]?.[1]).not.toBe('None.');
  });

  it('says so where nothing differs', async () => {
    await open(earlierOne, version(4, '2026-11-05T15:00:00.000Z', []));
    expect(words(page())).toContain('Both rest on the same inputs.');
    expect(words(page())).toContain('0 of ');
  });

  it('compares no two patients', async () => {
    await open(earlierOne, version(4, '2026-11-05T15:00:00.000Z', [], { patientId: id(5) }));
    expect(words(page().querySelector('app-empty-state'))).toContain('two patients');
    expect(page().querySelector('table')).toBeNull();
  });
});

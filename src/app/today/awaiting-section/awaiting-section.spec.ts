import { provideHttpClient, withInterceptors } from '@angular/common/http';
import { HttpTestingController, provideHttpClientTesting } from '@angular/common/http/testing';
import { type ComponentFixture, TestBed } from '@angular/core/testing';
import { provideRouter } from '@angular/router';
import type { AwaitingItem } from '@shared/contracts/prescriptions-waiting-contract';
import { answerTo, workedExample } from '../../../../test/builders/prescription-request';
import { problemInterceptor } from '../../core/problem-interceptor';
import { AwaitingSection } from './awaiting-section';

const id = (last: number) => `019ae2f0-7e55-7000-8000-0000000000${String(last).padStart(2, '0')}`;
const at = '2026-12-01T15:00:00.000Z';

const item = (number: number, given: Partial<AwaitingItem> = {}) => ({
  id: id(number),
  version: 2,
  patient: {
    id: id(number + 50),
    displayName: `Odalys Verne${number}`,
    recordNumber: `HL-10${number}`,
    birthDate: '1962-05-14',
    ageYears: 64,
    site: { id: id(90), name: 'Quayside', timeZone: 'America/New_York' },
  },
  course: { status: 'active', attended: 0, planned: 36, diagnosis: 'stent', eventOn: '2026-09-03' },
  risk: 'high',
  restingSeated: 62,
  result: answerTo(),
  causes: ['first-range', 'risk'],
  outdated: [],
  signedAt: at,
  signedBy: { id: id(99), displayName: 'I. Brandt' },
  inForce: null,
  ...given,
});

describe('AwaitingSection', () => {
  let fixture: ComponentFixture<AwaitingSection>;
  let server: HttpTestingController;
  const page = () => fixture.nativeElement as HTMLElement;
  const text = () => page().textContent.replace(/\s+/g, ' ');

  async function open(items: object[]): Promise<void> {
    TestBed.configureTestingModule({
      providers: [
        provideRouter([]),
        provideHttpClient(withInterceptors([problemInterceptor])),
        provideHttpClientTesting(),
      ],
    });
    server = TestBed.inject(HttpTestingController);
    fixture = TestBed.createComponent(AwaitingSection);
    document.body.append(fixture.nativeElement);
    TestBed.tick();
    server.expectOne('/api/prescriptions/awaiting-signature').flush({ items, total: items.length });
    await fixture.whenStable();
  }
  afterEach(() => page().remove());

  async function press(name: string): Promise<void> {
    const found = [...page().querySelectorAll('button')].find(
      (one) => (one.getAttribute('aria-label') ?? one.textContent.trim()) === name,
    );
    if (!found) throw new Error(`No button ${name}`);
    found.click();
    await fixture.whenStable();
  }

  it('tells at a glance whose range, how far, why, and by whom it was prepared', async () => {
    await open([item(1)]);
    expect(text()).toContain('1 waits.');
    expect(text()).toContain('Odalys Verne1');
    expect(text()).toContain('64 · born May 14, 1962 · HL-101 · 0 of 36 sessions · Stent');
    expect(text()).toContain('High risk');
    expect(text()).toContain('91–108 bpm');
    expect(text()).toContain('Ceiling 108 bpm 10 below ischemia at 118');
    expect(text()).toContain('Heart-rate reserve on measured peak 134, 40–80 %. Effort 11–14.');
    expect(text()).toContain('it is the first range of this course; the risk is high or not known');
    expect(text()).toContain('I. Brandt, Dec 1, 2026');
  });

  it('signs in two presses and takes the focus to the next', async () => {
    await open([item(1), item(2)]);
    await press('Sign the range of Odalys Verne1');
    expect(document.activeElement?.textContent.trim()).toBe('Yes, sign');
    server.expectNone({ method: 'POST' });
    await press('Yes, sign');
    const sent = server.expectOne(`/api/prescriptions/${id(1)}/sign`);
    expect(sent.request.body).toEqual({ version: 2 });
    sent.flush({
      id: id(1),
      patientId: id(51),
      status: 'active',
      version: 3,
      inputs: workedExample,
      result: answerTo(),
      policyVersion: 1,
      engineVersion: '1.0.0',
      createdAt: at,
      createdBy: item(1).signedBy,
      changedAt: null,
      signedAt: at,
      signedBy: item(1).signedBy,
      awaiting: null,
      physicianSignedAt: at,
      physicianSignedBy: item(1).signedBy,
      activatedAt: at,
      endedAt: null,
      supersedes: null,
    });
    await vi.waitFor(() => {
      expect(text()).toContain('Signed 10:00 AM');
      expect(document.activeElement?.getAttribute('aria-label')).toBe(
        'Sign the range of Odalys Verne2',
      );
    });
    expect(text()).toContain('1 waits.');
  });

  it('lets nothing out of date be signed', async () => {
    await open([item(1, { outdated: ['drugs'] })]);
    expect(text()).toContain(
      'Since it was worked out, a drug that acts on the heart rate was changed. Have it written anew.',
    );
    expect(page().querySelectorAll('button')).toHaveLength(0);
  });

  it('says what comes here when nothing waits', async () => {
    await open([]);
    expect(text()).toContain('Nothing waits for your signature');
  });
});

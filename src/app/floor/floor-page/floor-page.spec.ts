import { provideHttpClient, withInterceptors } from '@angular/common/http';
import {
  HttpTestingController,
  provideHttpClientTesting,
  type TestRequest,
} from '@angular/common/http/testing';
import { type ComponentFixture, TestBed } from '@angular/core/testing';
import { provideRouter } from '@angular/router';
import type { Role } from '@shared/contracts/accounts-contract';
import type { RosterItem } from '@shared/contracts/floor-contract';
import { problemInterceptor } from '../../core/problem-interceptor';
import { Session } from '../../core/session';
import { sampleItem, sampleReading } from '../visit/roster-sample';
import { FloorPage } from './floor-page';

const id = (number: number): string => `019ae2f0-7e55-7000-8000-0000000000${number}`;
const site = { id: id(50), name: 'Quayside', timeZone: 'America/New_York' };
const now = '2026-12-01T14:03:00.000Z';
const classDate = {
  id: id(60),
  siteId: site.id,
  name: 'Monitored class',
  kind: 'exercise',
  startsAt: '2026-12-01T14:00:00Z',
  endsAt: '2026-12-01T15:00:00Z',
  localDate: '2026-12-01',
  localStart: '09:00',
  capacity: 12,
  booked: 2,
  monitoredCapacity: 12,
  monitoredBooked: 2,
  status: 'scheduled',
  price: null,
};
const renner = sampleItem({
  appointmentId: id(71),
  patientId: id(72),
  displayName: 'Tobias Renner',
  familyName: 'Renner',
  record: null,
});

describe('FloorPage', () => {
  let fixture: ComponentFixture<FloorPage>;
  let page: HTMLElement;
  let server: HttpTestingController;

  async function start(items: RosterItem[], roles: Role[] = ['nurse']): Promise<void> {
    vi.useFakeTimers({ now: new Date(now), toFake: ['Date'] });
    TestBed.configureTestingModule({
      providers: [
        provideRouter([{ path: '**', children: [] }]),
        provideHttpClient(withInterceptors([problemInterceptor])),
        provideHttpClientTesting(),
      ],
    });
    server = TestBed.inject(HttpTestingController);
    const person = { id: id(90), displayName: 'N', email: 'n@harborlane.example', patientId: null };
    const loaded = TestBed.inject(Session).load();
    server
      .expectOne('/api/auth/session')
      .flush({ user: { ...person, roles }, demo: false, demoAccounts: [] });
    await loaded;
    fixture = TestBed.createComponent(FloorPage);
    page = fixture.nativeElement as HTMLElement;
    document.body.append(page);
    await settle();
    server.expectOne('/api/sites').flush({ items: [site] });
    await settle();
    server
      .expectOne(({ url }) => url === '/api/class-dates')
      .flush({ items: [classDate], nextCursor: null });
    await settle();
    await answerRoster(items);
  }
  afterEach(() => {
    page.remove();
    vi.useRealTimers();
  });

  /** Calls on their way keep the page from being stable, so this waits for what is done here alone. */
  async function settle(): Promise<void> {
    for (let turn = 0; turn < 3; turn += 1) {
      TestBed.tick();
      await new Promise((resolve) => setTimeout(resolve));
    }
  }

  async function answerRoster(items: RosterItem[]): Promise<void> {
    server.expectOne(`/api/class-dates/${classDate.id}/roster/stamp`).flush({ stamp: '1' });
    await settle();
    server
      .expectOne(`/api/class-dates/${classDate.id}/roster`)
      .flush({ items, notShown: 0, at: now });
    await settle();
  }

  const buttons = (): HTMLButtonElement[] => [...page.querySelectorAll('button')];
  const wordsOf = (element: Element): string =>
    (element.textContent ?? '').replace(/\s+/g, ' ').trim();

  async function press(name: string): Promise<void> {
    const button = buttons().find(
      (one) => one.getAttribute('aria-label') === name || wordsOf(one).includes(name),
    );
    if (!button) throw new Error(`No button ${name} among ${buttons().map(wordsOf).join(' | ')}`);
    button.click();
    await settle();
  }

  const key = (digit: string): Promise<void> => {
    const pad = [...page.querySelectorAll<HTMLButtonElement>('.keys button')];
    pad.find((one) => wordsOf(one) === digit)?.click();
    return settle();
  };

  function written(): TestRequest {
    return server.expectOne(({ method, url }) => method === 'PUT' && url.includes('/vital-signs/'));
  }

  const answerOf = ({ request }: TestRequest) => ({
    ...sampleReading(10, { receivedAt: now, ...(request.body as object) }),
    id: request.url.split('/').at(-1),
    placement: 'in',
  });

  it('opens the class that is on, a tile a patient', async () => {
    await start([sampleItem(), renner]);
    expect(wordsOf(page.querySelector('h1')!)).toBe('Monitored class, 9:00');
    const tiles = [...page.querySelectorAll('.card .name')].map(wordsOf);
    expect(tiles).toEqual(['Odalys Verne', 'Tobias Renner']);
    expect(wordsOf(page)).toContain('2 of 2 here');
  });

  it('asks for two identifiers before the first entry, and sends them with the record', async () => {
    await start([renner]);
    await press('Tobias Renner');
    expect(page.querySelector('app-reading-pad')).toBeNull();
    expect(wordsOf(page)).toContain('Apr 17, 1961');
    await press('Name and date of birth match');
    const begun = server.expectOne(({ url }) => url.startsWith('/api/session-records/'));
    expect(begun.request.body).toEqual({
      appointmentId: renner.appointmentId,
      startedAt: expect.any(String),
      identityConfirmedWith: ['name', 'birth-date'],
    });
    expect(page.querySelector('app-reading-pad')).not.toBeNull();
  });

  it('shows the place of a rate as it is typed, and what to do first over the ceiling', async () => {
    await start([sampleItem()]);
    await press('Odalys Verne');
    await key('1');
    await key('1');
    expect(page.querySelector('app-finding-chip app-state-chip')).toBeNull();
    await key('3');
    // The first reading is taken at rest, where the ceiling alone counts.
    expect(wordsOf(page.querySelector('app-finding-chip app-state-chip')!)).toContain('over 112');
    expect(wordsOf(page.querySelector('.advice')!)).toContain('First slow the work down');
    expect(buttons().find((one) => wordsOf(one).startsWith('Save'))?.disabled).toBe(false);
  });

  it('makes one entry of a double press, and says that it is saved only when it is', async () => {
    await start([sampleItem()]);
    await press('Odalys Verne');
    for (const digit of ['1', '0', '4']) await key(digit);
    const save = buttons().find((one) => wordsOf(one).startsWith('Save'))!;
    save.click();
    save.click();
    await settle();
    const call = written();
    expect(call.request.body).toMatchObject({ phase: 'resting', heartRate: 104 });
    expect(wordsOf(page.querySelector('app-readings-list')!)).toContain('Kept here, sending…');
    expect(wordsOf(page.querySelector('app-readings-list')!)).not.toContain('saved');
    call.flush(answerOf(call), { status: 201, statusText: 'Created' });
    await settle();
    expect(wordsOf(page.querySelector('app-readings-list')!)).toContain('saved 9:03');
    server.expectNone(({ url }) => url.includes('/vital-signs/'));
  });

  it('takes a keyboard: digits, Enter for the next field', async () => {
    await start([sampleItem()]);
    await press('Odalys Verne');
    const type = async (text: string) => {
      const box = document.activeElement as HTMLInputElement;
      box.value = text;
      box.dispatchEvent(new Event('input'));
      box.dispatchEvent(new KeyboardEvent('keydown', { key: 'Enter', cancelable: true }));
      await settle();
    };
    for (const text of ['104', '138', '7x6', '12', '97']) await type(text);
    expect(wordsOf(document.activeElement!)).toContain('Save');
    await press('Save');
    expect(written().request.body).toMatchObject({
      heartRate: 104,
      systolic: 138,
      diastolic: 76,
      perceivedExertion: 12,
      oxygenSaturation: 97,
    });
  });

  it('keeps what is typed when another patient comes between', async () => {
    await start([sampleItem(), renner]);
    await press('Odalys Verne');
    await key('9');
    await press('Tobias Renner');
    await press('Odalys Verne');
    const box = page.querySelector<HTMLInputElement>('app-pad-field input');
    expect(box?.value).toBe('9');
  });

  it('corrects a reading with a reason, and shows both', async () => {
    await start([sampleItem({ readings: [sampleReading(10, { heartRate: 190 })] })]);
    await press('Odalys Verne');
    await press('Correct the reading of 9:00');
    await press('Typed wrong');
    await press('Erase a digit');
    await press('Erase a digit');
    await key('0');
    await key('9');
    await press('Save correction');
    const call = server.expectOne(`/api/vital-signs/${sampleReading(10).id}/amendments`);
    expect(call.request.body).toMatchObject({ reason: 'Typed wrong', heartRate: 109 });
    const list = wordsOf(page.querySelector('app-readings-list')!);
    expect(list).toContain('109 bpm above range');
    expect(list).toContain('190 bpm');
    expect(page.querySelector('del')?.textContent).toContain('190');
  });

  it('shows the readings first, then signs in one press', async () => {
    await start([sampleItem({ readings: [sampleReading(10)] })]);
    await press('Odalys Verne');
    await press('Review and sign');
    expect(wordsOf(page.querySelector('app-sign-step')!)).toContain('104 bpm in range');
    await press('Sign ·');
    const call = server.expectOne(`/api/session-records/${sampleItem().record?.id}/sign`);
    expect(call.request.body).toEqual({ exercised: true });
  });

  it('lets a physician read and not write', async () => {
    await start([sampleItem({ readings: [sampleReading(10)] })], ['physician']);
    await press('Odalys Verne');
    expect(page.querySelector('app-reading-pad')).toBeNull();
    expect(wordsOf(page)).toContain('104 bpm in range');
    expect(buttons().some((one) => wordsOf(one) === 'Correct')).toBe(false);
  });
});

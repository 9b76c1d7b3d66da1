import { provideHttpClient, withInterceptors } from '@angular/common/http';
import { HttpTestingController, provideHttpClientTesting } from '@angular/common/http/testing';
import { type ComponentFixture, TestBed } from '@angular/core/testing';
import { provideRouter } from '@angular/router';
import { Notices } from '../../core/notices';
import { problemInterceptor } from '../../core/problem-interceptor';
import { SessionsPage } from './sessions-page';

const id = (number: number) => `019ae2f0-7e55-7000-8000-00000000000${number}`;
const inDays = (days: number) => new Date(Date.now() + days * 86_400_000).toISOString();

const session = (number: number, days: number, given: object = {}) => ({
  id: id(number),
  classDateId: id(number),
  patientId: id(9),
  status: 'booked',
  startsAt: inDays(days),
  endsAt: inDays(days + 0.04),
  version: 1,
  className: `Class ${number}`,
  kind: 'exercise',
  localDate: inDays(days).slice(0, 10),
  monitored: true,
  price: null,
  charge: null,
  cancelledReason: null,
  site: { id: id(8), name: 'Quayside', timeZone: 'UTC', phone: '555-0100' },
  ...given,
});

const charge = { amountMinor: 1800, currency: 'USD', paid: false };

describe('SessionsPage', () => {
  let fixture: ComponentFixture<SessionsPage>;
  let server: HttpTestingController;
  let undo: (() => void) | undefined;
  let said: string[];

  const page = () => fixture.nativeElement as HTMLElement;
  const words = () => page().textContent.replace(/\s+/g, ' ');

  async function settle(): Promise<void> {
    await new Promise((resolve) => setTimeout(resolve));
    fixture.detectChanges();
  }

  async function answer(items: object[]): Promise<void> {
    server.expectOne(({ url }) => url === '/api/appointments').flush({ items, nextCursor: null });
    await settle();
    // The block for the calendar comes with the list.
    for (const call of server.match('/api/my/calendar-link')) call.flush({ madeAt: null });
    await settle();
  }

  async function press(text: string): Promise<void> {
    const buttons = [...page().querySelectorAll('button')];
    buttons.find((button) => button.textContent.trim() === text)?.click();
    await settle();
  }

  beforeEach(async () => {
    said = [];
    TestBed.configureTestingModule({
      providers: [
        provideRouter([]),
        provideHttpClient(withInterceptors([problemInterceptor])),
        provideHttpClientTesting(),
        {
          provide: Notices,
          useValue: {
            say: (words: string) => {
              said.push(words);
              return Promise.resolve();
            },
            offerUndo: (words: string, back: () => void) => {
              said.push(words);
              undo = back;
              return Promise.resolve();
            },
          },
        },
      ],
    });
    server = TestBed.inject(HttpTestingController);
    fixture = TestBed.createComponent(SessionsPage);
    fixture.detectChanges();
    await settle();
  });

  afterEach(() => {
    server.verify();
  });

  it('shows the next session first, and what it costs', async () => {
    await answer([
      session(1, -0.1),
      session(2, 1, { status: 'cancelled' }),
      session(3, 2),
      session(4, 3, { charge }),
    ]);
    const [next, ...later] = page().querySelectorAll('app-session-card');
    expect(next?.textContent).toContain('Class 3');
    expect(later.map((card) => card.textContent)).toEqual([expect.stringContaining('Class 4')]);
    expect(words()).toContain('You pay $18.00. You can cancel for free until');
    expect(words()).toContain('cancel at least 24 hours before it starts. After that, you still');
    expect(words()).not.toContain('Class 2');
  });

  it('says what a late cancellation costs before it is one', async () => {
    await answer([session(3, 0.5, { charge })]);
    await press('Cancel');
    expect(words()).toContain('If you cancel now, you still pay $18.00.');
    await press('Keep it');
    expect(words()).not.toContain('If you cancel now');
    await press('Cancel');
    await press('Yes, cancel it');
    const request = server.expectOne(`/api/appointments/${id(3)}`);
    expect(request.request.body).toEqual({ status: 'cancelled', version: 1, acceptsLate: true });
    request.flush({ ...session(3, 0.5), status: 'cancelled', version: 2 });
    await settle();
    await answer([]);
    expect(said[0]).toMatch(/You still pay \$18.00.$/);
  });

  it('asks anew when the last free moment passes while one reads', async () => {
    await answer([session(3, 1.0001, { charge })]);
    await press('Cancel');
    expect(words()).toContain('Cancelling is free: you will not pay the $18.00.');
    await press('Yes, cancel it');
    const title = 'It is now too late to cancel for free. Read what it costs, then decide again.';
    const problem = {
      type: '',
      title,
      status: 409,
      code: 'late-cancellation',
      id: 'x',
      errors: [],
    };
    const request = server.expectOne(`/api/appointments/${id(3)}`);
    expect(request.request.body).toMatchObject({ acceptsLate: false });
    request.flush(problem, { status: 409, statusText: 'Conflict' });
    await settle();
    await answer([session(3, 0.9999, { charge })]);
    expect(words()).toContain(title);
    await press('Cancel');
    expect(words()).toContain('If you cancel now, you still pay $18.00.');
  });

  it('says that a payment on its way back does not pay for the place taken again', async () => {
    await answer([session(3, 2, { charge: { ...charge, paid: true } })]);
    await press('Cancel');
    expect(words()).toContain('you get your $18.00 back');
    await press('Yes, cancel it');
    server
      .expectOne(`/api/appointments/${id(3)}`)
      .flush({ ...session(3, 2), status: 'cancelled', version: 2 });
    await settle();
    await answer([]);
    undo?.();
    await settle();
    server.expectOne('/api/appointments').flush(session(4, 2));
    await settle();
    await answer([session(4, 2, { charge })]);
    expect(said[1]).toContain('please pay anew under Payments');
  });

  it('cancels, and books again when it is taken back', async () => {
    await answer([session(3, 2)]);
    await press('Cancel');
    expect(words()).toContain('Cancelling costs you nothing.');
    await press('Yes, cancel it');
    const request = server.expectOne(`/api/appointments/${id(3)}`);
    expect(request.request.body).toEqual({ status: 'cancelled', version: 1, acceptsLate: false });
    request.flush({ ...session(3, 2), status: 'cancelled', version: 2 });
    await settle();
    await answer([]);
    expect(words()).toContain('You have no session booked');
    undo?.();
    await settle();
    const again = server.expectOne('/api/appointments');
    expect(again.request.body).toEqual({ classDateId: id(3) });
    again.flush(session(4, 2));
    await settle();
    await answer([session(4, 2)]);
    expect(words()).toContain('Class 4');
  });
});

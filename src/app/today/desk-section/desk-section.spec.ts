import { TestbedHarnessEnvironment } from '@angular/cdk/testing/testbed';
import { provideHttpClient, withInterceptors } from '@angular/common/http';
import { HttpTestingController, provideHttpClientTesting } from '@angular/common/http/testing';
import { TestBed } from '@angular/core/testing';
import { MatButtonHarness } from '@angular/material/button/testing';
import { provideRouter } from '@angular/router';
import type { DeskToday } from '@shared/contracts/desk-contract';
import { Notices } from '../../core/notices';
import { problemInterceptor } from '../../core/problem-interceptor';
import { DeskSection } from './desk-section';

const uuid = (last: number) => `0193f0aa-0000-7000-8000-00000000000${last}`;
const day: DeskToday = {
  at: '2026-12-01T15:10:00Z',
  sites: [
    {
      id: uuid(1),
      name: 'Quayside',
      timeZone: 'America/New_York',
      localDate: '2026-12-01',
      classes: [
        {
          id: uuid(2),
          name: 'Morning exercise',
          startsAt: '2026-12-01T15:00:00Z',
          endsAt: '2026-12-01T16:00:00Z',
          capacity: 12,
          booked: 1,
          status: 'scheduled',
          arrivals: [
            {
              appointmentId: uuid(3),
              patientId: uuid(4),
              displayName: 'Ida Marlow',
              recordNumber: 'HL-1001',
              phone: '207-555-0101',
              status: 'booked',
              version: 1,
              due: { chargeId: uuid(5), amountMinor: 1800, currency: 'USD' },
            },
          ],
        },
      ],
      freed: [
        {
          appointmentId: uuid(6),
          patientId: uuid(7),
          displayName: 'Aldo Verne',
          recordNumber: 'HL-1002',
          cancelledAt: '2026-12-01T13:00:00Z',
          classDateId: uuid(8),
          className: 'Afternoon exercise',
          startsAt: '2026-12-02T19:00:00Z',
          localDate: '2026-12-02',
          free: 3,
        },
      ],
    },
  ],
};

describe('DeskSection', () => {
  async function open(answer: DeskToday) {
    const notices = { offerUndo: vi.fn<Notices['offerUndo']>() };
    TestBed.configureTestingModule({
      providers: [
        provideRouter([]),
        provideHttpClient(withInterceptors([problemInterceptor])),
        provideHttpClientTesting(),
        { provide: Notices, useValue: notices },
      ],
    });
    const fixture = TestBed.createComponent(DeskSection);
    const server = TestBed.inject(HttpTestingController);
    await vi.waitFor(() => {
      server.expectOne('/api/desk/today').flush(answer);
    });
    await fixture.whenStable();
    const page = fixture.nativeElement as HTMLElement;
    const text = () => page.textContent.replace(/\s+/g, ' ');
    const loader = TestbedHarnessEnvironment.loader(fixture);
    return { fixture, server, page, text, loader, notices };
  }

  it('tells who is missing, what is due, and which place came free', async () => {
    const { page, text } = await open(day);
    expect(text()).toContain('Tuesday, December 1');
    const missing = page.querySelector(`[aria-labelledby="missing-${uuid(1)}"]`)?.textContent ?? '';
    expect(missing).toContain('not here yet');
    expect(missing).toContain('Ida Marlow');
    expect(missing).toContain('10:00 AM · 207-555-0101');
    expect(text()).toContain('$18.00');
    expect(text()).toContain('Wed, Dec 2, 2:00 PM');
    expect(text()).toContain('3 free');
    const links = [...page.querySelectorAll('a')].map((link) => link.getAttribute('href'));
    expect(links).toContain(`/billing/charges/${uuid(5)}`);
    expect(links).toContain(`/schedule?site=${uuid(1)}&day=2026-12-02&class=${uuid(8)}`);
  });

  it('marks who comes in, reads the day again, and offers to take it back', async () => {
    const { server, loader, notices } = await open(day);
    const button = await loader.getHarness(MatButtonHarness.with({ text: /^Here/ }));
    const pressed = button.click();
    await vi.waitFor(() => {
      const call = server.expectOne(`/api/appointments/${uuid(3)}`);
      expect(call.request.body).toEqual({ status: 'arrived', version: 1 });
      call.flush({
        id: uuid(3),
        classDateId: uuid(2),
        patientId: uuid(4),
        status: 'arrived',
        startsAt: '2026-12-01T15:00:00Z',
        endsAt: '2026-12-01T16:00:00Z',
        version: 2,
      });
    });
    await vi.waitFor(() => {
      server.expectOne('/api/desk/today').flush(day);
    });
    await pressed;
    expect(notices.offerUndo).toHaveBeenCalledWith('Ida Marlow is here.', expect.any(Function));
  });

  it('says what to do where no site is theirs', async () => {
    const { text } = await open({ at: day.at, sites: [] });
    expect(text()).toContain('No site is yours yet');
  });
});

import { TestbedHarnessEnvironment } from '@angular/cdk/testing/testbed';
import { provideHttpClient } from '@angular/common/http';
import { HttpTestingController, provideHttpClientTesting } from '@angular/common/http/testing';
import { TestBed } from '@angular/core/testing';
import { MatInputHarness } from '@angular/material/input/testing';
import { provideRouter } from '@angular/router';
import type { Role } from '@shared/contracts/accounts-contract';
import { Session } from '../../core/session';
import { ChargesPage } from './charges-page';

const id = '0193f0aa-0000-7000-8000-000000000001';
const patientId = '0193f0aa-0000-7000-8000-000000000002';
const charge = {
  id,
  patientId,
  displayName: 'Ida Marlow',
  recordNumber: 'HL-1001',
  description: 'Strength class',
  amountMinor: 1800,
  currency: 'USD',
  status: 'open',
  createdAt: '2026-12-01T15:00:00Z',
  appointment: null,
  paidAt: null,
  payment: null,
  refund: null,
};

describe('ChargesPage', () => {
  async function open(roles: readonly Role[], items: object[] = [charge]) {
    TestBed.configureTestingModule({
      providers: [
        provideRouter([]),
        provideHttpClient(),
        provideHttpClientTesting(),
        { provide: Session, useValue: { roles: () => roles } },
      ],
    });
    const fixture = TestBed.createComponent(ChargesPage);
    const server = TestBed.inject(HttpTestingController);
    const answer = async (body: object, found: object[]) => {
      await vi.waitFor(() => {
        const call = server.expectOne('/api/billing/charges');
        expect(call.request.body).toEqual(body);
        call.flush({ items: found, nextCursor: null });
      });
      await fixture.whenStable();
    };
    await answer({ status: 'open', cursor: null }, items);
    const page = fixture.nativeElement as HTMLElement;
    const links = () =>
      [...page.querySelectorAll('tbody a')].map((link) => link.getAttribute('href'));
    return { fixture, page, links, answer };
  }

  it('leads the desk to the patient and to the charge', async () => {
    const { links, page } = await open(['front-desk']);
    expect(links()).toEqual([`/patients/${patientId}`, `/billing/charges/${id}`]);
    expect(page.textContent).toContain('Take payment');
  });

  it('leads a director, who opens no records, to the charge alone', async () => {
    const { links, page } = await open(['director']);
    expect(links()).toEqual([`/billing/charges/${id}`]);
    expect(page.textContent).not.toContain('Take payment');
  });

  it('searches in the body, never in the address', async () => {
    const { fixture, page, answer } = await open(['front-desk']);
    const input = await TestbedHarnessEnvironment.loader(fixture).getHarness(
      MatInputHarness.with({ label: /Find by name/ }),
    );
    await input.setValue(' marlow ');
    await answer({ status: 'open', q: 'marlow', cursor: null }, []);
    expect(page.textContent).toContain('Nothing fits');
  });
});

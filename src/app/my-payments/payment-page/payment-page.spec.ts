import { provideHttpClient, withInterceptors } from '@angular/common/http';
import { HttpTestingController, provideHttpClientTesting } from '@angular/common/http/testing';
import { TestBed, type ComponentFixture } from '@angular/core/testing';
import { provideRouter, withComponentInputBinding } from '@angular/router';
import { RouterTestingHarness } from '@angular/router/testing';
import { problemInterceptor } from '../../core/problem-interceptor';
import { PaymentPage } from './payment-page';

const id = '0193f0aa-0000-7000-8000-000000000001';
const charge = {
  id,
  patientId: '0193f0aa-0000-7000-8000-000000000002',
  description: 'Strength and walking class',
  amountMinor: 2500,
  currency: 'USD',
  status: 'open',
  createdAt: '2026-12-01T12:00:00Z',
  appointment: null,
  paidAt: null,
  payment: 'pending',
  refund: null,
};

describe('PaymentPage', () => {
  let http: HttpTestingController;
  let fixture: ComponentFixture<unknown>;
  let page: HTMLElement;

  async function open(path: string): Promise<void> {
    TestBed.configureTestingModule({
      providers: [
        provideRouter(
          [{ path: 'payments/:chargeId', component: PaymentPage }],
          withComponentInputBinding(),
        ),
        provideHttpClient(withInterceptors([problemInterceptor])),
        provideHttpClientTesting(),
      ],
    });
    http = TestBed.inject(HttpTestingController);
    const harness = await RouterTestingHarness.create(path);
    fixture = harness.fixture;
    page = harness.fixture.nativeElement as HTMLElement;
  }

  async function answer(status: string): Promise<void> {
    await vi.waitFor(() => http.expectOne(`/api/charges/${id}`).flush({ ...charge, status }), {
      timeout: 4000,
    });
    fixture.detectChanges();
  }

  it('says received only when the server knows that it was', async () => {
    await open(`/payments/${id}?paid=yes`);
    await answer('open');
    expect(page.textContent).toContain('Your payment is pending');
    expect(page.textContent).not.toContain('received');
    expect(page.querySelector('button')).toBeNull();
    await answer('paid');
    expect(page.textContent).toContain('Payment received');
  });

  it('says that nothing was paid to one who turned back, and offers to pay', async () => {
    await open(`/payments/${id}`);
    await answer('open');
    expect(page.textContent).toContain('Nothing was paid');
    expect(page.querySelector('button')?.textContent).toContain('Pay $25.00');
  });

  it('tells of a class that was cancelled meanwhile', async () => {
    await open(`/payments/${id}?paid=yes`);
    await answer('void');
    expect(page.textContent).toContain('the money goes back to your card');
  });
});

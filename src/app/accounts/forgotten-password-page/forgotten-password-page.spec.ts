import { TestbedHarnessEnvironment } from '@angular/cdk/testing/testbed';
import { provideHttpClient, withInterceptors } from '@angular/common/http';
import { HttpTestingController, provideHttpClientTesting } from '@angular/common/http/testing';
import { TestBed } from '@angular/core/testing';
import { MatButtonHarness } from '@angular/material/button/testing';
import { MatInputHarness } from '@angular/material/input/testing';
import { provideRouter } from '@angular/router';
import { problemInterceptor } from '../../core/problem-interceptor';
import { ForgottenPasswordPage } from './forgotten-password-page';

describe('ForgottenPasswordPage', () => {
  it('says the same whether or not the address has an account', async () => {
    TestBed.configureTestingModule({
      providers: [
        provideRouter([]),
        provideHttpClient(withInterceptors([problemInterceptor])),
        provideHttpClientTesting(),
      ],
    });
    const fixture = TestBed.createComponent(ForgottenPasswordPage);
    const loader = TestbedHarnessEnvironment.loader(fixture);
    await (await loader.getHarness(MatInputHarness)).setValue('someone@harborlane.example');
    await (await loader.getHarness(MatButtonHarness)).click();
    const request = TestBed.inject(HttpTestingController).expectOne('/api/auth/forgotten-password');
    expect(request.request.body).toEqual({ email: 'someone@harborlane.example' });
    request.flush(null, { status: 204, statusText: 'No Content' });
    await vi.waitFor(() => {
      const status = (fixture.nativeElement as HTMLElement).querySelector('[role=status]');
      expect(status?.textContent).toContain('If someone@harborlane.example has an account');
    });
  });
});

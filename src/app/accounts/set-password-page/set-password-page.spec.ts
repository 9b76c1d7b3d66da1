import { TestbedHarnessEnvironment } from '@angular/cdk/testing/testbed';
import { provideHttpClient, withInterceptors } from '@angular/common/http';
import { HttpTestingController, provideHttpClientTesting } from '@angular/common/http/testing';
import { TestBed } from '@angular/core/testing';
import { MatButtonHarness } from '@angular/material/button/testing';
import { MatFormFieldHarness } from '@angular/material/form-field/testing';
import { MatInputHarness } from '@angular/material/input/testing';
import { Router, provideRouter } from '@angular/router';
import { RouterTestingHarness } from '@angular/router/testing';
import { problemInterceptor } from '../../core/problem-interceptor';
import { SetPasswordPage } from './set-password-page';

const password = 'four plain words here';

describe('SetPasswordPage', () => {
  async function open(url: string) {
    TestBed.configureTestingModule({
      providers: [
        provideRouter([{ path: 'set-password', component: SetPasswordPage }]),
        provideHttpClient(withInterceptors([problemInterceptor])),
        provideHttpClientTesting(),
      ],
    });
    const { fixture } = await RouterTestingHarness.create(url);
    await fixture.whenStable();
    const loader = TestbedHarnessEnvironment.loader(fixture);
    return {
      loader,
      server: TestBed.inject(HttpTestingController),
      text: () => (fixture.nativeElement as HTMLElement).textContent.replace(/\s+/g, ' '),
      save: async (value: string) => {
        await (await loader.getHarness(MatInputHarness)).setValue(value);
        await (await loader.getHarness(MatButtonHarness)).click();
      },
    };
  }

  it('takes the token out of the address and sends it with the password', async () => {
    const page = await open('/set-password#token=abc');
    expect(TestBed.inject(Router).url).toBe('/set-password');
    await page.save(password);
    const request = page.server.expectOne('/api/auth/password');
    expect(request.request.body).toEqual({ token: 'abc', password });
    request.flush(null, { status: 204, statusText: 'No Content' });
    await vi.waitFor(() => {
      expect(page.text()).toContain('Your new password is set.');
    });
  });

  it('asks for the whole link when the token is missing', async () => {
    const page = await open('/set-password');
    expect(page.text()).toContain('lacks the key');
  });

  it('refuses a short password before sending, and shows the server’s reason beside the field', async () => {
    const page = await open('/set-password#token=abc');
    await page.save('short');
    const field = await page.loader.getHarness(MatFormFieldHarness);
    expect(await field.getTextErrors()).toEqual(['Use at least 15 characters']);
    await page.save(password);
    const message = 'This password is on a list of stolen ones. Choose another.';
    page.server.expectOne('/api/auth/password').flush(
      {
        type: '/problems/invalid-request',
        title: 'Some fields need a correction.',
        status: 422,
        code: 'invalid-request',
        id: 'abc',
        errors: [{ path: 'password', code: 'common', message }],
      },
      { status: 422, statusText: 'Unprocessable' },
    );
    await vi.waitFor(async () => {
      expect(await field.getTextErrors()).toEqual([message]);
    });
  });
});

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
import { FirstAdministratorPage } from './first-administrator-page';

const person = {
  displayName: 'Nora Castellan',
  email: 'nora@clinic.example',
  password: 'four plain words here',
};

describe('FirstAdministratorPage', () => {
  async function open(url: string) {
    TestBed.configureTestingModule({
      providers: [
        provideRouter([{ path: 'first-administrator', component: FirstAdministratorPage }]),
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
      save: async (given: Partial<typeof person>) => {
        const inputs = await loader.getAllHarnesses(MatInputHarness);
        const values = [given.displayName, given.email, given.password];
        for (const [index, input] of inputs.entries()) await input.setValue(values[index] ?? '');
        await (await loader.getHarness(MatButtonHarness)).click();
      },
    };
  }

  it('takes the token out of the address and sends it with the person', async () => {
    const page = await open('/first-administrator#token=abc');
    expect(TestBed.inject(Router).url).toBe('/first-administrator');
    await page.save(person);
    const request = page.server.expectOne('/api/auth/first-administrator');
    expect(request.request.body).toEqual({ token: 'abc', ...person });
    request.flush(null, { status: 204, statusText: 'No Content' });
    await vi.waitFor(() => {
      expect(page.text()).toContain('The account is made.');
    });
  });

  it('asks for the whole link when the token is missing', async () => {
    expect((await open('/first-administrator')).text()).toContain('lacks its key');
  });

  it('says at each field what it lacks, and sends nothing', async () => {
    const page = await open('/first-administrator#token=abc');
    await page.save({ email: 'nobody', password: 'short' });
    const fields = await page.loader.getAllHarnesses(MatFormFieldHarness);
    const errors = await Promise.all(fields.map((field) => field.getTextErrors()));
    expect(errors).toEqual([
      ['Enter a name'],
      ['Enter an e-mail address like name@clinic.example'],
      ['Use at least 15 characters'],
    ]);
    page.server.expectNone('/api/auth/first-administrator');
  });
});

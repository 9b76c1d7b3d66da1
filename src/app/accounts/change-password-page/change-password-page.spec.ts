import { TestbedHarnessEnvironment } from '@angular/cdk/testing/testbed';
import { provideHttpClient, withInterceptors } from '@angular/common/http';
import { HttpTestingController, provideHttpClientTesting } from '@angular/common/http/testing';
import { TestBed } from '@angular/core/testing';
import { MatButtonHarness } from '@angular/material/button/testing';
import { MatFormFieldHarness } from '@angular/material/form-field/testing';
import { MatInputHarness } from '@angular/material/input/testing';
import { provideRouter } from '@angular/router';
import { problemInterceptor } from '../../core/problem-interceptor';
import { ChangePasswordPage } from './change-password-page';

const url = '/api/auth/change-password';
const fresh = 'four plain words here';

describe('ChangePasswordPage', () => {
  async function open() {
    TestBed.configureTestingModule({
      providers: [
        provideRouter([]),
        provideHttpClient(withInterceptors([problemInterceptor])),
        provideHttpClientTesting(),
      ],
    });
    const fixture = TestBed.createComponent(ChangePasswordPage);
    await fixture.whenStable();
    const loader = TestbedHarnessEnvironment.loader(fixture);
    return {
      server: TestBed.inject(HttpTestingController),
      text: () => (fixture.nativeElement as HTMLElement).textContent.replace(/\s+/g, ' '),
      errors: async () => {
        const fields = await loader.getAllHarnesses(MatFormFieldHarness);
        return Promise.all(fields.map((field) => field.getTextErrors()));
      },
      save: async (...values: string[]) => {
        const inputs = await loader.getAllHarnesses(MatInputHarness);
        for (const [index, input] of inputs.entries()) await input.setValue(values[index] ?? '');
        await (await loader.getHarness(MatButtonHarness)).click();
      },
    };
  }

  it('changes it and says that other sessions ended', async () => {
    const page = await open();
    await page.save('the old one', fresh);
    const call = page.server.expectOne(url);
    expect(call.request.body).toEqual({ currentPassword: 'the old one', newPassword: fresh });
    call.flush(null, { status: 204, statusText: 'No Content' });
    await vi.waitFor(() => {
      expect(page.text()).toContain('signed out everywhere else');
    });
  });

  it('says beside the field that the current one is wrong', async () => {
    const page = await open();
    await page.save('not the old one', fresh);
    const title = 'Your current password is wrong.';
    page.server
      .expectOne(url)
      .flush(
        { type: '/problems/wrong-password', title, code: 'wrong-password', id: 'r', errors: [] },
        { status: 403, statusText: 'Forbidden' },
      );
    await vi.waitFor(async () => {
      expect(await page.errors()).toEqual([[title], []]);
    });
  });

  it('sends nothing while a field lacks something', async () => {
    const page = await open();
    await page.save('', 'short');
    expect(await page.errors()).toEqual([
      ['Enter your current password'],
      ['Use at least 15 characters'],
    ]);
    page.server.expectNone(url);
  });
});

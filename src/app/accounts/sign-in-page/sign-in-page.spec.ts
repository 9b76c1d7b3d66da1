import type { HarnessLoader } from '@angular/cdk/testing';
import { TestbedHarnessEnvironment } from '@angular/cdk/testing/testbed';
import { provideHttpClient, withInterceptors } from '@angular/common/http';
import { HttpTestingController, provideHttpClientTesting } from '@angular/common/http/testing';
import { type ComponentFixture, TestBed } from '@angular/core/testing';
import { MatButtonHarness } from '@angular/material/button/testing';
import { MatFormFieldHarness } from '@angular/material/form-field/testing';
import { MatInputHarness } from '@angular/material/input/testing';
import { Router, provideRouter } from '@angular/router';
import { problemInterceptor } from '../../core/problem-interceptor';
import { Session } from '../../core/session';
import { SignInPage } from './sign-in-page';

const account = {
  label: 'Nurse',
  email: 'nurse@harborlane.example',
  password: 'three plain words',
};
const user = {
  id: '019ae2f0-7e55-7000-8000-000000000001',
  displayName: 'N',
  email: account.email,
  roles: ['nurse'],
  patientId: null,
};

describe('SignInPage', () => {
  let fixture: ComponentFixture<SignInPage>;
  let loader: HarnessLoader;
  let server: HttpTestingController;

  beforeEach(async () => {
    TestBed.configureTestingModule({
      providers: [
        provideRouter([{ path: '**', children: [] }]),
        provideHttpClient(withInterceptors([problemInterceptor])),
        provideHttpClientTesting(),
      ],
    });
    server = TestBed.inject(HttpTestingController);
    const loaded = TestBed.inject(Session).load();
    answerSession({ user: null, demo: true, demoAccounts: [account] });
    await loaded;
    fixture = TestBed.createComponent(SignInPage);
    loader = TestbedHarnessEnvironment.loader(fixture);
  });

  afterEach(() => {
    server.verify();
  });

  function answerSession(body: object): void {
    server.expectOne('/api/auth/session').flush(body);
  }

  async function fill(email: string, password: string): Promise<void> {
    const [first, second] = await loader.getAllHarnesses(MatInputHarness);
    await first?.setValue(email);
    await second?.setValue(password);
    await press('Sign in');
  }

  async function press(text: string): Promise<void> {
    await (await loader.getHarness(MatButtonHarness.with({ text }))).click();
  }

  function alertText(): string {
    const alert = (fixture.nativeElement as HTMLElement).querySelector('[role=alert]');
    return alert?.textContent.replace(/\s+/g, ' ').trim() ?? '';
  }

  function refuse(code: string, status: number, title: string, headers = {}): void {
    const body = { type: `/problems/${code}`, title, status, code, id: 'abc', errors: [] };
    server.expectOne('/api/auth/sign-in').flush(body, { status, statusText: 'No', headers });
  }

  it('sends nothing before both fields are there, and says what is missing', async () => {
    await fill('nurse', '');
    const fields = await loader.getAllHarnesses(MatFormFieldHarness);
    const errors = await Promise.all(fields.map((field) => field.getTextErrors()));
    expect(errors.flat()).toEqual([
      'Enter an e-mail address like name@clinic.example',
      'Enter your password',
    ]);
    server.expectNone('/api/auth/sign-in');
  });

  it('lets password managers fill it in', async () => {
    const inputs = await loader.getAllHarnesses(MatInputHarness);
    const hints = await Promise.all(
      inputs.map(async (input) => (await input.host()).getAttribute('autocomplete')),
    );
    expect(hints).toEqual(['username', 'current-password']);
  });

  it('goes to the page that was wanted', async () => {
    fixture.componentRef.setInput('return', '/patients?tab=1');
    await fill(account.email, account.password);
    const request = server.expectOne('/api/auth/sign-in');
    expect(request.request.body).toEqual({ email: account.email, password: account.password });
    request.flush({ user });
    await vi.waitFor(() => answerSession({ user, demo: true, demoAccounts: [] }));
    await vi.waitFor(() => {
      expect(TestBed.inject(Router).url).toBe('/patients?tab=1');
    });
  });

  it('never goes to another host', async () => {
    fixture.componentRef.setInput('return', '//elsewhere.example');
    await fill(account.email, account.password);
    server.expectOne('/api/auth/sign-in').flush({ user });
    await vi.waitFor(() => answerSession({ user, demo: true, demoAccounts: [] }));
    await vi.waitFor(() => {
      expect(TestBed.inject(Session).user()).not.toBeNull();
    });
    await fixture.whenStable();
    expect(TestBed.inject(Router).url).toBe('/');
  });

  it('tells a refusal in one place, without a hint which was wrong', async () => {
    await fill(account.email, 'not this one');
    refuse('wrong-credentials', 401, 'E-mail or password is wrong.');
    await vi.waitFor(() => {
      expect(alertText()).toContain('E-mail or password is wrong.');
    });
    const fields = await loader.getAllHarnesses(MatFormFieldHarness);
    expect(await Promise.all(fields.map((field) => field.hasErrors()))).toEqual([false, false]);
  });

  it('says for how long it is throttled', async () => {
    await fill(account.email, 'not this one');
    refuse('too-many-requests', 429, 'Too many tries.', { 'Retry-After': '30' });
    await vi.waitFor(() => {
      expect(alertText()).toContain('Try again in 30 seconds.');
    });
  });

  it('says so when the browser keeps no cookie', async () => {
    await fill(account.email, account.password);
    server.expectOne('/api/auth/sign-in').flush({ user });
    await vi.waitFor(() => answerSession({ user: null, demo: true, demoAccounts: [] }));
    await vi.waitFor(() => {
      expect(alertText()).toContain('Allow cookies');
    });
  });

  it('signs in with a demonstration account at a press', async () => {
    await press('Use');
    const request = server.expectOne('/api/auth/sign-in');
    expect(request.request.body).toEqual({ email: account.email, password: account.password });
    request.flush({ user });
    await vi.waitFor(() => answerSession({ user, demo: true, demoAccounts: [account] }));
  });
});

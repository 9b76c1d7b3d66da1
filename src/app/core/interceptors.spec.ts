import { HttpClient, provideHttpClient, withInterceptors } from '@angular/common/http';
import {
  HttpTestingController,
  type TestRequest,
  provideHttpClientTesting,
} from '@angular/common/http/testing';
import { TestBed } from '@angular/core/testing';
import { Router, provideRouter } from '@angular/router';
import type { ErrorCode, ProblemDocument } from '@shared/errors';
import { errorStatus } from '@shared/errors';
import { firstValueFrom } from 'rxjs';
import { csrfInterceptor } from './csrf-interceptor';
import { Problem } from './problem';
import { problemInterceptor } from './problem-interceptor';
import { Session } from './session';
import { signedOutInterceptor } from './signed-out-interceptor';

function refuse(request: TestRequest, code: ErrorCode, more: Partial<ProblemDocument> = {}): void {
  const status = errorStatus[code];
  const body = { type: `/problems/${code}`, title: 'No', status, code, id: 'abc', errors: [] };
  request.flush(
    { ...body, ...more },
    { status, statusText: 'Refused', headers: { 'Retry-After': '30' } },
  );
}

function setToken(token: string): void {
  document.cookie = `XSRF-TOKEN=${token}`;
}

const signedIn = {
  user: {
    id: '019ae2f0-7e55-7000-8000-000000000001',
    displayName: 'N',
    email: 'n@harborlane.example',
    roles: ['nurse'],
    patientId: null,
  },
  demo: false,
  demoAccounts: [],
};

describe('the interceptors', () => {
  let http: HttpClient;
  let server: HttpTestingController;

  beforeEach(() => {
    setToken('first');
    TestBed.configureTestingModule({
      providers: [
        provideRouter([{ path: '**', children: [] }]),
        provideHttpClient(
          withInterceptors([signedOutInterceptor, csrfInterceptor, problemInterceptor]),
        ),
        provideHttpClientTesting(),
      ],
    });
    http = TestBed.inject(HttpClient);
    server = TestBed.inject(HttpTestingController);
  });

  afterEach(() => {
    server.verify();
  });

  async function failureOf(call: Promise<unknown>): Promise<Problem> {
    const error: unknown = await call.then(
      () => null,
      (reason: unknown) => reason,
    );
    if (!(error instanceof Problem)) throw new Error('The call should have failed with a Problem');
    return error;
  }

  it('turn a problem document into a Problem', async () => {
    const call = firstValueFrom(http.post('/api/things', {}));
    refuse(server.expectOne('/api/things'), 'too-many-requests');
    const problem = await failureOf(call);
    expect(problem).toMatchObject({ code: 'too-many-requests', status: 429, id: 'abc' });
    expect(problem.retryAfter).toBe(30);
  });

  it('say what to do when no answer or an unreadable one comes', async () => {
    const lost = firstValueFrom(http.get('/api/things'));
    server.expectOne('/api/things').error(new ProgressEvent('error'));
    expect((await failureOf(lost)).code).toBe('unreachable');

    const garbled = firstValueFrom(http.get('/api/things'));
    server
      .expectOne('/api/things')
      .flush('<html>Bad gateway</html>', { status: 502, statusText: 'Bad Gateway' });
    expect((await failureOf(garbled)).code).toBe('unreadable-answer');
  });

  it('send a write once more with a fresh token', async () => {
    const call = firstValueFrom(http.post('/api/things', { a: 1 }));
    refuse(server.expectOne('/api/things'), 'csrf');
    setToken('second');
    server.expectOne('/api/auth/session').flush(signedIn);
    const again = server.expectOne('/api/things');
    expect(again.request.headers.get('X-XSRF-TOKEN')).toBe('second');
    expect(again.request.body).toEqual({ a: 1 });
    again.flush({ done: true });
    expect(await call).toEqual({ done: true });
  });

  it('give up when the fresh token is refused too', async () => {
    const call = firstValueFrom(http.post('/api/things', {}));
    refuse(server.expectOne('/api/things'), 'csrf');
    server.expectOne('/api/auth/session').flush(signedIn);
    refuse(server.expectOne('/api/things'), 'csrf');
    expect((await failureOf(call)).code).toBe('csrf');
  });

  it('lead to the sign-in page when the session has ended, and keep the way back', async () => {
    const session = TestBed.inject(Session);
    const router = TestBed.inject(Router);
    await router.navigateByUrl('/floor?class=1');
    const loaded = session.load();
    server.expectOne('/api/auth/session').flush(signedIn);
    await loaded;

    const call = firstValueFrom(http.get('/api/things'));
    refuse(server.expectOne('/api/things'), 'unauthenticated');
    await failureOf(call);
    expect(session.user()).toBeNull();
    await vi.waitFor(() => {
      expect(router.url).toBe('/sign-in?return=%2Ffloor%3Fclass%3D1&ended=true');
    });
  });

  it('leave a wrong password to the sign-in page', async () => {
    const call = firstValueFrom(http.post('/api/auth/sign-in', {}));
    refuse(server.expectOne('/api/auth/sign-in'), 'wrong-credentials');
    expect((await failureOf(call)).code).toBe('wrong-credentials');
    expect(TestBed.inject(Router).url).toBe('/');
  });
});

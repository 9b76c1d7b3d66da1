import { ChangeDetectionStrategy, Component } from '@angular/core';
import { TestBed } from '@angular/core/testing';
import { provideHttpClient } from '@angular/common/http';
import { HttpTestingController, provideHttpClientTesting } from '@angular/common/http/testing';
import { Router, provideRouter } from '@angular/router';
import { RouterTestingHarness } from '@angular/router/testing';
import type { Role } from '@shared/contracts/accounts-contract';
import { allow, landing, signedOut } from './access-guard';
import { Session } from './session';

@Component({ template: '', changeDetection: ChangeDetectionStrategy.OnPush })
class Page {}

async function open(url: string, roles: Role[] | null): Promise<Router> {
  TestBed.configureTestingModule({
    providers: [
      provideHttpClient(),
      provideHttpClientTesting(),
      provideRouter([
        { path: '', pathMatch: 'full', redirectTo: landing },
        { path: 'sign-in', canMatch: [signedOut], component: Page },
        { path: 'floor', canMatch: [allow({ roles: ['nurse'] })], component: Page },
        { path: 'reports', canMatch: [allow({ roles: ['director'] })], component: Page },
        { path: 'not-allowed', title: 'Not allowed', component: Page },
      ]),
    ],
  });
  const loaded = TestBed.inject(Session).load();
  const id = '019ae2f0-7e55-7000-8000-000000000001';
  const person = { id, displayName: 'N', email: 'n@harborlane.example', patientId: null };
  TestBed.inject(HttpTestingController)
    .expectOne('/api/auth/session')
    .flush({ user: roles && { ...person, roles }, demo: false, demoAccounts: [] });
  await loaded;
  await RouterTestingHarness.create(url);
  return TestBed.inject(Router);
}

describe('access', () => {
  it('asks a visitor to sign in and keeps the page they wanted', async () => {
    const router = await open('/floor?class=1', null);
    expect(router.url).toBe('/sign-in?return=%2Ffloor%3Fclass%3D1');
  });

  it('lets in who has the role', async () => {
    expect((await open('/floor', ['nurse'])).url).toBe('/floor');
  });

  it('shows who lacks it that the page is not theirs', async () => {
    const router = await open('/reports', ['nurse']);
    expect(router.routerState.snapshot.root.firstChild?.title).toBe('Not allowed');
  });

  it('leads from the root and from the sign-in page to the first task', async () => {
    const router = await open('/', ['nurse']);
    expect(router.url).toBe('/floor');
    await router.navigateByUrl('/sign-in');
    expect(router.url).toBe('/floor');
  });

  it('leads a visitor from the root to the sign-in page', async () => {
    expect((await open('/', null)).url).toBe('/sign-in');
  });
});

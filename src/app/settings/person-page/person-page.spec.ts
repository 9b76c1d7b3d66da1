import { TestbedHarnessEnvironment } from '@angular/cdk/testing/testbed';
import { provideHttpClient, withInterceptors } from '@angular/common/http';
import { HttpTestingController, provideHttpClientTesting } from '@angular/common/http/testing';
import { TestBed } from '@angular/core/testing';
import { MatButtonHarness } from '@angular/material/button/testing';
import { provideRouter, withComponentInputBinding } from '@angular/router';
import { RouterTestingHarness } from '@angular/router/testing';
import type { User } from '@shared/contracts/accounts-contract';
import { Notices } from '../../core/notices';
import { problemInterceptor } from '../../core/problem-interceptor';
import { PersonPage } from './person-page';

const id = '01940000-0000-4000-8000-000000000001';
const site = { id: '01940000-0000-4000-8000-00000000000a', name: 'Quayside', timeZone: 'UTC' };
const vera: User = {
  id,
  email: 'vera@clinic.example',
  displayName: 'Vera Lindqvist',
  status: 'active',
  roles: ['nurse'],
  siteIds: [site.id],
  medicalDirector: false,
  student: false,
};

describe('PersonPage', () => {
  async function open(user: User) {
    const notices = { say: vi.fn(), offerUndo: vi.fn<Notices['offerUndo']>() };
    TestBed.configureTestingModule({
      providers: [
        provideRouter([{ path: 'people/:id', component: PersonPage }], withComponentInputBinding()),
        provideHttpClient(withInterceptors([problemInterceptor])),
        provideHttpClientTesting(),
        { provide: Notices, useValue: notices },
      ],
    });
    const { fixture } = await RouterTestingHarness.create(`/people/${id}`);
    const server = TestBed.inject(HttpTestingController);
    server.expectOne(`/api/users/${id}`).flush(user);
    server.expectOne('/api/sites').flush({ items: [site] });
    await fixture.whenStable();
    const element = fixture.nativeElement as HTMLElement;
    const press = async (text: string) =>
      (
        await TestbedHarnessEnvironment.loader(fixture).getHarness(MatButtonHarness.with({ text }))
      ).click();
    const box = (words: string) =>
      [...element.querySelectorAll('label')]
        .find((label) => label.textContent.includes(words))
        ?.querySelector('input');
    const text = () => element.textContent.replace(/\s+/g, ' ');
    return { server, press, box, text, notices };
  }

  it('saves what was changed alone', async () => {
    const page = await open(vera);
    page.box('Physician')?.click();
    page.box('Nurse')?.click();
    await page.press('Save');
    const call = page.server.expectOne(`/api/users/${id}`);
    expect(call.request.method).toBe('PATCH');
    expect(call.request.body).toEqual({ roles: ['physician'] });
    call.flush({ ...vera, roles: ['physician'] });
    await vi.waitFor(() => {
      expect(page.notices.say).toHaveBeenCalledOnce();
    });
  });

  it('asks for a role beside the roles, and sends nothing', async () => {
    const page = await open(vera);
    page.box('Nurse')?.click();
    await page.press('Save');
    page.server.expectNone(`/api/users/${id}`);
    expect(page.text()).toContain('Choose at least one role');
  });

  it('disables at once and undoes it', async () => {
    const page = await open(vera);
    await page.press('Disable the account');
    const off = page.server.expectOne(`/api/users/${id}`);
    expect(off.request.body).toEqual({ disabled: true });
    off.flush({ ...vera, status: 'disabled' });
    await vi.waitFor(() => {
      expect(page.text()).toContain('Nobody can sign in to this account');
    });
    page.notices.offerUndo.mock.calls[0]?.[1]();
    const on = page.server.expectOne(`/api/users/${id}`);
    expect(on.request.body).toEqual({ disabled: false });
    on.flush(vera);
    await vi.waitFor(() => {
      expect(page.text()).toContain('Sign out everywhere');
    });
  });

  it('tells what the server says of the last administrator, and keeps what was typed', async () => {
    const page = await open(vera);
    page.box('Student')?.click();
    await page.press('Disable the account');
    const title = 'This is the only administrator. Make another one first.';
    page.server.expectOne(`/api/users/${id}`).flush(
      {
        type: '/problems/illegal-transition',
        title,
        code: 'illegal-transition',
        id: 'r',
        errors: [],
      },
      { status: 409, statusText: 'Conflict' },
    );
    await vi.waitFor(() => {
      expect(page.text()).toContain(title);
    });
    expect(page.box('Student')?.checked).toBe(true);
  });

  it('offers the invitation again to who has not accepted it', async () => {
    const page = await open({ ...vera, status: 'invited' });
    await page.press('Send the invitation again');
    page.server.expectOne({ method: 'POST', url: `/api/users/${id}/invitation` }).flush(null);
  });
});

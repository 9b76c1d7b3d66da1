import { ChangeDetectionStrategy, Component } from '@angular/core';
import { provideHttpClient, withInterceptors } from '@angular/common/http';
import { HttpTestingController, provideHttpClientTesting } from '@angular/common/http/testing';
import { type ComponentFixture, TestBed } from '@angular/core/testing';
import { Router, provideRouter } from '@angular/router';
import type { Role } from '@shared/contracts/accounts-contract';
import { App } from './app';
import { problemInterceptor } from './core/problem-interceptor';
import { Session } from './core/session';
import { PageHeader } from './ui/page-header/page-header';

@Component({
  imports: [PageHeader],
  template: '<app-page-header heading="Roster" />',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
class Page {}

function sessionOf(roles: Role[] | null) {
  const id = '019ae2f0-7e55-7000-8000-000000000001';
  const person = { id, displayName: 'P. Halloran', email: 'n@harborlane.example', patientId: null };
  return { user: roles && { ...person, roles }, demo: true, demoAccounts: [] };
}

describe('App', () => {
  let fixture: ComponentFixture<App>;
  let page: HTMLElement;
  let server: HttpTestingController;
  let router: Router;

  async function start(roles: Role[] | null): Promise<void> {
    TestBed.configureTestingModule({
      providers: [
        provideHttpClient(withInterceptors([problemInterceptor])),
        provideHttpClientTesting(),
        provideRouter(
          ['floor', 'schedule', 'billing', 'my/range', 'sign-in'].map((path) => ({
            path,
            component: Page,
          })),
        ),
      ],
    });
    server = TestBed.inject(HttpTestingController);
    router = TestBed.inject(Router);
    const loaded = TestBed.inject(Session).load();
    server.expectOne('/api/auth/session').flush(sessionOf(roles));
    await loaded;
    fixture = TestBed.createComponent(App);
    page = fixture.nativeElement as HTMLElement;
    document.body.append(page);
    await open('/floor');
  }

  async function open(url: string): Promise<void> {
    await router.navigateByUrl(url);
    await fixture.whenStable();
  }

  function button(text: string): HTMLButtonElement {
    const buttons = [...page.querySelectorAll('button')];
    const found = buttons.find((one) => one.textContent.includes(text));
    if (found === undefined) throw new Error(`There is no button ${text}`);
    return found;
  }

  afterEach(() => {
    page.remove();
  });

  it('shows the areas of the role that have a page, and marks the open one', async () => {
    await start(['nurse']);
    const links = [...page.querySelectorAll('nav a')];
    expect(links.map((link) => link.querySelector('span')?.textContent)).toEqual([
      'Schedule',
      'Floor',
    ]);
    expect(page.querySelector('nav [aria-current=page]')?.getAttribute('href')).toBe('/floor');
  });

  it('shows a visitor no rail, and everyone that this is a demonstration', async () => {
    await start(null);
    expect(page.querySelector('nav')).toBeNull();
    expect(page.querySelector('aside')?.textContent).toContain('invented people');
  });

  it('moves the focus to the heading of the next page, and at the skip link', async () => {
    await start(['nurse']);
    await open('/schedule');
    expect(document.activeElement?.tagName).toBe('H1');
    page.querySelector<HTMLAnchorElement>('.skip')?.focus();
    page.querySelector<HTMLAnchorElement>('.skip')?.click();
    expect(document.activeElement?.textContent).toBe('Roster');
  });

  it('leaves the focus alone when only the query changes', async () => {
    await start(['nurse']);
    const link = page.querySelector<HTMLAnchorElement>('nav a');
    link?.focus();
    await open('/floor?class=2');
    expect(document.activeElement).toBe(link);
  });

  it('sets patient pages larger', async () => {
    await start(['patient']);
    expect(page.querySelector('.patient')).toBeNull();
    await open('/my/range');
    expect(page.querySelector('.patient main')).not.toBeNull();
  });

  it('signs out from any page', async () => {
    await start(['nurse']);
    // jsdom has no popovers.
    page.querySelector<HTMLElement>('[popover]')!.hidePopover = () => undefined;
    button('Sign out').click();
    server.expectOne('/api/auth/sign-out').flush(null);
    await vi.waitFor(() => {
      expect(router.url).toBe('/sign-in');
    });
    await fixture.whenStable();
    expect(page.querySelector('nav')).toBeNull();
  });

  it('keeps the choice of colors on this device', async () => {
    await start(['nurse']);
    page.querySelector<HTMLInputElement>('input[value=dark]')?.click();
    await fixture.whenStable();
    expect(document.documentElement.classList).toContain('scheme-dark');
    expect(localStorage.getItem('plimsoll.scheme')).toBe('dark');
  });

  it('says so when it can’t start, and tries again', async () => {
    await start(['nurse']);
    const session = TestBed.inject(Session);
    const lost = session.load();
    server.expectOne('/api/auth/session').error(new ProgressEvent('error'));
    await lost;
    await fixture.whenStable();
    expect(page.querySelector('[role=alert]')?.textContent).toContain('can’t be reached');
    button('Try again').click();
    server.expectOne('/api/auth/session').flush(sessionOf(['nurse']));
    await vi.waitFor(() => {
      expect(page.querySelector('main h1')?.textContent).toBe('Roster');
    });
  });
});

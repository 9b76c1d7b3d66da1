import { Clipboard } from '@angular/cdk/clipboard';
import { provideHttpClient, withInterceptors } from '@angular/common/http';
import { HttpTestingController, provideHttpClientTesting } from '@angular/common/http/testing';
import { type ComponentFixture, TestBed } from '@angular/core/testing';
import { Notices } from '../../core/notices';
import { problemInterceptor } from '../../core/problem-interceptor';
import { CalendarLink } from './calendar-link';

const path = '/api/my/calendar-link';
const url = `https://plimsoll.example/api/calendar/${'k'.repeat(43)}.ics`;

describe('CalendarLink', () => {
  let fixture: ComponentFixture<CalendarLink>;
  let server: HttpTestingController;
  let copied: string[];
  let said: string[];

  const page = () => fixture.nativeElement as HTMLElement;
  const words = () => page().textContent.replace(/\s+/g, ' ');

  async function settle(): Promise<void> {
    await new Promise((resolve) => setTimeout(resolve));
    fixture.detectChanges();
  }

  async function press(text: string): Promise<void> {
    const buttons = [...page().querySelectorAll('button')];
    buttons.find((button) => button.textContent.trim() === text)?.click();
    await settle();
  }

  async function open(madeAt: string | null): Promise<void> {
    copied = [];
    said = [];
    TestBed.configureTestingModule({
      providers: [
        provideHttpClient(withInterceptors([problemInterceptor])),
        provideHttpClientTesting(),
        { provide: Clipboard, useValue: { copy: (text: string) => copied.push(text) > 0 } },
        { provide: Notices, useValue: { say: (text: string) => said.push(text) } },
      ],
    });
    server = TestBed.inject(HttpTestingController);
    fixture = TestBed.createComponent(CalendarLink);
    fixture.detectChanges();
    await settle();
    server.expectOne({ method: 'GET', url: path }).flush({ madeAt });
    await settle();
  }

  afterEach(() => {
    server.verify();
  });

  it('says who can read the calendar before there is a link', async () => {
    await open(null);
    expect(words()).toContain('anyone who has the link sees when and where you come');
    expect(words()).not.toContain('You made a link');
  });

  it('makes a link, shows it once and copies it', async () => {
    await open(null);
    await press('Make my link');
    server.expectOne({ method: 'POST', url: path }).flush({ url });
    await settle();
    server.expectOne({ method: 'GET', url: path }).flush({ madeAt: '2026-12-01T15:00:00.000Z' });
    await settle();
    expect(page().querySelector('input')?.value).toBe(url);
    expect(page().querySelector('a')?.getAttribute('href')).toBe(url.replace('https:', 'webcal:'));
    await press('Copy link');
    expect([copied, said]).toEqual([[url], ['Link copied.']]);
  });

  it('replaces a link only after saying that the old one stops working', async () => {
    await open('2026-11-03T15:00:00.000Z');
    expect(words()).toContain('You made a link on Nov 3, 2026.');
    await press('Make a new link');
    expect(words()).toContain('The old link stops working.');
    await press('Keep the old one');
    expect(words()).toContain('You made a link on Nov 3, 2026.');
    await press('Make a new link');
    await press('Yes, make a new link');
    server.expectOne({ method: 'POST', url: path }).flush({ url });
    await settle();
    server.expectOne({ method: 'GET', url: path }).flush({ madeAt: '2026-12-01T15:00:00.000Z' });
    await settle();
    expect(page().querySelector('input')?.value).toBe(url);
  });

  it('says when it could not be made, and keeps the former', async () => {
    await open('2026-11-03T15:00:00.000Z');
    await press('Make a new link');
    await press('Yes, make a new link');
    server
      .expectOne({ method: 'POST', url: path })
      .flush(null, { status: 0, statusText: 'Unknown Error' });
    await settle();
    expect(words()).toContain('can’t be reached');
    expect(page().querySelector('input')).toBeNull();
  });
});

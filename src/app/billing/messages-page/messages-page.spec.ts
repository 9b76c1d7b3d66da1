import { provideHttpClient } from '@angular/common/http';
import { HttpTestingController, provideHttpClientTesting } from '@angular/common/http/testing';
import { TestBed } from '@angular/core/testing';
import { provideRouter } from '@angular/router';
import { MessagesPage } from './messages-page';

describe('MessagesPage', () => {
  async function open(items: object[]): Promise<HTMLElement> {
    TestBed.configureTestingModule({
      providers: [provideRouter([]), provideHttpClient(), provideHttpClientTesting()],
    });
    const fixture = TestBed.createComponent(MessagesPage);
    TestBed.inject(HttpTestingController)
      .expectOne('/api/messages/undelivered')
      .flush({ items, nextCursor: null });
    await new Promise((resolve) => setTimeout(resolve));
    await fixture.whenStable();
    return fixture.nativeElement as HTMLElement;
  }

  it('tells whom to call and why', async () => {
    const page = await open([
      {
        id: '0193f0aa-0000-7000-8000-000000000001',
        kind: 'reminder',
        reason: 'no-address',
        dueAt: '2026-12-06T23:00:00Z',
        patientId: '0193f0aa-0000-7000-8000-000000000002',
        displayName: 'Ida Marlow',
        recordNumber: 'HL-1001',
        phone: '555-0123',
      },
    ]);
    const cells = [...page.querySelectorAll('tbody td')].map((cell) => cell.textContent?.trim());
    expect(cells.slice(0, 3)).toEqual([
      '555-0123',
      'Reminder',
      'The record holds no e-mail address.',
    ]);
  });

  it('says so when every message went out', async () => {
    expect((await open([])).textContent).toContain('Every message went out');
  });
});

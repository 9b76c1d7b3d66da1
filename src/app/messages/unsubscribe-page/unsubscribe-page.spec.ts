import { provideHttpClient, withInterceptors } from '@angular/common/http';
import { HttpTestingController, provideHttpClientTesting } from '@angular/common/http/testing';
import { TestBed } from '@angular/core/testing';
import { provideRouter } from '@angular/router';
import { problemInterceptor } from '../../core/problem-interceptor';
import { UnsubscribePage } from './unsubscribe-page';

const token = 'k'.repeat(43);

function open() {
  TestBed.configureTestingModule({
    providers: [
      provideRouter([]),
      provideHttpClient(withInterceptors([problemInterceptor])),
      provideHttpClientTesting(),
    ],
  });
  const fixture = TestBed.createComponent(UnsubscribePage);
  fixture.componentRef.setInput('token', token);
  fixture.detectChanges();
  const page = fixture.nativeElement as HTMLElement;
  const settle = async () => {
    await new Promise((resolve) => setTimeout(resolve));
    fixture.detectChanges();
  };
  return {
    server: TestBed.inject(HttpTestingController),
    settle,
    button: () => page.querySelector('button'),
    words: () => page.textContent.replace(/\s+/g, ' '),
  };
}

describe('UnsubscribePage', () => {
  it('asks first, and says what still comes', () => {
    const { server, words } = open();
    expect(words()).toContain('Do you want us to stop?');
    expect(words()).toContain('We still e-mail you when you book, cancel or pay.');
    server.verify();
  });

  it('stops reminders as a mail program does, and says how to have them back', async () => {
    const { server, settle, button, words } = open();
    button()?.click();
    const call = server.expectOne(`/api/unsubscribe/${token}`);
    expect(call.request.serializeBody()).toBe('List-Unsubscribe=One-Click');
    expect(call.request.detectContentTypeHeader()).toMatch(/^application\/x-www-form-urlencoded/);
    call.flush(null);
    await settle();
    expect(words()).toContain('We send you no more reminders by e-mail.');
    expect(button()).toBeNull();
  });

  it('leads on when the link is no longer known', async () => {
    const { server, settle, button, words } = open();
    button()?.click();
    const title = 'This link was used before or has expired. Ask for a new one.';
    const problem = { type: '', title, status: 410, code: 'link-expired', id: 'x', errors: [] };
    server
      .expectOne(`/api/unsubscribe/${token}`)
      .flush(problem, { status: 410, statusText: 'Gone' });
    await settle();
    expect(words()).toContain('You can turn reminders off under My details, or call us.');
    expect(button()).toBeNull();
  });
});

import { provideHttpClient, withInterceptors } from '@angular/common/http';
import { HttpTestingController, provideHttpClientTesting } from '@angular/common/http/testing';
import { type ComponentFixture, TestBed } from '@angular/core/testing';
import { provideRouter } from '@angular/router';
import { problemInterceptor } from '../../core/problem-interceptor';
import { FollowUpsSection } from './follow-ups-section';

const waiting = {
  id: '019ae2f0-7e55-7000-8000-000000000301',
  patient: {
    id: '019ae2f0-7e55-7000-8000-000000000100',
    displayName: 'Otto Lindqvist',
    recordNumber: 'HL-1042',
    phone: '555-0142',
    site: { name: 'Quayside', timeZone: 'America/New_York' },
  },
  answeredOn: '2026-12-01',
  answer: 1,
  recordedAt: '2026-12-01T15:00:00.000Z',
  recordedBy: 'Ines Calder',
};

describe('FollowUpsSection', () => {
  let fixture: ComponentFixture<FollowUpsSection>;
  let server: HttpTestingController;

  beforeEach(() => {
    TestBed.configureTestingModule({
      providers: [
        provideRouter([]),
        provideHttpClient(withInterceptors([problemInterceptor])),
        provideHttpClientTesting(),
      ],
    });
    server = TestBed.inject(HttpTestingController);
    fixture = TestBed.createComponent(FollowUpsSection);
  });
  const text = () => (fixture.nativeElement as HTMLElement).textContent.replace(/\s+/g, ' ');

  async function answer(items: object[]): Promise<void> {
    fixture.detectChanges();
    (await vi.waitFor(() => server.expectOne('/api/follow-ups'))).flush({ items });
    await fixture.whenStable();
  }

  it('names who is to be spoken with, by whom it was entered, and where to write what was done', async () => {
    await answer([waiting]);
    expect(text()).toContain('Speak with them today');
    expect(text()).toContain('Otto Lindqvist');
    expect(text()).toContain('555-0142');
    const link = (fixture.nativeElement as HTMLElement).querySelector('[aria-label^="Write"]');
    expect(link?.getAttribute('href')).toBe(`/patients/${waiting.patient.id}/questionnaires`);
  });

  it('takes no place while nobody waits', async () => {
    await answer([]);
    expect(text().trim()).toBe('');
  });
});

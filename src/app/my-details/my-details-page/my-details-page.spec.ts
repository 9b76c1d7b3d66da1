import { TestbedHarnessEnvironment } from '@angular/cdk/testing/testbed';
import { provideHttpClient, withInterceptors } from '@angular/common/http';
import { HttpTestingController, provideHttpClientTesting } from '@angular/common/http/testing';
import { type ComponentFixture, TestBed } from '@angular/core/testing';
import { MatCheckboxHarness } from '@angular/material/checkbox/testing';
import { provideRouter } from '@angular/router';
import { Notices } from '../../core/notices';
import { problemInterceptor } from '../../core/problem-interceptor';
import { Session } from '../../core/session';
import { MyDetailsPage } from './my-details-page';

const patientId = '019ae2f0-7e55-7000-8000-000000000001';
const path = '/api/my/message-preferences';

describe('MyDetailsPage', () => {
  let fixture: ComponentFixture<MyDetailsPage>;
  let server: HttpTestingController;
  let said: string[];

  const words = () => (fixture.nativeElement as HTMLElement).textContent.replace(/\s+/g, ' ');
  const box = () => TestbedHarnessEnvironment.loader(fixture).getHarness(MatCheckboxHarness);

  async function settle(): Promise<void> {
    await new Promise((resolve) => setTimeout(resolve));
    fixture.detectChanges();
  }

  beforeEach(async () => {
    said = [];
    TestBed.configureTestingModule({
      providers: [
        provideRouter([]),
        provideHttpClient(withInterceptors([problemInterceptor])),
        provideHttpClientTesting(),
        { provide: Session, useValue: { user: () => ({ patientId }) } },
        { provide: Notices, useValue: { say: (text: string) => said.push(text) } },
      ],
    });
    server = TestBed.inject(HttpTestingController);
    fixture = TestBed.createComponent(MyDetailsPage);
    fixture.detectChanges();
    await settle();
    server.expectOne(`/api/patients/${patientId}`).flush({
      id: patientId,
      displayName: 'Given Family',
      familyName: 'Family',
      givenName: 'Given',
      recordNumber: 'HL-1',
      birthDate: '1961-04-17',
      ageYears: 65,
      today: '2026-12-01',
      clinical: null,
      sexAtBirth: 'female',
      email: null,
      phone: null,
      timeZone: null,
      site: {
        id: '019ae2f0-7e55-7000-8000-000000000002',
        name: 'Quayside',
        timeZone: 'America/New_York',
      },
      account: 'active',
      enrollments: [],
      version: 1,
    });
    server.expectOne(path).flush({ reminders: true });
    await settle();
  });

  afterEach(() => {
    server.verify();
  });

  it('stops reminders at once, and says what comes all the same', async () => {
    expect(await (await box()).isChecked()).toBe(true);
    expect(words()).toContain('We e-mail you in any case when you book, cancel or pay.');
    const checkbox = await box();
    const turned = checkbox.uncheck();
    await settle();
    const call = server.expectOne({ method: 'PUT', url: path });
    expect(call.request.body).toEqual({ reminders: false });
    call.flush({ reminders: false });
    await settle();
    server.expectOne({ method: 'GET', url: path }).flush({ reminders: false });
    await turned;
    await settle();
    expect(await (await box()).isChecked()).toBe(false);
    expect(said).toEqual(['Saved. We send no more reminders.']);
  });

  it('shows what holds when a change was refused', async () => {
    const turned = (await box()).uncheck();
    await settle();
    server.expectOne({ method: 'PUT', url: path }).flush(null, { status: 0, statusText: 'x' });
    await settle();
    server.expectOne({ method: 'GET', url: path }).flush({ reminders: true });
    await turned;
    await settle();
    expect(words()).toContain('can’t be reached');
    expect(await (await box()).isChecked()).toBe(true);
  });
});

import { TestbedHarnessEnvironment } from '@angular/cdk/testing/testbed';
import { provideHttpClient, withInterceptors } from '@angular/common/http';
import { HttpTestingController, provideHttpClientTesting } from '@angular/common/http/testing';
import { ChangeDetectionStrategy, Component } from '@angular/core';
import { TestBed } from '@angular/core/testing';
import { MatButtonHarness } from '@angular/material/button/testing';
import { MatInputHarness } from '@angular/material/input/testing';
import { Router, provideRouter } from '@angular/router';
import { RouterTestingHarness } from '@angular/router/testing';
import { policyChapters, policyStep } from '@shared/clinical/program-policy';
import type { PolicyPreview } from '@shared/contracts/policy-change-contract';
import type { PolicyInForce } from '@shared/contracts/policy-in-force-contract';
import { Notices } from '../../core/notices';
import { problemInterceptor } from '../../core/problem-interceptor';
import { ChangePolicyPage } from './change-policy-page';

@Component({ template: '', changeDetection: ChangeDetectionStrategy.OnPush })
class Elsewhere {}

const since = '2026-12-01T15:00:00.000Z';
const policy: PolicyInForce = {
  version: 1,
  effectiveFrom: since,
  by: null,
  note: 'Published defaults',
  mayChange: true,
  items: policyChapters.flatMap(({ title, keys }) =>
    keys.map((number) => ({
      ...number,
      subject: title,
      step: policyStep(number),
      value: number.default,
      sinceVersion: 1,
      since,
    })),
  ),
};

const preview: PolicyPreview = {
  active: 12,
  changed: 1,
  byPart: { range: 1, ceiling: 1 },
  reviewsDue: { before: 0, after: 0 },
  items: [
    {
      prescriptionId: '01940000-0000-4000-8000-000000000001',
      patient: null,
      site: 'Quayside',
      parts: ['range', 'ceiling'],
      before: {
        leadBy: 'heart-rate',
        target: { lower: 91, upper: 108 },
        guide: null,
        askLine: null,
        perceivedExertion: { lower: 11, upper: 14 },
        ceiling: 108,
      },
      after: {
        leadBy: 'heart-rate',
        target: { lower: 91, upper: 103 },
        guide: null,
        askLine: null,
        perceivedExertion: { lower: 11, upper: 13 },
        ceiling: 103,
      },
      why: null,
      policyVersion: 1,
      withdrawn: [],
    },
  ],
};

describe('ChangePolicyPage', () => {
  async function open(read: PolicyInForce = policy) {
    const say = vi.fn();
    TestBed.configureTestingModule({
      providers: [
        provideRouter([
          { path: 'settings/policy/change', component: ChangePolicyPage },
          { path: '**', component: Elsewhere },
        ]),
        provideHttpClient(withInterceptors([problemInterceptor])),
        provideHttpClientTesting(),
        { provide: Notices, useValue: { say } },
      ],
    });
    const { fixture } = await RouterTestingHarness.create('/settings/policy/change');
    const server = TestBed.inject(HttpTestingController);
    server.expectOne('/api/policy').flush(read);
    await fixture.whenStable();
    const loader = TestbedHarnessEnvironment.loader(fixture);
    const press = async (text: string) =>
      (await loader.getHarness(MatButtonHarness.with({ text }))).click();
    const type = async (label: string, value: string) =>
      (await loader.getHarness(MatInputHarness.with({ label }))).setValue(value);
    const text = () => (fixture.nativeElement as HTMLElement).textContent.replace(/\s+/g, ' ');
    return { server, press, type, text, say, fixture };
  }

  const ischemia = 'Ceiling below ischemia, by';

  it('shows what a change does before it can be published, and publishes with the reason', async () => {
    const page = await open();
    expect(page.text()).toContain('Nothing yet.');
    await page.type(ischemia, '15');
    expect(page.text()).toContain(`${ischemia}: 10 bpm → 15 bpm`);
    expect(page.text()).not.toContain('Publish version 2');
    const looked = page.press('See what it does');
    await vi.waitFor(() => {
      const call = page.server.expectOne('/api/policy/preview');
      expect(call.request.body).toEqual({
        basedOn: 1,
        values: { 'margin.ischemia': 15 },
        offset: 0,
      });
      call.flush(preview);
    });
    await looked;
    await vi.waitFor(() => {
      expect(page.text()).toContain('1 of 12 ranges in force would be worked out differently');
    });
    expect(page.text()).toContain('91–108 bpm');
    expect(page.text()).toContain('91–103 bpm');
    expect(page.text()).toContain('A patient at Quayside');
    await page.type('Why', 'More room below ischemia, as agreed.');
    await page.press('Publish');
    const published = page.server.expectOne('/api/policy/versions');
    expect(published.request.body).toEqual({
      basedOn: 1,
      values: { 'margin.ischemia': 15 },
      reason: 'More room below ischemia, as agreed.',
    });
    published.flush({ ...policy, version: 2 });
    await vi.waitFor(() => {
      expect(page.say).toHaveBeenCalledWith('Version 2 is in force.');
    });
    await vi.waitFor(() => {
      expect(TestBed.inject(Router).url).toBe('/settings/policy');
    });
  });

  it('takes what was seen away once something else is typed', async () => {
    const page = await open();
    await page.type(ischemia, '15');
    await page.press('See what it does');
    page.server.expectOne('/api/policy/preview').flush(preview);
    await vi.waitFor(() => {
      expect(page.text()).toContain('Publish version 2');
    });
    await page.type(ischemia, '16');
    expect(page.text()).not.toContain('Publish version 2');
  });

  it('sends nothing that is out of bounds or does not fit together, and says so', async () => {
    const page = await open();
    await page.type(ischemia, '9');
    await page.press('See what it does');
    page.server.expectNone('/api/policy/preview');
    expect(page.text()).toContain('must be a number from 10 to 30 bpm');
    await page.type(ischemia, '10');
    await page.type('Intensity, wide, of heart-rate reserve, lower end', '80');
    expect(page.text()).toContain('must be above');
    await page.press('See what it does');
    page.server.expectNone('/api/policy/preview');
  });

  it('says that another version was published meanwhile, and reads it', async () => {
    const page = await open();
    await page.type(ischemia, '15');
    await page.press('See what it does');
    const title = 'Someone published another version of the policy in the meantime.';
    page.server
      .expectOne('/api/policy/preview')
      .flush(
        { type: '/x', status: 409, code: 'stale-version', title, id: 'a', errors: [] },
        { status: 409, statusText: 'Conflict' },
      );
    await vi.waitFor(() => {
      expect(page.text()).toContain(title);
    });
    const again = page.press('Load it again');
    await vi.waitFor(() => {
      page.server.expectOne('/api/policy').flush({ ...policy, version: 2 });
    });
    await again;
    expect(page.text()).toContain('Version 2 is in force.');
  });

  it('says whom to ask to who may not publish', async () => {
    const page = await open({ ...policy, mayChange: false });
    expect(page.text()).toContain('Administrators and the medical director publish versions');
  });
});

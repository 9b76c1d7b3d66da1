import { TestbedHarnessEnvironment } from '@angular/cdk/testing/testbed';
import { provideHttpClient, withInterceptors } from '@angular/common/http';
import { HttpTestingController, provideHttpClientTesting } from '@angular/common/http/testing';
import { ChangeDetectionStrategy, Component } from '@angular/core';
import { TestBed } from '@angular/core/testing';
import { MatButtonHarness } from '@angular/material/button/testing';
import { MatInputHarness } from '@angular/material/input/testing';
import { Router, provideRouter, withComponentInputBinding } from '@angular/router';
import { RouterTestingHarness } from '@angular/router/testing';
import type { SiteDetails } from '@shared/contracts/sites-contract';
import { Notices } from '../../core/notices';
import { problemInterceptor } from '../../core/problem-interceptor';
import { EditSitePage } from './edit-site-page';

@Component({ template: '', changeDetection: ChangeDetectionStrategy.OnPush })
class Elsewhere {}

const site: SiteDetails = {
  id: '01940000-0000-4000-8000-00000000000a',
  name: 'Quayside',
  timeZone: 'America/New_York',
  address: '14 Ropewalk Quay',
  phone: '207-555-0114',
  version: 3,
};

describe('EditSitePage', () => {
  async function open(id = site.id) {
    const say = vi.fn();
    TestBed.configureTestingModule({
      providers: [
        provideRouter(
          [
            { path: 'settings/sites/:id', component: EditSitePage },
            { path: '**', component: Elsewhere },
          ],
          withComponentInputBinding(),
        ),
        provideHttpClient(withInterceptors([problemInterceptor])),
        provideHttpClientTesting(),
        { provide: Notices, useValue: { say } },
      ],
    });
    const { fixture } = await RouterTestingHarness.create(`/settings/sites/${id}`);
    const server = TestBed.inject(HttpTestingController);
    server.expectOne('/api/settings/sites').flush({ items: [site] });
    await fixture.whenStable();
    const loader = TestbedHarnessEnvironment.loader(fixture);
    const press = async (text: string) =>
      (await loader.getHarness(MatButtonHarness.with({ text }))).click();
    const type = async (label: string, value: string) =>
      (await loader.getHarness(MatInputHarness.with({ label }))).setValue(value);
    const text = () => (fixture.nativeElement as HTMLElement).textContent.replace(/\s+/g, ' ');
    return { server, press, type, text, say };
  }

  it('says what another zone does, and how many class dates moved', async () => {
    const page = await open();
    expect(page.text()).not.toContain('keep their time on the wall');
    await page.type('Time zone', 'America/Chicago');
    expect(page.text()).toContain('keep their time on the wall');
    await page.press('Save');
    const call = page.server.expectOne(`/api/sites/${site.id}`);
    const { id: _, ...fields } = site;
    expect(call.request.body).toEqual({ ...fields, timeZone: 'America/Chicago' });
    call.flush({ site: { ...site, version: 4 }, movedClassDates: 12 });
    await vi.waitFor(() => {
      expect(page.say).toHaveBeenCalledWith(
        'Quayside is saved. 12 class dates moved to the new zone.',
      );
    });
    expect(TestBed.inject(Router).url).toBe('/settings/sites');
  });

  it('shows a taken name beside the field, and another’s change on the page', async () => {
    const page = await open();
    const refuse = (code: string, title: string) => {
      page.server.expectOne(`/api/sites/${site.id}`).flush(
        { type: '/x', status: 409, code, title, id: 'a', errors: [] },
        {
          status: 409,
          statusText: 'Conflict',
        },
      );
    };
    await page.press('Save');
    refuse('already-recorded', 'Recorded already');
    await vi.waitFor(() => {
      expect(page.text()).toContain('Another site has this name');
    });
    await page.type('Name', 'Quayside West');
    await page.press('Save');
    refuse('stale-version', 'Someone changed this in the meantime.');
    await vi.waitFor(() => {
      expect(page.text()).toContain('Someone changed this in the meantime.');
    });
    const pressed = page.press('Load it again');
    await vi.waitFor(() => {
      page.server
        .expectOne('/api/settings/sites')
        .flush({ items: [{ ...site, name: 'Quayside East', version: 4 }] });
    });
    await pressed;
    expect(page.text()).toContain('Quayside East');
  });

  it('tells when there is no such site', async () => {
    const page = await open('01940000-0000-4000-8000-0000000000ff');
    expect(page.text()).toContain('There is no such site');
  });
});

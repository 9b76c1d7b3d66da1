import { provideHttpClient } from '@angular/common/http';
import { HttpTestingController, provideHttpClientTesting } from '@angular/common/http/testing';
import { TestBed } from '@angular/core/testing';
import { provideRouter } from '@angular/router';
import { defaultProgramPolicy, valuesOf } from '@shared/clinical/program-policy';
import type { PolicyVersions } from '@shared/contracts/policy-change-contract';
import { PolicyHistoryPage } from './policy-history-page';

const values = { ...valuesOf(defaultProgramPolicy) };
const version = (number: number, changed: Record<string, number>) => ({
  version: number,
  effectiveFrom: '2026-12-01T15:00:00.000Z',
  by: number === 1 ? null : 'M. Okafor',
  reason: number === 1 ? 'Published defaults' : `Reason ${number}`,
  values: { ...values, ...changed },
});
const versions: PolicyVersions = {
  items: [
    version(3, { 'margin.icd': 20, reviewDueDays: 21 }),
    version(2, { 'margin.icd': 20 }),
    version(1, {}),
  ],
};

describe('PolicyHistoryPage', () => {
  async function open() {
    TestBed.configureTestingModule({
      providers: [provideRouter([]), provideHttpClient(), provideHttpClientTesting()],
    });
    const fixture = TestBed.createComponent(PolicyHistoryPage);
    TestBed.tick();
    TestBed.inject(HttpTestingController).expectOne('/api/policy/versions').flush(versions);
    await fixture.whenStable();
    return { element: fixture.nativeElement as HTMLElement, fixture };
  }
  const words = (element: Element | null) => element?.textContent.replace(/\s+/g, ' ') ?? '';

  it('tells who published each version, why, and what it changed of the one before', async () => {
    const { element } = await open();
    const [third, second, first] = [...element.querySelectorAll('ol > li')].map(words);
    expect(third).toContain('by M. Okafor: Reason 3');
    expect(third).toContain('30 days → 21 days');
    expect(third).not.toContain('10 bpm → 20 bpm');
    expect(second).toContain('10 bpm → 20 bpm');
    expect(first).toContain('shipped with Plimsoll: Published defaults');
  });

  it('compares any two', async () => {
    const { element, fixture } = await open();
    expect(words(element.querySelector('section'))).toContain('30 days → 21 days');
    const [, to] = element.querySelectorAll('select');
    if (!to) throw new Error('There is nothing to choose');
    to.value = '1';
    to.dispatchEvent(new Event('change'));
    await fixture.whenStable();
    expect(words(element.querySelector('section'))).toContain('Every number is the same.');
  });
});

import { provideHttpClient } from '@angular/common/http';
import { HttpTestingController, provideHttpClientTesting } from '@angular/common/http/testing';
import { TestBed } from '@angular/core/testing';
import type { MyRange } from '@shared/contracts/my-range-contract';
import { effortWords } from '../effort-words';
import { MyRangePage } from './my-range-page';

const site = { name: 'Quayside', phone: '(555) 010-0142', timeZone: 'America/New_York' };
const range: NonNullable<MyRange['range']> = {
  state: 'in-force',
  changes: [],
  target: { lower: 91, upper: 105 },
  tenSecondCount: { lower: 16, upper: 17 },
  stayUnder: 108,
  resting: 62,
  effort: { lower: 11, upper: 13 },
  hasDefibrillator: false,
  setOn: '2026-12-01T15:00:00.000Z',
  setBy: 'I. Brandt',
};

async function open(told: MyRange['range']): Promise<{ page: HTMLElement; text: string }> {
  TestBed.configureTestingModule({
    providers: [provideHttpClient(), provideHttpClientTesting()],
  });
  const fixture = TestBed.createComponent(MyRangePage);
  TestBed.tick();
  TestBed.inject(HttpTestingController).expectOne('/api/my/range').flush({ site, range: told });
  await fixture.whenStable();
  const page = fixture.nativeElement as HTMLElement;
  return { page, text: page.textContent.replace(/\s+/g, ' ') };
}

describe('MyRangePage', () => {
  it('tells the range, the count, where to stop and whom to call', async () => {
    const { page, text } = await open(range);
    expect(text).toContain('91–105beats a minute when you exercise.');
    expect(text).toContain('Count 16 or 17 beats in 10 seconds.');
    expect(text).toContain('Stay under 108. If you get there, slow down and rest.');
    expect(text).toContain('Chest pain, fainting, trouble breathing: stop and call 911.');
    expect(text).toContain('It should feel like work, but you can still talk.');
    expect(text).toContain('Set Dec 1, 2026 by I. Brandt.');
    expect(page.querySelector('a')?.getAttribute('href')).toBe('tel:5550100142');
    expect(text.toLowerCase()).not.toContain('ceiling');
  });

  it('goes by effort where effort leads, and still says where to stay under', async () => {
    const { text } = await open({ ...range, target: null, tenSecondCount: null });
    expect(text).toContain('Go by how it feels11–13on the effort scale');
    expect(text).toContain('Stay under 108.');
  });

  it('says that a range is being set anew', async () => {
    const { text } = await open({
      ...range,
      state: 'review',
      changes: [
        { fact: 'rate-acting-drug-stopped', effect: 'withdrawn', at: '2026-12-01T15:00:00.000Z' },
      ],
      target: null,
      tenSecondCount: null,
    });
    expect(text).toContain('Something has changed. Your team will set a new range.');
  });

  it('names a shock as a sign to stop for who has a device', async () => {
    const { text } = await open({ ...range, stayUnder: null, hasDefibrillator: true });
    expect(text).toContain('a shock from your device: stop and call 911.');
    expect(text).not.toContain('Stay under');
  });

  it('says who sets it while there is none', async () => {
    const { text } = await open(null);
    expect(text).toContain('You have no range yet');
    expect(text).toContain('call 911');
  });
});

it.each([
  [11, 'light'],
  [13, 'still talk'],
  [14, 'short sentence'],
  [17, 'a few words'],
])('an effort up to %s feels %s', (upper, words) => {
  expect(effortWords({ lower: 9, upper })).toContain(words);
});

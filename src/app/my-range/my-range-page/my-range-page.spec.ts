import { provideHttpClient } from '@angular/common/http';
import { HttpTestingController, provideHttpClientTesting } from '@angular/common/http/testing';
import { TestBed } from '@angular/core/testing';
import type { MyRange } from '@shared/contracts/my-range-contract';
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
  cautions: ['defer-to-local-policy', 'claudication-leads'],
  setOn: '2026-12-01T15:00:00.000Z',
  setBy: 'I. Brandt',
  signedBy: 'M. Okafor, MD',
};

async function open(told: MyRange['range']): Promise<{ page: HTMLElement; text: string }> {
  TestBed.configureTestingModule({
    providers: [provideHttpClient(), provideHttpClientTesting()],
  });
  const fixture = TestBed.createComponent(MyRangePage);
  TestBed.tick();
  TestBed.inject(HttpTestingController)
    .expectOne('/api/my/range')
    .flush({
      program: 'Harbor Lane',
      patient: 'Ada Ferreira',
      site,
      range: told,
      home: { perWeek: 2, warmUpMinutes: 10, coolDownMinutes: 10 },
    });
  await fixture.whenStable();
  const page = fixture.nativeElement as HTMLElement;
  return { page, text: page.textContent.replace(/\s+/g, ' ') };
}

describe('MyRangePage', () => {
  it('tells the range, the count, where to stop and whom to call', async () => {
    const { page, text } = await open(range);
    expect(text).toContain('91–105beats a minute when you exercise.');
    expect(text).toContain('16 or 17 beats in 10 seconds is in your range.');
    expect(text).toContain('aim for 2 days a week');
    expect(text).toContain('If your legs hurt, rest until it stops.');
    expect(page.querySelectorAll('.yours')).toHaveLength(2);
    expect(text).toContain('Stay under 108. If you get there, slow down and rest.');
    expect(text).toContain('Chest pain, fainting, trouble breathing: stop and call 911.');
    expect(text).toContain('It should feel like steady work, but you can still talk.');
    expect(text).toContain('Set Dec 1, 2026. Signed by I. Brandt and M. Okafor, MD.');
    const links = [...page.querySelectorAll('a')].map((link) => link.getAttribute('href'));
    expect(links).toEqual(['/api/my/range.pdf', 'tel:5550100142']);
    expect(text.toLowerCase()).not.toContain('ceiling');
  });

  it('goes by effort where effort leads, and still says where to stay under', async () => {
    const { text } = await open({ ...range, target: null, tenSecondCount: null });
    expect(text).toContain('Go by how it feels11–13on the effort scale');
    expect(text).toContain('Stay under 108.');
  });

  it('says that a range is being set anew, and why, without alarm', async () => {
    const { text } = await open({
      ...range,
      state: 'review',
      changes: [
        { fact: 'rate-acting-drug-stopped', effect: 'withdrawn', at: '2026-12-01T15:00:00.000Z' },
      ],
      target: null,
      tenSecondCount: null,
    });
    expect(text).toContain('Your team will set a new range. A heart medicine was changed.');
    expect(text).toContain('This is usual.');
    expect(text).not.toContain('Count your pulse');
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

import { TestBed } from '@angular/core/testing';
import { describeLoadLine } from './describe-load-line';
import { LoadLine } from './load-line';
import type { LoadLineFacts, LoadLineSize } from './load-line-facts';

const worked: LoadLineFacts = {
  resting: 62,
  target: { lower: 91, upper: 108 },
  guide: null,
  ceiling: { value: 108, reason: '10 below ischemia at 118' },
  askLine: null,
  ticks: [{ value: 119, label: '80 %' }],
  marker: { value: 96, label: 'last peak' },
};

async function render(size: LoadLineSize, facts: LoadLineFacts): Promise<HTMLElement> {
  const fixture = TestBed.createComponent(LoadLine);
  for (const [name, value] of Object.entries({ size, ...facts })) {
    fixture.componentRef.setInput(name, value);
  }
  await fixture.whenStable();
  return fixture.nativeElement as HTMLElement;
}

describe('describeLoadLine', () => {
  it('tells staff the target, the ceiling with its reason, and the rest', () => {
    expect(describeLoadLine(worked, 'worksheet')).toBe(
      'Target 91 to 108 beats a minute. Ceiling 108: 10 below ischemia at 118. Resting 62. ' +
        'last peak: 96. Upper end by other methods: 80 % 119.',
    );
  });

  it('tells the patient to stay under it', () => {
    const told = { ...worked, target: { lower: 91, upper: 105 }, marker: null };
    expect(describeLoadLine(told, 'patient')).toBe(
      'Your range is 91 to 105 beats a minute. Stay under 108. At rest: 62.',
    );
  });

  it('says that effort leads, the guide, an unknown ceiling and when to ask', () => {
    const led = { ...worked, target: null, guide: { lower: 82, upper: 92 }, ceiling: null };
    const words = describeLoadLine({ ...led, askLine: 102, ticks: [], marker: null }, 'tile');
    expect(words).toBe(
      'No heart-rate target: effort leads. As a guide 82 to 92 beats a minute. ' +
        'No ceiling is known. Ask at 102. Resting 62.',
    );
    expect(describeLoadLine({ ...led, guide: null, resting: null, marker: null }, 'patient')).toBe(
      'You have no heart-rate range. Go by how hard the work feels.',
    );
  });
});

describe('LoadLine', () => {
  it.each(['worksheet', 'patient', 'tile'] as const)(
    'is a picture with words at size %s, hatched above the ceiling',
    async (size) => {
      const element = await render(size, worked);
      const picture = element.querySelector('svg[role=img]');
      expect(picture?.getAttribute('aria-label')).toBe(describeLoadLine(worked, size));
      const id = element.querySelector('pattern')?.id;
      expect(element.querySelector('.over')?.getAttribute('fill')).toBe(`url(#${id})`);
      expect(element.querySelector('line.ceiling')).not.toBeNull();
    },
  );

  it('draws neither ceiling nor hatching when none is known', async () => {
    const element = await render('tile', { ...worked, ceiling: null });
    expect(element.querySelector('.over')).toBeNull();
    expect(element.querySelector('line.ceiling')).toBeNull();
  });

  it('gives each picture of a page a hatching of its own', async () => {
    const [first, second] = [await render('tile', worked), await render('tile', worked)];
    const idOf = (element: HTMLElement) => element.querySelector('pattern')?.id;
    expect(idOf(first)).not.toBe(idOf(second));
  });
});

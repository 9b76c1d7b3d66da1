import { provideHttpClient } from '@angular/common/http';
import { HttpTestingController, provideHttpClientTesting } from '@angular/common/http/testing';
import { TestBed } from '@angular/core/testing';
import { provideRouter } from '@angular/router';
import type { CourseProgress } from '@shared/contracts/my-progress-contract';
import { ProgressPage } from './progress-page';

const site = { name: 'Quayside', phone: '(555) 010-0142' };
const course: CourseProgress = {
  status: 'active',
  planned: 36,
  done: 3,
  booked: 5,
  closedOn: null,
  sessions: [
    { localDate: '2026-11-02', heartRate: 97, effort: 12, target: { lower: 91, upper: 105 } },
    { localDate: '2026-11-05', heartRate: 108, effort: 14, target: { lower: 91, upper: 105 } },
    { localDate: '2026-11-09', heartRate: null, effort: null, target: null },
  ],
  walks: null,
};

async function open(told: CourseProgress | null): Promise<{ page: HTMLElement; text: string }> {
  TestBed.configureTestingModule({
    providers: [provideHttpClient(), provideHttpClientTesting(), provideRouter([])],
  });
  const fixture = TestBed.createComponent(ProgressPage);
  TestBed.tick();
  TestBed.inject(HttpTestingController).expectOne('/api/my/progress').flush({ site, course: told });
  await fixture.whenStable();
  const page = fixture.nativeElement as HTMLElement;
  return { page, text: page.textContent.replace(/\s+/g, ' ') };
}

describe('ProgressPage', () => {
  it('tells sessions done of planned, what comes next and what is booked', async () => {
    const { text } = await open(course);
    expect(text).toContain('3 of 36');
    expect(text).toContain('Next: a quarter of the way. That is session 9, 6 to go.');
    expect(text).toContain('You have 5 more booked.');
  });

  it('draws the sessions, and says the same in a table, the latest first', async () => {
    const { page, text } = await open(course);
    expect(page.querySelectorAll('svg circle')).toHaveLength(2);
    expect(page.querySelector('svg')?.getAttribute('aria-label')).toBe(
      'Your average heart rate in 2 sessions, from 97 to 108 beats a minute. ' +
        'Your average was in your range in 1 of 2 sessions. All numbers stand in the table below.',
    );
    expect(text).toContain('Your average was in your range in 1 of 2 sessions.');
    const rows = [...page.querySelectorAll('tbody tr')].map((row) =>
      [...row.children].map((cell) => cell.textContent.trim()),
    );
    expect(rows).toEqual([
      ['Mon, Nov 9', 'None', 'None', 'None'],
      ['Thu, Nov 5', '108', '91–105', '14'],
      ['Mon, Nov 2', '97', '91–105', '12'],
    ]);
  });

  it('says when no reading was taken, and speaks of no range where there was none', async () => {
    const bare = course.sessions.map((session) => ({ ...session, heartRate: null }));
    const without = await open({ ...course, sessions: bare });
    expect(without.page.querySelector('svg')).toBeNull();
    expect(without.text).toContain('No heart rate was written down');
    TestBed.resetTestingModule();
    const byEffort = course.sessions.map((session) => ({ ...session, target: null }));
    const { text, page } = await open({ ...course, sessions: byEffort });
    expect(page.querySelectorAll('svg circle')).toHaveLength(2);
    expect(text).not.toContain('The band is your range');
  });

  it('begins with the first session', async () => {
    const { page, text } = await open({ ...course, done: 0, booked: 0, sessions: [] });
    expect(text).toContain('Next: your first session.');
    expect(text).toContain('You have none booked now.');
    expect(page.querySelector('table')).toBeNull();
  });

  it.each([
    [{ done: 36 }, 'You have done all the sessions in your plan. Well done!'],
    [{ status: 'on-hold' }, 'Your course is on hold. Ready to start again? Call (555) 010-0142'],
    [{ status: 'completed', closedOn: '2026-11-20' }, 'This course ended on Nov 20, 2026.'],
  ] as const)('with %o says “%s”', async (given, words) => {
    expect((await open({ ...course, ...given })).text).toContain(words);
  });

  it('tells the walk in feet, and how the latest stands to the first', async () => {
    const walk = (performedOn: string, distanceMeters: number) => ({ performedOn, distanceMeters });
    const walks = { first: walk('2026-10-02', 310), latest: walk('2026-11-28', 372.5) };
    expect((await open({ ...course, walks })).text).toContain('That is 205 feet farther.');
  });

  it('says what will stand here while there is no course', async () => {
    const { page, text } = await open(null);
    expect(text).toContain('Nothing to show yet');
    expect(page.querySelector('a')?.getAttribute('href')).toBe('tel:5550100142');
  });
});

import { sayBack } from './say-back';

const asked = { weekdays: [5, 1, 3], startTime: '09:00' };

describe('sayBack', () => {
  it('tells the rhythm, the ends and what is otherwise, by the clock of the site', () => {
    const said = sayBack(
      [
        { startsAt: '2026-12-07T14:00:00Z' },
        { startsAt: '2026-12-10T19:00:00Z' },
        { startsAt: '2026-12-11T14:00:00Z' },
      ],
      asked,
      'America/New_York',
    );
    expect(said).toEqual({
      rhythm: 'Mondays, Wednesdays, and Fridays at 9:00 AM',
      count: 3,
      first: 'Monday, December 7, 9:00 AM',
      last: 'Friday, December 11, 9:00 AM',
      otherwise: ['Thursday, December 10, 2:00 PM'],
    });
  });

  it('keeps the hour when the clocks change', () => {
    const said = sayBack(
      [{ startsAt: '2026-10-30T13:00:00Z' }, { startsAt: '2026-11-02T14:00:00Z' }],
      asked,
      'America/New_York',
    );
    expect(said.otherwise).toEqual([]);
  });
});

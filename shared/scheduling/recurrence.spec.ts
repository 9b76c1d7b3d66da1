import { describe, expect, it } from 'vitest';
import { recurrenceDates } from './recurrence';
import { recurrenceFault } from './recurrence-rule';
import { weekdaysOfRule, weeklyRule } from './weekly-rule';

const rule = (recurrence: string, startsOn = '2026-12-01', endsOn: string | null = null) => ({
  recurrence,
  startsOn,
  endsOn,
});

describe('recurrenceFault', () => {
  it.each([
    'FREQ=WEEKLY;BYDAY=MO,WE,FR',
    'FREQ=DAILY;INTERVAL=2;COUNT=36',
    'FREQ=MONTHLY;BYDAY=1TU;UNTIL=20270101T000000Z',
  ])('takes %s', (recurrence) => {
    expect(recurrenceFault(recurrence)).toBeNull();
  });

  it.each([
    '',
    'weekly',
    'FREQ=SECONDLY',
    'FREQ=WEEKLY;BYHOUR=9',
    'FREQ=WEEKLY;BYDAY=XX',
    'FREQ=WEEKLY;FREQ=DAILY',
    'FREQ=WEEKLY;INTERVAL=0',
    'FREQ=DAILY;COUNT=3;UNTIL=20270101',
    'DTSTART=20260101T000000Z;FREQ=DAILY',
    'FREQ=WEEKLY\nEXDATE:20260101',
  ])('refuses %j', (recurrence) => {
    expect(recurrenceFault(recurrence)).not.toBeNull();
  });
});

describe('recurrenceDates', () => {
  it('takes the window from its first date to the one before its last', () => {
    const dates = recurrenceDates(rule('FREQ=WEEKLY;BYDAY=MO,WE,FR'), {
      from: '2026-12-02',
      to: '2026-12-11',
    });
    expect(dates).toEqual(['2026-12-02', '2026-12-04', '2026-12-07', '2026-12-09']);
  });

  it('counts from the first date of the rule, not of the window', () => {
    const window = { from: '2026-12-10', to: '2027-02-01' };
    expect(recurrenceDates(rule('FREQ=WEEKLY;COUNT=3'), window)).toEqual(['2026-12-15']);
    expect(recurrenceDates(rule('FREQ=WEEKLY;INTERVAL=2'), window)).toEqual([
      '2026-12-15',
      '2026-12-29',
      '2027-01-12',
      '2027-01-26',
    ]);
  });

  it('ends at the earlier of the rule’s end and the class’s', () => {
    const window = { from: '2026-12-01', to: '2027-01-01' };
    const until = rule('FREQ=DAILY;UNTIL=20261204', '2026-12-01', '2026-12-20');
    expect(recurrenceDates(until, window)).toHaveLength(4);
    expect(recurrenceDates({ ...until, endsOn: '2026-12-02' }, window)).toHaveLength(2);
  });

  it('answers at once for a rule that never comes true', () => {
    const never = rule('FREQ=YEARLY;BYMONTH=2;BYMONTHDAY=30');
    expect(recurrenceDates(never, { from: '2026-12-01', to: '2027-12-01' })).toEqual([]);
  });

  it('is empty outside the rule’s life, and throws on what is no rule', () => {
    const window = { from: '2026-01-01', to: '2026-12-01' };
    expect(recurrenceDates(rule('FREQ=DAILY'), window)).toEqual([]);
    expect(() => recurrenceDates(rule('FREQ=HOURLY'), window)).toThrow(RangeError);
  });
});

describe('weekly rules', () => {
  it('are made of weekdays and read back', () => {
    expect(weeklyRule([5, 1, 3])).toBe('FREQ=WEEKLY;BYDAY=MO,WE,FR');
    expect(weekdaysOfRule('FREQ=WEEKLY;BYDAY=FR,MO,WE')).toEqual([1, 3, 5]);
    expect(weekdaysOfRule('FREQ=WEEKLY;BYDAY=XX')).toBeNull();
    expect(weekdaysOfRule('FREQ=DAILY')).toBeNull();
  });
});

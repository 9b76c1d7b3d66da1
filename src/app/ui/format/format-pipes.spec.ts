import { DecimalsPipe, InstantPipe, LocalDatePipe, SharePipe } from './format-pipes';

const plain = (text: string) => text.replace(/\s/g, ' ');

describe('pipes', () => {
  it('tell a date of the calendar whatever the zone', () => {
    expect(new LocalDatePipe().transform('2026-03-08')).toBe('Mar 8, 2026');
    expect(new LocalDatePipe().transform(null)).toBe('');
  });

  it('tell an instant on the reader’s clock', () => {
    const at = new Date(2026, 10, 18, 9, 5, 7).toISOString();
    const pipe = new InstantPipe();
    expect(plain(pipe.transform(at, 'day'))).toBe('Nov 18, 2026');
    expect(plain(pipe.transform(at, 'longDay'))).toBe('November 18, 2026');
    expect(plain(pipe.transform(at, 'minute'))).toBe('Nov 18, 2026, 9:05 AM');
    expect(plain(pipe.transform(at, 'second'))).toBe('Nov 18, 2026, 9:05:07 AM');
  });

  it('tell numbers and shares', () => {
    expect(new DecimalsPipe().transform(27.25, 1)).toBe('27.3');
    expect(new DecimalsPipe().transform(27, 1)).toBe('27.0');
    expect(new DecimalsPipe().transform(null, 1)).toBe('');
    expect(new SharePipe().transform(0.625)).toBe('63%');
    expect(new SharePipe().transform(1, false)).toBe('100');
    expect(new SharePipe().transform(null)).toBe('');
  });
});

import { describe, expect, it } from 'vitest';
import { nextReadingDue, type LastReading } from './reading-due';

const at = (time: string): Date => new Date(`2026-12-01T${time}:00Z`);
const reading = (given: Partial<LastReading>): LastReading => ({
  phase: 'exercise',
  measuredAt: at('14:00'),
  placement: 'in',
  ...given,
});

describe('when the next reading is due', () => {
  it.each<[string, LastReading | null, string | null]>([
    ['after check-in', null, '14:10'],
    ['at rest', reading({ phase: 'resting', placement: null }), '14:10'],
    ['at exercise', reading({}), '14:08'],
    ['over the ceiling', reading({ placement: 'over-ceiling' }), '14:02'],
    [
      'over the ceiling in recovery',
      reading({ phase: 'recovery', placement: 'over-ceiling' }),
      '14:02',
    ],
    ['after recovery', reading({ phase: 'recovery', placement: null }), null],
  ])('%s', (_, last, due) => {
    expect(nextReadingDue(at('14:00'), last)).toEqual(due === null ? null : at(due));
  });

  it('is not told before check-in', () => {
    expect(nextReadingDue(null, null)).toBeNull();
  });
});

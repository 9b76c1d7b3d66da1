import { classToOpen, inOrderOfUse } from './class-choice';

const dated = (id: string, start: string, end: string, booked = 8) => ({
  id,
  startsAt: `2026-12-01T${start}:00Z`,
  endsAt: `2026-12-01T${end}:00Z`,
  booked,
});
const classes = [
  dated('seven', '07:00', '08:00'),
  dated('eight', '08:00', '09:00'),
  dated('nine', '09:00', '10:00', 2),
  dated('nine, fuller', '09:00', '10:00', 9),
  dated('ten', '10:00', '11:00'),
];
const at = (time: string): Date => new Date(`2026-12-01T${time}:00Z`);
const ids = (list: readonly { id: string }[]): string[] => list.map(({ id }) => id);

describe('which class the floor opens with', () => {
  it('lists what is on first, then what comes, then what is over, the latest first', () => {
    expect(ids(inOrderOfUse(classes, at('09:20')))).toEqual([
      'nine',
      'nine, fuller',
      'ten',
      'eight',
      'seven',
    ]);
  });

  it('opens the fullest that is on, a quarter of an hour ahead too', () => {
    expect(classToOpen(classes, at('09:20'))?.id).toBe('nine, fuller');
    expect(classToOpen(classes, at('06:46'))?.id).toBe('seven');
  });

  it('passes over a class in which nobody is, for the nearest with people', () => {
    const empty = dated('empty', '11:00', '12:00', 0);
    const evening = dated('evening', '17:00', '18:00');
    const day = [...classes, empty, evening];
    expect(classToOpen(day, at('11:20'))?.id).toBe('ten');
    expect(classToOpen(day, at('16:00'))?.id).toBe('evening');
    expect(classToOpen([empty], at('11:20'))?.id).toBe('empty');
  });

  it('opens the next one between classes, and the last after all', () => {
    expect(classToOpen(classes, at('05:00'))?.id).toBe('seven');
    expect(classToOpen(classes, at('12:00'))?.id).toBe('ten');
    expect(classToOpen([], at('12:00'))).toBeUndefined();
  });
});

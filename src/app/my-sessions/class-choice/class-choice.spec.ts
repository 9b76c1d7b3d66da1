import { TestBed } from '@angular/core/testing';
import type { AppointmentItem, ClassDate } from '@shared/contracts/schedule-contract';
import { ClassChoice } from './class-choice';

const day = new Date(Date.now() + 5 * 86_400_000).toISOString().slice(0, 10);

const classDate = (given: Partial<ClassDate>): ClassDate => ({
  id: 'one',
  siteId: 'site',
  name: 'Morning class',
  kind: 'exercise',
  startsAt: `${day}T14:00:00Z`,
  endsAt: `${day}T15:00:00Z`,
  localDate: day,
  localStart: '09:00',
  capacity: 12,
  booked: 11,
  monitoredCapacity: 6,
  monitoredBooked: 3,
  status: 'scheduled',
  price: null,
  ...given,
});

describe('ClassChoice', () => {
  function rows(dates: ClassDate[], appointments: Partial<AppointmentItem>[] = []): HTMLElement[] {
    const fixture = TestBed.createComponent(ClassChoice);
    fixture.componentRef.setInput('dates', dates);
    fixture.componentRef.setInput('own', { appointments, monitored: true });
    fixture.componentRef.setInput('timeZone', 'America/New_York');
    fixture.detectChanges();
    return [...(fixture.nativeElement as HTMLElement).querySelectorAll('li')];
  }

  const words = (row: HTMLElement | undefined) => row?.textContent.replace(/\s+/g, ' ').trim();

  it('says the price before the place is booked, in the button too', () => {
    const price = { name: 'Class', amountMinor: 1800, currency: 'USD' };
    const [row] = rows([classDate({ price })]);
    expect(words(row)).toContain('You pay $18.00');
    expect(words(row)).toContain('1 place left');
    const button = row?.querySelector('button');
    expect(button?.textContent.trim()).toBe('Book for $18.00');
    expect(button?.getAttribute('aria-label')).toContain('you pay $18.00');
  });

  it.each([
    [false, 'You pay the $18.00 that you owe already'],
    [true, 'You paid $18.00 already'],
  ])('asks for nothing more after a late cancellation (paid: %s)', (paid, told) => {
    const price = { name: 'Class', amountMinor: 1800, currency: 'USD' };
    const charge = { amountMinor: 1800, currency: 'USD', paid };
    const [row] = rows(
      [classDate({ price })],
      [{ classDateId: 'one', status: 'cancelled', charge }],
    );
    expect(words(row)).toContain(told);
    expect(row?.querySelector('button')?.textContent.trim()).toBe('Book');
  });

  it('says why a class can’t be booked', () => {
    const found = rows([
      classDate({ booked: 12 }),
      classDate({ id: 'two', monitoredBooked: 6 }),
      classDate({ id: 'three', status: 'closed' }),
    ]);
    expect(found.map((row) => row.querySelector('button'))).toEqual([null, null, null]);
    expect(words(found[0])).toContain('Full');
    expect(words(found[1])).toContain('No monitored place left');
    expect(words(found[2])).toContain('No class on this day');
  });
});

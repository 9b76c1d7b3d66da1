import type { Reading, RosterItem } from '@shared/contracts/floor-contract';
import { attentionIn } from './attention';
import { sampleItem, sampleReading } from './roster-sample';
import { visitOf } from './visit';

const at = (time: string): Date => new Date(`2026-12-01T${time}:00.000Z`);

function told(items: RosterItem[], now = '14:01', over = false): string[] {
  const visits = items.map((item) => visitOf(item, []));
  return attentionIn(visits, at(now), over).map(({ tone, text }) => `${tone}: ${text}`);
}
const read = (reading: Partial<Reading>, item: Partial<RosterItem> = {}): RosterItem =>
  sampleItem({ readings: [sampleReading(10, reading)], ...item });

describe('what needs attention', () => {
  it('is nothing while all is well', () => {
    expect(told([read({}), sampleItem({ status: 'booked', record: null })])).toEqual([]);
  });

  it('says what to do first over the ceiling, and to recheck when it is time', () => {
    const over = read({ heartRate: 127, placement: 'over-ceiling' });
    expect(told([over])).toEqual(['over: Verne 127, over 112: slow down, recheck in 2 min']);
    expect(told([over], '14:02')).toEqual(['over: Verne 127, over 112: recheck now']);
  });

  it('tells of pressure, oxygen and symptoms', () => {
    const item = read(
      { systolic: 212, diastolic: 90, oxygenSaturation: 86, symptoms: ['chest-discomfort'] },
      { pressureCeiling: { systolic: 200, diastolic: 110 }, oxygenFloor: 88 },
    );
    expect(told([item])).toEqual([
      'over: Verne 212/90, over 200/110: slow down, recheck',
      'over: Verne oxygen 86 %, under 88 %: stop and recheck',
      'over: Verne chest discomfort: see to the patient',
    ]);
    expect(told([read({ symptoms: ['none'] })])).toEqual([]);
  });

  it('puts what may hurt before what is due, whoever comes first', () => {
    const late = read(
      { measuredAt: at('13:50').toISOString() },
      { appointmentId: 'a', familyName: 'Marchetti' },
    );
    const over = read({ heartRate: 127, placement: 'over-ceiling' }, { appointmentId: 'b' });
    expect(told([late, over])).toEqual([
      'over: Verne 127, over 112: slow down, recheck in 2 min',
      'due: Marchetti reading due',
    ]);
  });

  it('tells two of one family name apart', () => {
    const one = sampleItem({ appointmentId: 'a', status: 'arrived', record: null });
    const other = sampleItem({
      appointmentId: 'b',
      displayName: 'Hale Verne',
      status: 'arrived',
      record: null,
    });
    expect(told([one, other])).toEqual([
      'due: Odalys Verne to check in',
      'due: Hale Verne to check in',
    ]);
  });

  it('asks for signatures once the class is over', () => {
    expect(told([read({})], '15:00', true)).toEqual(['due: Verne record to sign']);
    expect(told([read({}, { status: 'fulfilled' })], '15:00', true)).toEqual([]);
  });

  it('tells that the range has changed since', () => {
    const texts = told([read({}, { flags: ['range-changed'] })]);
    expect(texts).toEqual(['due: Verne range changed since the record began: see the chart']);
  });
});

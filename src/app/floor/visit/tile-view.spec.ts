import type { Reading, RosterItem } from '@shared/contracts/floor-contract';
import { sampleItem, sampleReading } from './roster-sample';
import { tileOf } from './tile-view';
import { visitOf } from './visit';

const zone = 'America/New_York';
const at = (time: string): Date => new Date(`2026-12-01T${time}:00.000Z`);

function tile(item: Partial<RosterItem>, now = '14:03') {
  return tileOf(visitOf(sampleItem(item), []), at(now), zone);
}
const withReading = (given: Partial<Reading>, item: Partial<RosterItem> = {}, now?: string) =>
  tile({ readings: [sampleReading(10, given)], ...item }, now);

describe('a tile of the floor', () => {
  it.each<[Partial<RosterItem>, string]>([
    [{ status: 'booked', record: null }, 'not here yet'],
    [{ status: 'arrived', record: null }, 'to check in'],
    [{ status: 'noshow', record: null }, 'no-show'],
    [{ record: null }, 'confirm identity'],
    [{}, 'first reading'],
    [{ status: 'fulfilled' }, 'signed'],
  ])('%j says %s', (item, text) => {
    expect(tile(item).chip.text).toBe(text);
  });

  it.each<[Partial<Reading>, string, string]>([
    [{ heartRate: 90, placement: 'below' }, 'due', 'below 91–108'],
    [{ heartRate: 104, placement: 'in' }, 'in', 'in range 91–108'],
    [{ heartRate: 110, placement: 'above' }, 'due', 'above 91–108'],
    [{ heartRate: 113, placement: 'over-ceiling' }, 'over', 'over ceiling 112'],
    [{ phase: 'resting', heartRate: 64, placement: null }, 'plain', 'at rest'],
    [{ phase: 'recovery', heartRate: 80, placement: null }, 'plain', 'recovering'],
  ])('%j is %s: %s', (reading, tone, text) => {
    expect(withReading(reading, {}, '14:01').chip).toMatchObject({ tone, text });
  });

  it('goes by effort where effort leads, and past the ceiling all the same', () => {
    const led = { leadBy: 'perceived-exertion', target: null } as const;
    const rated = (perceivedExertion: number | null) =>
      withReading({ placement: null, perceivedExertion }, led).chip.text;
    expect(rated(null)).toBe('go by effort 11–14');
    expect(rated(12)).toBe('effort 12, in 11–14');
    expect(rated(15)).toBe('effort 15, above 11–14');
    expect(withReading({ heartRate: 113, placement: 'over-ceiling' }, led, '14:01').isOver).toBe(
      true,
    );
  });

  it('asks past the line where no ceiling is known', () => {
    const open = { ceiling: null, askLine: 118 };
    expect(withReading({ heartRate: 119, placement: 'above' }, open).chip.text).toBe(
      'past 118: ask',
    );
    expect(withReading({ heartRate: 118, placement: 'above' }, open).chip.text).toBe(
      'above 91–108',
    );
  });

  it('says that no range is in force', () => {
    const none = { leadBy: null, target: null, ceiling: null, perceivedExertion: null };
    expect(withReading({ placement: null }, none).chip.text).toBe('no range in force');
    expect(withReading({ placement: null }, none).flags).toEqual([]);
  });

  it('greys the number when the next reading is due, eight minutes on', () => {
    expect(withReading({}, {}, '14:07').isOld).toBe(false);
    const late = withReading({}, {}, '14:08');
    expect(late).toMatchObject({ isOld: true, rate: 104, chip: { text: 'reading due' } });
  });

  it('asks for the recheck two minutes after the ceiling was passed', () => {
    const over = { heartRate: 113, placement: 'over-ceiling' } as const;
    expect(withReading(over, {}, '14:02').chip.text).toBe('over ceiling 112: recheck');
    expect(withReading(over, {}, '14:02').isOver).toBe(true);
  });

  it('tells when and what was read last, and for how long the patient has exercised', () => {
    const readings = [
      sampleReading(10, { measuredAt: at('14:00').toISOString(), systolic: 138, diastolic: 76 }),
      sampleReading(11, {
        measuredAt: at('14:06').toISOString(),
        heartRate: 106,
        perceivedExertion: 13,
      }),
    ];
    expect(tile({ readings }, '14:10').last).toEqual(['at 9:06', 'RPE 13', '138/76', '10 min']);
  });

  it('stops the minutes at recovery', () => {
    const readings = [
      sampleReading(10, { measuredAt: at('14:00').toISOString() }),
      sampleReading(11, { phase: 'recovery', measuredAt: at('14:20').toISOString() }),
    ];
    expect(tile({ readings }, '14:40').last).toContain('20 min');
  });

  it('goes by the correction, not by what was corrected', () => {
    const readings = [
      sampleReading(10, { heartRate: 190, status: 'amended', placement: 'over-ceiling' }),
      sampleReading(11, { heartRate: 109, amends: sampleReading(10).id, placement: 'above' }),
    ];
    expect(tile({ readings })).toMatchObject({ rate: 109, isOver: false });
    const struck = [
      readings[0]!,
      sampleReading(12, { heartRate: null, status: 'entered-in-error' }),
    ];
    expect(tile({ readings: struck }).rate).toBeNull();
  });

  it('names what stands out', () => {
    const item = { icd: { status: 'present', lowestRate: 132 }, flags: ['insulin'] } as const;
    expect(tile({ ...item, flags: [...item.flags] }).flags).toEqual([
      'ceiling 112',
      'ICD 132',
      'insulin',
    ]);
    expect(tile({ ceiling: null }).flags).toEqual(['no ceiling']);
  });
});

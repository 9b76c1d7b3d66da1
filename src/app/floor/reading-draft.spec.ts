import {
  canSave,
  emptyDraft,
  erased,
  faultsOf,
  isEmpty,
  nextField,
  padFields,
  pressed,
  rateOf,
  typed,
  valuesOf,
  withSymptom,
  type ReadingDraft,
} from './reading-draft';

const press = (draft: ReadingDraft, keys: string): ReadingDraft =>
  [...keys].reduce((now, key) => (key === '>' ? nextField(now) : pressed(now, key)), draft);
const draft = emptyDraft('exercise');

describe('the number pad', () => {
  it('takes rate, pressure, effort and oxygen one after the other', () => {
    const full = press(draft, '112>138>76>12>97>');
    expect(valuesOf(full)).toEqual({
      heartRate: 112,
      systolic: 138,
      diastolic: 76,
      perceivedExertion: 12,
      oxygenSaturation: 97,
    });
    expect(full.active).toBeNull();
    expect(pressed(full, '1')).toEqual(full);
    expect(canSave(full)).toBe(true);
  });

  it('takes no leading zero, no letter and no digit too many', () => {
    expect(press(draft, '0').digits.heartRate).toBe('');
    expect(press(draft, '1124').digits.heartRate).toBe('112');
    expect(typed(draft, 'perceivedExertion', '1a35').digits.perceivedExertion).toBe('13');
  });

  it('takes a digit back', () => {
    expect(erased(press(draft, '112')).digits.heartRate).toBe('11');
    expect(erased(draft).digits.heartRate).toBe('');
  });

  it('reads a rate only once it can be one', () => {
    expect(rateOf(press(draft, '12'))).toBeNull();
    expect(rateOf(press(draft, '127'))).toBe(127);
    expect(rateOf(press(draft, '900'))).toBeNull();
  });

  it('leaves out what was not taken', () => {
    expect(valuesOf(press(draft, '98'))).toEqual({ heartRate: 98 });
    expect(isEmpty(draft)).toBe(true);
    expect(canSave(draft)).toBe(false);
    expect(canSave({ ...draft, note: '  ' })).toBe(false);
  });
});

describe('what keeps a reading from being saved', () => {
  it.each([
    ['heartRate', '19', 'Enter 20 to 300'],
    ['heartRate', '301', 'Enter 20 to 300'],
    ['perceivedExertion', '5', 'Enter 6 to 20'],
    ['oxygenSaturation', '101', 'Enter 50 to 100'],
  ] as const)('%s of %s', (field, text, fault) => {
    const wrong = typed(draft, field, text);
    expect(faultsOf(wrong)).toEqual({ [field]: fault });
    expect(canSave(wrong)).toBe(false);
  });

  it('a diastolic that is not below the systolic, or stands alone', () => {
    const both = typed(typed(draft, 'systolic', '120'), 'diastolic', '120');
    expect(faultsOf(both)).toEqual({ diastolic: 'Must be below systolic' });
    expect(faultsOf(typed(draft, 'diastolic', '80'))).toEqual({
      systolic: 'Enter the systolic too',
    });
    expect(canSave(typed(draft, 'systolic', '120'))).toBe(true);
  });

  it('nothing else: every field alone is enough', () => {
    for (const field of padFields.filter((one) => one !== 'diastolic')) {
      expect(canSave(typed(draft, field, field === 'perceivedExertion' ? '12' : '98'))).toBe(true);
    }
  });
});

describe('symptoms', () => {
  it('tell *not asked* from *none*, and none from any', () => {
    expect(valuesOf(draft)).toEqual({});
    const none = withSymptom(draft, 'none');
    expect(valuesOf(none)).toEqual({ symptoms: ['none'] });
    const dizzy = withSymptom(none, 'dizziness');
    expect(dizzy.symptoms).toEqual(['dizziness']);
    expect(withSymptom(dizzy, 'nausea').symptoms).toEqual(['dizziness', 'nausea']);
    expect(withSymptom(dizzy, 'none').symptoms).toEqual(['none']);
    expect(withSymptom(dizzy, 'dizziness').symptoms).toBeNull();
  });
});

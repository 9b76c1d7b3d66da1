import { FormArray, FormControl, FormGroup } from '@angular/forms';
import * as z from 'zod';
import { fieldErrorOf, showFieldErrors, zodValidator } from './zod-validator';

describe('zodValidator', () => {
  it('tells the contract’s own words', () => {
    const control = new FormControl(250, zodValidator(z.number().max(200, 'At most 200')));
    expect(fieldErrorOf(control)).toBe('At most 200');
    control.setValue(180);
    expect(fieldErrorOf(control)).toBeNull();
  });
});

describe('showFieldErrors', () => {
  const form = new FormGroup({
    resting: new FormGroup({ seated: new FormControl(62) }),
    thresholds: new FormArray([new FormGroup({ heartRate: new FormControl(118) })]),
  });

  it('puts each beside its field and returns the others', () => {
    const elsewhere = { path: 'risk', message: 'Unknown' };
    const rest = showFieldErrors(form, [
      { path: 'resting.seated', message: 'Below the peak' },
      { path: 'thresholds.0.heartRate', message: 'From 40' },
      elsewhere,
    ]);
    expect(rest).toEqual([elsewhere]);
    expect(fieldErrorOf(form.controls.resting.controls.seated)).toBe('Below the peak');
    expect(form.get('thresholds.0.heartRate')?.touched).toBe(true);
  });

  it('is gone when the value changes', () => {
    const { seated } = form.controls.resting.controls;
    seated.setValue(70);
    expect(fieldErrorOf(seated)).toBeNull();
  });
});

import { TestBed } from '@angular/core/testing';
import fc from 'fast-check';
import { defaultPolicy, evaluatePrescription } from '@shared/clinical/prescribing';
import { prescriptionRequestSchema } from '@shared/contracts/prescriptions-contract';
import { prescriptionRequest } from '../../../../test/builders/prescription-request';
import { anyPrescriptionInput } from '../../../../test/builders/prescription-request-arbitrary';
import { WorksheetState } from './worksheet-state';

describe('WorksheetState', () => {
  let state: WorksheetState;
  beforeEach(() => {
    TestBed.configureTestingModule({ providers: [WorksheetState] });
    state = TestBed.inject(WorksheetState);
    state.start(prescriptionRequest(), defaultPolicy);
  });

  it('holds any request whole, and comes to what the engine says of it', () => {
    fc.assert(
      fc.property(anyPrescriptionInput, (input) => {
        const request = prescriptionRequestSchema.parse(input);
        state.start(request, defaultPolicy);
        expect(state.value()).toEqual(input);
        expect(state.changed()).toBe(false);
        const evaluation = evaluatePrescription(request, defaultPolicy);
        expect(state.answer()).toEqual(evaluation.ok ? evaluation.answer : null);
        expect(state.errors().map(({ path }) => path)).toEqual(
          evaluation.ok ? [] : [evaluation.error.path],
        );
      }),
      { numRuns: 200 },
    );
  });

  it('works out anew at each change', () => {
    state.form.controls.resting.controls.seated.setValue(70);
    expect(state.answer()?.target).toEqual({ lower: 96, upper: 108 });
    expect(state.changed()).toBe(true);
    state.keep();
    expect(state.changed()).toBe(false);
  });

  it('keeps the last answer while a field is at fault, and says which', () => {
    const { seated } = state.form.controls.resting.controls;
    seated.setValue('x');
    expect(state.answer()).toBeNull();
    expect(state.lastAnswer()?.target).toEqual({ lower: 91, upper: 108 });
    expect(state.errors()).toMatchObject([{ path: 'resting.seated' }]);
    expect(seated.errors).toEqual({ rule: expect.stringContaining('Seated resting rate') });
    seated.setValue(62);
    expect(seated.errors).toBeNull();
    expect(state.answer()).not.toBeNull();
  });

  it('puts a fault between two fields beside the one to mend', () => {
    state.form.controls.resting.controls.seated.setValue(130);
    state.form.controls.test.controls.peakHeartRate.setValue(128);
    expect(state.errors().map(({ path }) => path)).toEqual(['test.peakHeartRate']);
    expect(state.form.controls.test.controls.peakHeartRate.invalid).toBe(true);
    state.form.controls.resting.controls.seated.setValue(62);
    expect(state.form.controls.test.controls.peakHeartRate.invalid).toBe(false);
  });

  it('takes a part away and brings it back, and zones only with a defibrillator', () => {
    state.setPart('test', false);
    expect(state.request()?.test).toBeNull();
    expect(state.answer()?.leadBy).toBe('perceived-exertion');
    state.setPart('intensity', true, { lower: 0.4, upper: 0.6 });
    expect(state.request()?.intensity).toEqual({ lower: 0.4, upper: 0.6 });
    const { status, zones } = state.form.controls.devices.controls.icd.controls;
    status.setValue('present');
    state.addZone();
    expect(state.request()).toBeNull();
    zones.at(0).setValue({ rate: 150, kind: 'shock' });
    expect(state.request()?.devices.icd.zones).toEqual([{ rate: 150, kind: 'shock' }]);
    status.setValue('none');
    expect(state.request()?.devices.icd.zones).toEqual([]);
  });

  it('takes a part back from the record', () => {
    state.form.controls.resting.controls.seated.setValue(80);
    state.form.controls.programWeek.setValue(9);
    state.takeFrom(prescriptionRequest(), ['resting']);
    expect(state.request()).toMatchObject({ resting: { seated: 62 }, programWeek: 9 });
  });
});

import { describe, expect, it } from 'vitest';
import { answerTo, withTest, withoutTest } from '../../../test/builders/prescription-request';
import type { Change } from '../../../test/builders/prescription-request';
import type { ReasonCode } from './answer';
import { rhythms } from './request';

const unusable = withTest({ sameRateActingDrugs: false });

describe('whether heart rate can lead', () => {
  it.each(rhythms)('in %s', (rhythm) => {
    const leads = ['sinus', 'sinus-tracked', 'sensor-paced'].includes(rhythm);
    const answer = answerTo((input) => (input.rhythm = rhythm));
    expect(answer.leadBy).toBe(leads ? 'heart-rate' : 'perceived-exertion');
    expect(answer.reasons).toEqual(leads ? [] : ['rhythm']);
  });

  it.each<[string, Change[], ReasonCode[]]>([
    [
      'sensor-paced without a usable test',
      [(i) => (i.rhythm = 'sensor-paced'), unusable],
      ['rhythm'],
    ],
    ['an assist device', [(i) => (i.conditions.ventricularAssistDevice = true)], ['assist-device']],
    ['a denervated transplant', [(i) => (i.conditions.transplant = 'denervated')], ['transplant']],
    [
      'a recovered transplant with a usable test',
      [(i) => (i.conditions.transplant = 'recovered')],
      [],
    ],
    [
      'a recovered transplant without one',
      [(i) => (i.conditions.transplant = 'recovered'), unusable],
      ['transplant'],
    ],
    [
      'chronotropic incompetence',
      [(i) => (i.conditions.chronotropicIncompetence = true)],
      ['chronotropic-incompetence'],
    ],
    ['outflow obstruction', [(i) => (i.conditions.outflowObstruction = true)], ['physician-sets']],
    [
      'an ICD without known rates',
      [(i) => (i.devices.icd = { status: 'present', zones: [] })],
      ['icd-rate-unknown'],
    ],
    [
      'an ICD of which nobody knows',
      [(i) => (i.devices.icd = { status: 'unknown', zones: [] })],
      ['icd-rate-unknown'],
    ],
    [
      'an ICD with known rates',
      [(i) => (i.devices.icd = { status: 'present', zones: [{ rate: 170, kind: 'shock' }] })],
      [],
    ],
    ['a spread at the limit', [(i) => (i.resting.spread = 10)], []],
    ['a spread above it', [(i) => (i.resting.spread = 10.5)], ['resting-rate-unstable']],
    ['a spread not measured', [(i) => (i.resting.spread = null)], []],
    ['a reserve under the minimum', [withTest({ peakHeartRate: 86.5 })], ['reserve-too-small']],
    [
      'a small reserve in a test that is not usable',
      [withTest({ peakHeartRate: 80, endedBy: 'claudication' })],
      ['no-usable-test'],
    ],
    ['no test', [withoutTest], ['no-usable-test']],
  ])('%s', (_case, changes, reasons) => {
    expect(answerTo(changes).reasons).toEqual(reasons);
  });

  it('takes a reserve of exactly the minimum, where only the range may be too narrow', () => {
    const answer = answerTo([withTest({ peakHeartRate: 87 }), (i) => (i.thresholds = [])]);
    expect(answer.target).toEqual({ lower: 72, upper: 82 });
  });

  it('lists every reason in one order, and no-usable-test only when nothing else blocks', () => {
    const answer = answerTo([
      withoutTest,
      (i) => (i.resting.spread = 30),
      (i) => (i.devices.icd.status = 'unknown'),
      (i) => {
        Object.assign(i.conditions, {
          outflowObstruction: true,
          chronotropicIncompetence: true,
          transplant: 'recovered',
          ventricularAssistDevice: true,
        });
      },
      (i) => (i.rhythm = 'atrial-fibrillation'),
      (i) => (i.choice.method = 'perceived-exertion'),
    ]);
    expect(answer.reasons).toEqual([
      'rhythm',
      'assist-device',
      'transplant',
      'chronotropic-incompetence',
      'physician-sets',
      'icd-rate-unknown',
      'resting-rate-unstable',
      'chosen',
    ]);
  });

  it('clears all that belongs to a leading rate when effort leads, and keeps the ceiling', () => {
    const answer = answerTo((i) => (i.rhythm = 'atrial-fibrillation'));
    expect(answer).toMatchObject({
      leadBy: 'perceived-exertion',
      method: 'perceived-exertion',
      maximum: null,
      target: null,
      patientTarget: null,
      tenSecondCount: null,
      askLine: null,
      guide: null,
      ceiling: { value: 108, bindingLimits: ['ischemia'] },
      outerLimit: 134,
    });
  });
});

import { describe, expect, it } from 'vitest';
import {
  answerTo,
  withTest,
  withoutTest,
  withoutThresholds,
} from '../../../test/builders/prescription-request';
import type { Change } from '../../../test/builders/prescription-request';
import { cautionSeverity } from './answer';
import type { CautionCode } from './answer';

const codesOf = (...changes: Change[]): CautionCode[] =>
  answerTo(changes).cautions.map(({ code }) => code);

const present: Change = (i) =>
  (i.devices.icd = { status: 'present', zones: [{ rate: 170, kind: 'shock' }] });

describe('cautions', () => {
  it.each<[CautionCode, Change[], Change[]]>([
    ['icd-rate-unknown', [(i) => (i.devices.icd.status = 'unknown')], [present]],
    ['physician-sets', [(i) => (i.conditions.outflowObstruction = true)], []],
    ['no-valid-range', [(i) => (i.intensity = { lower: 0.4, upper: 0.41 })], []],
    ['test-not-usable', [withTest({ endedBy: 'protocol-end' })], [withoutTest]],
    ['estimated-maximum', [withoutTest, (i) => (i.choice.maximum = 'brawner')], [withoutTest]],
    ['no-ceiling-known', [withoutThresholds], []],
    ['ceiling-below-intensity', [], [withoutThresholds]],
    ['work-ceiling-unknown', [withoutTest], [withoutTest, withoutThresholds]],
    [
      'icd-present',
      [(i) => (i.devices.icd.status = 'present')],
      [(i) => (i.devices.icd.status = 'unknown')],
    ],
    ['tracking-limit', [(i) => (i.devices.upperTrackingRate = 150)], []],
    [
      'heart-rate-unreliable',
      [(i) => (i.rhythm = 'frequent-ectopy')],
      [(i) => (i.devices.icd.status = 'unknown')],
    ],
    [
      'heart-rate-unreliable',
      [(i) => (i.conditions.ventricularAssistDevice = true)],
      [withTest({ peakHeartRate: 80 })],
    ],
    [
      'heart-rate-unreliable',
      [(i) => (i.conditions.transplant = 'denervated')],
      [(i) => (i.conditions.transplant = 'recovered')],
    ],
    [
      'heart-rate-unreliable',
      [(i) => (i.conditions.chronotropicIncompetence = true)],
      [(i) => (i.conditions.outflowObstruction = true)],
    ],
    ['heart-rate-unreliable', [(i) => (i.resting.spread = 11)], [(i) => (i.resting.spread = 10)]],
    ['silent-ischemia-possible', [(i) => (i.conditions.autonomicNeuropathy = true)], []],
    ['silent-ischemia-possible', [(i) => (i.conditions.transplant = 'recovered')], []],
    ['claudication-leads', [(i) => (i.conditions.peripheralArteryDisease = true)], []],
    ['pressure-ceiling', [(i) => (i.conditions.dissection = true)], []],
    ['oxygen-floor', [(i) => (i.conditions.pulmonaryHypertension = true)], []],
    ['resting-plus-underdoses', [withoutTest], [withTest({})]],
    ['resting-plus-underdoses', [(i) => (i.choice.method = 'resting-plus')], []],
    ['low-capacity', [withTest({ peakVo2: 17.4 })], [withTest({ peakVo2: 17.5 })]],
    [
      'estimated-vo2-runs-high',
      [withTest({ vo2Source: 'estimated' })],
      [withTest({ vo2Source: 'estimated', eventSince: true })],
    ],
    ['equation-out-of-range', [], [withTest({ peakVo2: null })]],
    ['defer-to-local-policy', [], []],
  ])('%s', (code, due, notDue) => {
    expect(codesOf(...due)).toContain(code);
    if (notDue.length > 0) expect(codesOf(...notDue)).not.toContain(code);
  });

  it('stand in the order of the list, each once, with its severity and a message', () => {
    const { cautions } = answerTo([
      (i) => {
        Object.assign(i.conditions, {
          outflowObstruction: true,
          autonomicNeuropathy: true,
          peripheralArteryDisease: true,
          pulmonaryHypertension: true,
          dissection: true,
          chronotropicIncompetence: true,
        });
        i.rhythm = 'atrial-flutter';
        i.devices = { icd: { status: 'present', zones: [] }, upperTrackingRate: 130 };
      },
      withTest({ sameRateActingDrugs: false, peakVo2: 15, vo2Source: 'estimated' }),
    ]);
    expect(cautions.map(({ code }) => code)).toEqual([
      'icd-rate-unknown',
      'physician-sets',
      'test-not-usable',
      'icd-present',
      'tracking-limit',
      'heart-rate-unreliable',
      'silent-ischemia-possible',
      'claudication-leads',
      'pressure-ceiling',
      'oxygen-floor',
      'low-capacity',
      'estimated-vo2-runs-high',
      'defer-to-local-policy',
    ]);
    for (const { code, severity, message } of cautions) {
      expect(severity).toBe(cautionSeverity[code]);
      expect(message.length).toBeGreaterThan(10);
    }
  });

  it('names the error of an estimate where there is one', () => {
    const messageFor = (maximum: 'gellish' | 'tanaka') =>
      answerTo([
        withoutTest,
        (i) => (i.rateActingDrugs = []),
        (i) => (i.choice.maximum = maximum),
      ]).cautions.find(({ code }) => code === 'estimated-maximum')?.message;
    expect(messageFor('tanaka')).toContain('11.4');
    expect(messageFor('gellish')).not.toContain('standard error');
  });
});

describe('the other ceilings', () => {
  it('stand beside the heart rate with their condition alone', () => {
    expect(answerTo()).toMatchObject({ pressureCeiling: null, oxygenFloor: null });
    const both = answerTo((i) => {
      i.conditions.dissection = true;
      i.conditions.pulmonaryHypertension = true;
    });
    expect(both).toMatchObject({
      pressureCeiling: { systolic: 150, diastolic: 90 },
      oxygenFloor: 88,
    });
  });
});

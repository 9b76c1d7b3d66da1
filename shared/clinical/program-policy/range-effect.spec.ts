import { expect, it } from 'vitest';
import {
  prescriptionRequest,
  withTest,
  withoutTest,
} from '../../../test/builders/prescription-request';
import { bpm } from '../../units';
import { defaultPolicy } from '../prescribing';
import { rangeEffect } from './range-effect';

const withMargin = (ischemia: number) => ({
  ...defaultPolicy,
  version: 2,
  margin: { ...defaultPolicy.margin, ischemia: bpm(ischemia) },
});

it('tells what changes, and to what', () => {
  const effect = rangeEffect(prescriptionRequest(), defaultPolicy, withMargin(15));
  expect(effect).toMatchObject({
    after: { target: { lower: 91, upper: 103 }, ceiling: 103 },
    why: null,
  });
  expect(effect?.parts).toEqual(expect.arrayContaining(['range', 'ceiling']));
});

it('is none where nothing that one reads is touched, the version aside', () => {
  const angina = {
    ...defaultPolicy,
    version: 2,
    margin: { ...defaultPolicy.margin, angina: bpm(30) },
  };
  expect(rangeEffect(prescriptionRequest(), defaultPolicy, angina)).toBeNull();
});

it('tells the ask line and the reviewed work alone', () => {
  const asked = { ...defaultPolicy, askLine: { above: bpm(5) } };
  const request = prescriptionRequest((it) => (it.thresholds = []));
  expect(rangeEffect(request, defaultPolicy, asked)?.parts).toEqual(['ask-line']);
});

it('says why a choice would not apply any more, and lets effort lead where nothing is left', () => {
  const short = { ...defaultPolicy, test: { validDays: 30 } };
  const old = prescriptionRequest(withTest({ daysAgo: 60 }));
  expect(rangeEffect(old, defaultPolicy, short)?.after?.leadBy).toBe('perceived-exertion');
  const chosen = prescriptionRequest(
    withTest({ daysAgo: 60 }),
    (it) => (it.choice = { method: 'heart-rate-reserve', maximum: 'measured' }),
  );
  const effect = rangeEffect(chosen, defaultPolicy, short);
  expect(effect).toMatchObject({ after: null, why: expect.any(String) });
  expect(rangeEffect(prescriptionRequest(withoutTest), defaultPolicy, short)).toBeNull();
});

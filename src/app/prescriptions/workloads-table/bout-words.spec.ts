import {
  answerTo,
  type Change,
  withoutThresholds,
} from '../../../../test/builders/prescription-request';
import { boutWords } from './bout-words';

describe('what a range says of bouts', () => {
  it.each<[string, Change[], string[]]>([
    ['nothing in the plain case', [withoutThresholds], []],
    [
      'no intervals with pulmonary hypertension',
      [withoutThresholds, (it) => (it.conditions.pulmonaryHypertension = true)],
      ['No intervals: pulmonary hypertension.'],
    ],
    [
      'no intervals with an assist device',
      [withoutThresholds, (it) => (it.conditions.ventricularAssistDevice = true)],
      ['No intervals: assist device, effort stays at 11–13.'],
    ],
  ])('%s', (_case, changes, words) => {
    expect(boutWords(answerTo(changes))).toEqual(words);
  });

  it('intermittent bouts under 3 METs', () => {
    const low: Change = (it) => it.test && (it.test.peakVo2 = 9);
    expect(boutWords(answerTo([withoutThresholds, low]))[0]).toContain('3 of 5 minutes');
  });
});

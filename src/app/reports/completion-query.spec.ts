import { convertToParamMap } from '@angular/router';
import { callOf, choicesOf, paramsOf, ripeSpan } from './completion-query';

const today = '2026-12-01';

describe('the choices of the completion report', () => {
  it('begin with first sessions whose 36 weeks have passed', () => {
    expect(ripeSpan(today)).toEqual({ from: '2025-11-01', to: '2026-03-23' });
  });

  it('come back from the address as they went into it', () => {
    const choices = choicesOf(
      convertToParamMap({ from: '2026-01-01', to: '2026-06-30', by: 'month', sex: 'female' }),
      today,
    );
    expect(choicesOf(convertToParamMap(paramsOf(choices)), today)).toEqual(choices);
  });

  it('fall back on the usual ones where the address holds nonsense', () => {
    const choices = choicesOf(convertToParamMap({ from: 'yesterday', by: 'color' }), today);
    expect(choices).toMatchObject({ from: '2025-11-01', groupBy: 'diagnosis' });
  });

  it('ask for the day after the last one that counts, and for no filter that is not set', () => {
    const choices = choicesOf(convertToParamMap({ to: '2026-02-28' }), today);
    expect(callOf(choices)).toEqual({ from: '2025-11-01', to: '2026-03-01', groupBy: 'diagnosis' });
  });
});

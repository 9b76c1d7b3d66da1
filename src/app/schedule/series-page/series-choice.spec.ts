import type { PlannedDate } from '@shared/contracts/schedule-contract';
import { chosenIds, freeAlternatives, initialChoice } from './series-choice';

const date = (localDate: string, given: Partial<PlannedDate>): PlannedDate => ({
  classDateId: `${localDate} at nine`,
  localDate,
  startsAt: `${localDate}T14:00:00Z`,
  conflict: null,
  alternatives: [],
  ...given,
});

const afternoon = { classDateId: 'afternoon', startsAt: '2026-12-09T19:00:00Z' };
const plan = [
  date('2026-12-07', {}),
  date('2026-12-09', { conflict: 'class-full', alternatives: [afternoon] }),
  date('2026-12-11', { conflict: 'class-closed', classDateId: null, alternatives: [afternoon] }),
];

describe('the choice of a series', () => {
  it('begins with what is free and leaves out what is not', () => {
    const choice = initialChoice(plan);
    expect(chosenIds(plan, choice)).toEqual(['2026-12-07 at nine']);
  });

  it('takes an alternative once', () => {
    const choice = { ...initialChoice(plan), '2026-12-09': 'afternoon' };
    expect(chosenIds(plan, choice)).toEqual(['2026-12-07 at nine', 'afternoon']);
    expect(freeAlternatives(plan[1]!, choice)).toEqual([afternoon]);
    expect(freeAlternatives(plan[2]!, choice)).toEqual([]);
  });
});

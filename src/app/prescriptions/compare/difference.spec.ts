import { changeOf, paired } from './difference';

describe('what became of a fact', () => {
  it.each<[string | null, string | null, string | null]>([
    [null, null, null],
    ['62 bpm', '62 bpm', null],
    ['62 bpm', '68 bpm', '6 higher'],
    ['22.4 mL/kg/min', '20 mL/kg/min', '2.4 lower'],
    ['91–108 bpm', '95–108 bpm', 'changed'],
    ['62 bpm', '1.2 METs', 'changed'],
    ['Yes', 'No', 'changed'],
    [null, '108 bpm', 'new'],
    ['108 bpm', null, 'gone'],
  ])('from %s to %s: %s', (before, after, change) => {
    expect(changeOf(before, after)).toBe(change);
  });

  it('pairs two lists by kind, a second one with the second', () => {
    const pairs = paired(['a1', 'a2', 'b1'], ['a3', 'c1', 'a4'], (item) => item.charAt(0));
    expect(pairs).toEqual([
      { before: 'a1', after: 'a3' },
      { before: 'a2', after: 'a4' },
      { before: 'b1', after: null },
      { before: null, after: 'c1' },
    ]);
  });
});

import { nextMilestone } from './next-milestone';

it.each([
  [0, 36, 1, 'your first session'],
  [1, 36, 9, 'a quarter of the way'],
  [8, 36, 9, 'a quarter of the way'],
  [9, 36, 18, 'half way'],
  [18, 36, 27, 'three quarters of the way'],
  [27, 36, 36, 'all of your planned sessions'],
  [35, 36, 36, 'all of your planned sessions'],
  [1, 2, 2, 'all of your planned sessions'],
  [0, 1, 1, 'your first session'],
])('after %i of %i comes number %i, %s', (done, planned, at, words) => {
  expect(nextMilestone(done, planned)).toEqual({ at, words });
});

it.each([
  [36, 36],
  [40, 36],
  [1, 1],
])('after %i of %i nothing is left', (done, planned) => {
  expect(nextMilestone(done, planned)).toBeNull();
});

import type { Role } from '@shared/contracts/accounts-contract';

/** Who reads how a course goes. */
export const progressionReaders: readonly Role[] = ['nurse', 'exercise-physiologist', 'physician'];

/** Who decides on the next step. */
export const progressionDeciders: readonly Role[] = ['exercise-physiologist', 'physician'];

import type { Role } from '@shared/contracts/accounts-contract';

/** Who reads the program's measures, each for the sites that are theirs. */
export const reportRoles: readonly Role[] = ['director', 'physician', 'exercise-physiologist'];

/** Who says how the program defines a measure. */
export const definitionRoles: readonly Role[] = ['director', 'administrator'];

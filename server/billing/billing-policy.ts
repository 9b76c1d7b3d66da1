import type { Role } from '@shared/contracts/accounts-contract';

/** Who takes payments and answers questions about them. */
export const billingRoles: readonly Role[] = ['front-desk', 'director'];

/** Who opens a pay page for a patient who stands at the desk; a patient opens their own. */
export const checkoutRoles: readonly Role[] = ['front-desk'];

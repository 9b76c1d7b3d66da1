import type { Role } from '@shared/contracts/accounts-contract';

/** What a role is called on pages. */
export const roleNames: Readonly<Record<Role, string>> = {
  patient: 'Patient',
  nurse: 'Nurse',
  'exercise-physiologist': 'Exercise physiologist',
  physician: 'Physician',
  'front-desk': 'Front desk',
  director: 'Program director',
  administrator: 'Administrator',
};

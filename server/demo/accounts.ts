import type { DemoAccount } from '@shared/contracts/accounts-contract';
import type { role } from '../database/schema';

type Role = (typeof role.enumValues)[number];

/** The password of every account of the demonstration; it is printed at each start and opens nothing else. */
export const demoPassword = 'Harbor-Lane-36-steps';

export type SiteKey = 'quayside' | 'mill-street';

export interface StaffMember {
  readonly key: string;
  readonly email: string;
  readonly displayName: string;
  readonly roles: readonly Role[];
  readonly sites: readonly SiteKey[];
}

const both: readonly SiteKey[] = ['quayside', 'mill-street'];

/** The program's ten: the six that the demonstration hands out, and four colleagues at one site each. */
export const staff = [
  {
    key: 'physiologist',
    email: 'physiologist@harborlane.example',
    displayName: 'Maren Thistlewood',
    roles: ['exercise-physiologist'],
    sites: both,
  },
  {
    key: 'nurse',
    email: 'nurse@harborlane.example',
    displayName: 'Oluwaseun Hatherleigh',
    roles: ['nurse'],
    sites: both,
  },
  {
    key: 'physician',
    email: 'physician@harborlane.example',
    displayName: 'Dr. Ines Quartermayne',
    roles: ['physician'],
    sites: both,
  },
  {
    key: 'front-desk',
    email: 'frontdesk@harborlane.example',
    displayName: 'Tobias Lanternier',
    roles: ['front-desk'],
    sites: both,
  },
  {
    key: 'director',
    email: 'director@harborlane.example',
    displayName: 'Rukmini Eldergate',
    roles: ['director'],
    sites: both,
  },
  {
    key: 'administrator',
    email: 'admin@harborlane.example',
    displayName: 'Casper Nordenfall',
    roles: ['administrator'],
    sites: both,
  },
  {
    key: 'second-physiologist',
    email: 'k.haldorsson@harborlane.example',
    displayName: 'Kári Haldorsson',
    roles: ['exercise-physiologist'],
    sites: ['mill-street'],
  },
  {
    key: 'second-nurse',
    email: 'p.zubiaurre@harborlane.example',
    displayName: 'Pilar Zubiaurre',
    roles: ['nurse'],
    sites: ['mill-street'],
  },
  {
    key: 'second-physician',
    email: 'j.makhubela@harborlane.example',
    displayName: 'Dr. Joyous Makhubela',
    roles: ['physician'],
    sites: ['mill-street'],
  },
  {
    key: 'charge-nurse',
    email: 'd.weatherlow@harborlane.example',
    displayName: 'Dorothea Weatherlow',
    roles: ['nurse', 'front-desk'],
    sites: ['quayside'],
  },
] as const satisfies readonly StaffMember[];

export type StaffKey = (typeof staff)[number]['key'];

/** The patient who has an account: in the middle of a course, with a range, bookings and an open charge. */
export const patientAccount = {
  email: 'patient@harborlane.example',
  givenName: 'Marisol',
  familyName: 'Castañeira',
} as const;

const handedOut: readonly (readonly [StaffKey, label: string])[] = [
  ['physiologist', 'Exercise physiologist'],
  ['nurse', 'Nurse'],
  ['physician', 'Physician, medical director'],
  ['front-desk', 'Front desk'],
  ['director', 'Program director'],
  ['administrator', 'Administrator'],
];

/** The accounts that are handed out, in the order in which a day's work passes through them. */
export const demoAccounts: readonly DemoAccount[] = [
  ...handedOut.map(([key, label]) => {
    const email = staff.find((member) => member.key === key)?.email ?? '';
    return { label, email, password: demoPassword };
  }),
  { label: 'Patient', email: patientAccount.email, password: demoPassword },
];

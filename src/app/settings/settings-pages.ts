import { type Area, staff } from '../core/navigation';

export interface SettingsPage extends Area {
  readonly about: string;
}

/** The pages of Settings; the server decides again on every call. */
export const settingsPages: readonly SettingsPage[] = [
  {
    path: '/settings/people',
    label: 'People',
    icon: 'group',
    about: 'Accounts: who may sign in, as what, and at which sites.',
    roles: ['administrator'],
  },
  {
    path: '/settings/sites',
    label: 'Sites',
    icon: 'place',
    about: 'Where classes are held, and in which time zone.',
    roles: ['administrator'],
  },
  {
    path: '/settings/policy',
    label: 'Prescribing policy',
    icon: 'tune',
    about: 'The numbers that ranges are worked out by, with their sources.',
    roles: ['administrator', 'physician', 'exercise-physiologist'],
  },
  {
    path: '/settings/audit',
    label: 'Audit',
    icon: 'history',
    about: 'Who read or changed which record, and when.',
    roles: ['administrator'],
  },
  {
    path: '/api-reference',
    label: 'API reference',
    icon: 'description',
    about: 'For those who connect other programs: every call, who may make it, its fields.',
    roles: staff,
  },
];

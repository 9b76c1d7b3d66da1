import type { Role } from '@shared/contracts/accounts-contract';
import type { IconName } from '../ui/icon/icon-names';

/** A part of the product that has a place in the rail. */
export interface Area {
  /** The route, without the leading slash. */
  readonly path: string;
  readonly label: string;
  readonly icon: IconName;
  /** Who may open it; the server decides again on every call. */
  readonly roles: readonly Role[];
}

/** Everyone but patients; written out, so that the contract's zod stays out of the first chunk. */
export const staff: readonly Role[] = [
  'nurse',
  'exercise-physiologist',
  'physician',
  'front-desk',
  'director',
  'administrator',
];

/** Every area, in the order of the rail. One whose route is missing from app.routes.ts is not shown. */
export const areas = [
  {
    path: 'today',
    label: 'Today',
    icon: 'event-available',
    roles: ['exercise-physiologist', 'physician', 'nurse', 'front-desk'],
  },
  {
    path: 'patients',
    label: 'Patients',
    icon: 'group',
    roles: ['exercise-physiologist', 'physician', 'nurse', 'front-desk'],
  },
  {
    path: 'schedule',
    label: 'Schedule',
    icon: 'calendar-month',
    roles: [
      'front-desk',
      'exercise-physiologist',
      'physician',
      'nurse',
      'director',
      'administrator',
    ],
  },
  {
    path: 'floor',
    label: 'Floor',
    icon: 'monitor-heart',
    roles: ['nurse', 'exercise-physiologist', 'physician'],
  },
  { path: 'billing', label: 'Billing', icon: 'receipt', roles: ['front-desk', 'director'] },
  {
    path: 'reports',
    label: 'Reports',
    icon: 'bar-chart',
    roles: ['director', 'physician', 'exercise-physiologist'],
  },
  {
    path: 'settings',
    label: 'Settings',
    icon: 'tune',
    roles: ['administrator', 'physician', 'exercise-physiologist'],
  },
  { path: 'my/sessions', label: 'My sessions', icon: 'event', roles: ['patient'] },
  { path: 'my/range', label: 'My range', icon: 'favorite', roles: ['patient'] },
  { path: 'my/progress', label: 'My progress', icon: 'trending-up', roles: ['patient'] },
  { path: 'my/payments', label: 'Payments', icon: 'payments', roles: ['patient'] },
  { path: 'my/details', label: 'My details', icon: 'badge', roles: ['patient'] },
] as const satisfies readonly Area[];

export type AreaPath = (typeof areas)[number]['path'];

/** The page of a role's first task of the day; who holds several roles starts at the first of these. */
const firstTasks: readonly (readonly [Role, AreaPath])[] = [
  ['nurse', 'floor'],
  ['exercise-physiologist', 'today'],
  ['physician', 'today'],
  ['front-desk', 'today'],
  ['director', 'reports'],
  ['administrator', 'settings'],
  ['patient', 'my/sessions'],
];

export function areaOf(path: AreaPath): Area {
  const area = areas.find((one) => one.path === path);
  if (area === undefined) throw new Error(`No area has the path ${path}`);
  return area;
}

export function mayOpen(area: Pick<Area, 'roles'>, roles: readonly Role[]): boolean {
  return area.roles.some((role) => roles.includes(role));
}

/** The areas that someone with these roles may open, among the routes that there are. */
export function areasFor(roles: readonly Role[], routed: readonly string[]): readonly Area[] {
  return areas.filter((area) => routed.includes(area.path) && mayOpen(area, roles));
}

/** Where someone with these roles lands, as an absolute path; `/not-allowed` when nothing is open to them. */
export function landingFor(roles: readonly Role[], routed: readonly string[]): string {
  const first = firstTasks.find(([role, path]) => roles.includes(role) && routed.includes(path));
  const path = first?.[1] ?? areasFor(roles, routed)[0]?.path ?? 'not-allowed';
  return `/${path}`;
}

import type { Routes } from '@angular/router';
import { allow } from '../core/access-guard';

/** For administrators alone; the others of this area read the policy, and the medical director changes it. */
const kept: Routes = [
  ...['people', 'people/patients'].map((path) => ({
    path,
    title: 'People',
    data: { who: path === 'people' ? 'staff' : 'patients' },
    loadComponent: async () => (await import('./people-page/people-page')).PeoplePage,
  })),
  {
    path: 'people/invite',
    title: 'Invite someone',
    loadComponent: async () => (await import('./invite-page/invite-page')).InvitePage,
  },
  {
    path: 'people/:id',
    title: 'Account',
    loadComponent: async () => (await import('./person-page/person-page')).PersonPage,
  },
  {
    path: 'sites',
    title: 'Sites',
    loadComponent: async () => (await import('./sites-page/sites-page')).SitesPage,
  },
  {
    path: 'sites/add',
    title: 'Add a site',
    loadComponent: async () => (await import('./add-site-page/add-site-page')).AddSitePage,
  },
  {
    path: 'sites/:id',
    title: 'Site',
    loadComponent: async () => (await import('./edit-site-page/edit-site-page')).EditSitePage,
  },
  {
    path: 'audit',
    title: 'Audit',
    loadComponent: async () => (await import('./audit-page/audit-page')).AuditPage,
  },
];

export const settingsRoutes: Routes = [
  {
    path: '',
    pathMatch: 'full',
    loadComponent: async () => (await import('./settings-home/settings-home')).SettingsHome,
  },
  {
    path: 'policy',
    title: 'Prescribing policy',
    loadComponent: async () => (await import('./policy-page/policy-page')).PolicyPage,
  },
  {
    path: 'policy/history',
    title: 'Versions of the policy',
    loadComponent: async () =>
      (await import('./policy-history-page/policy-history-page')).PolicyHistoryPage,
  },
  {
    path: 'policy/change',
    title: 'Change the policy',
    canMatch: [allow({ roles: ['administrator', 'physician'] })],
    loadComponent: async () =>
      (await import('./change-policy-page/change-policy-page')).ChangePolicyPage,
  },
  ...kept.map((page) => ({ ...page, canMatch: [allow({ roles: ['administrator'] })] })),
];

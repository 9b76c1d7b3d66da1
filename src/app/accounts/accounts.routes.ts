import type { Routes } from '@angular/router';
import { allow, signedOut } from '../core/access-guard';
import { staff } from '../core/navigation';

export const accountsRoutes: Routes = [
  {
    path: 'sign-in',
    title: 'Sign in',
    canMatch: [signedOut],
    loadComponent: async () => (await import('./sign-in-page/sign-in-page')).SignInPage,
  },
  {
    path: 'forgotten-password',
    title: 'Forgotten password',
    loadComponent: async () =>
      (await import('./forgotten-password-page/forgotten-password-page')).ForgottenPasswordPage,
  },
  {
    path: 'set-password',
    title: 'Set your password',
    loadComponent: async () =>
      (await import('./set-password-page/set-password-page')).SetPasswordPage,
  },
  {
    path: 'change-password',
    title: 'Change your password',
    canMatch: [allow({ roles: [...staff, 'patient'] })],
    loadComponent: async () =>
      (await import('./change-password-page/change-password-page')).ChangePasswordPage,
  },
  {
    path: 'first-administrator',
    title: 'First administrator',
    loadComponent: async () =>
      (await import('./first-administrator-page/first-administrator-page')).FirstAdministratorPage,
  },
];

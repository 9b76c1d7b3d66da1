import type { Routes } from '@angular/router';

export const reportsRoutes: Routes = [
  { path: '', pathMatch: 'full', redirectTo: 'completion' },
  {
    path: 'completion',
    title: 'Completion',
    loadComponent: async () => (await import('./completion-page/completion-page')).CompletionPage,
  },
  {
    path: 'completion/patients',
    title: 'Completion: patients',
    loadComponent: async () =>
      (await import('./completion-patients-page/completion-patients-page')).CompletionPatientsPage,
  },
];

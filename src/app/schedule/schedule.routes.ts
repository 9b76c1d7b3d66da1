import { inject } from '@angular/core';
import type { Routes } from '@angular/router';
import { BookingAccess } from './booking-access';
import { SiteChoice } from './site-choice';

export const scheduleRoutes: Routes = [
  {
    path: '',
    providers: [SiteChoice],
    children: [
      {
        path: '',
        loadComponent: async () => (await import('./schedule-page/schedule-page')).SchedulePage,
      },
      {
        path: 'series',
        title: 'Book a series',
        canMatch: [() => inject(BookingAccess).mayBook()],
        loadComponent: async () => (await import('./series-page/series-page')).SeriesPage,
      },
      {
        path: 'classes',
        title: 'Classes and closures',
        canMatch: [() => inject(BookingAccess).mayPlan()],
        loadComponent: async () => (await import('./classes-page/classes-page')).ClassesPage,
      },
    ],
  },
];

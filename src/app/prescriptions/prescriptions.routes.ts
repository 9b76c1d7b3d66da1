import type { CanDeactivateFn, Routes } from '@angular/router';
import { inject } from '@angular/core';
import { Confirm } from '../ui/confirm/confirm';
import type { WorksheetPage } from './worksheet-page/worksheet-page';

const worksheetPage = async () => (await import('./worksheet-page/worksheet-page')).WorksheetPage;

/** Asks before what was typed is lost. */
const keepsTyped: CanDeactivateFn<WorksheetPage> = (page) =>
  !page.hasUnkept() ||
  inject(Confirm).ask({
    heading: 'Leave without keeping?',
    lines: ['What you tried here is not kept as a draft.'],
    yes: 'Leave',
    no: 'Stay here',
  });

/** Below `patients/:patientId/prescriptions`. */
export const newPrescriptionRoutes: Routes = [
  {
    path: 'new',
    title: 'Prescription worksheet',
    loadComponent: worksheetPage,
    canDeactivate: [keepsTyped],
  },
];

/** Below `prescriptions`. */
export const prescriptionRoutes: Routes = [
  {
    path: 'compare/:oneId/:otherId',
    title: 'Two versions of a range',
    loadComponent: async () => (await import('./compare-page/compare-page')).ComparePage,
  },
  {
    path: ':prescriptionId',
    title: 'Range',
    loadComponent: worksheetPage,
    canDeactivate: [keepsTyped],
  },
];

import type { Routes } from '@angular/router';
import type { ListedKind } from './record-section/section-words';

const chartPage = async () => (await import('./chart-page/chart-page')).ChartPage;

/** A part of the chart, with the kinds of entries that it shows. */
const chart = (path: string, kinds: readonly ListedKind[], withConditions = false) => ({
  path,
  loadComponent: chartPage,
  data: { kinds, withConditions },
});

export const patientsRoutes: Routes = [
  {
    path: '',
    pathMatch: 'full',
    loadComponent: async () => (await import('./patients-page/patients-page')).PatientsPage,
  },
  {
    path: 'new',
    title: 'Register a patient',
    loadComponent: async () => (await import('./register-page/register-page')).RegisterPage,
  },
  {
    path: ':patientId',
    title: 'Patient',
    loadComponent: async () => (await import('./patient-page/patient-page')).PatientPage,
    children: [
      { path: '', pathMatch: 'full', redirectTo: 'course' },
      {
        path: 'course',
        loadComponent: async () => (await import('./course-section/course-section')).CourseSection,
      },
      {
        path: 'ranges',
        loadComponent: async () => (await import('./ranges-section/ranges-section')).RangesSection,
      },
      {
        path: 'progress',
        loadComponent: async () =>
          (await import('./progress-section/progress-section')).ProgressSection,
      },
      chart('medicines', ['medications']),
      chart('devices', ['devices', 'restrictions']),
      chart('questionnaires', ['questionnaires']),
      chart('tests', [
        'exercise-tests',
        'thresholds',
        'resting-ecgs',
        'walk-tests',
        'chair-stands',
      ]),
      chart('resting', ['resting-rates', 'rhythms', 'body-measurements']),
      chart('conditions', ['diagnoses', 'clinical-events', 'risk-stratifications'], true),
      {
        path: 'appointments',
        loadComponent: async () =>
          (await import('./appointments-section/appointments-section')).AppointmentsSection,
      },
      {
        path: 'vitals',
        loadComponent: async () => (await import('./vitals-section/vitals-section')).VitalsSection,
      },
      {
        path: 'details',
        loadComponent: async () =>
          (await import('./details-section/details-section')).DetailsSection,
      },
    ],
  },
];

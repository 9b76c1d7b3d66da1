import {
  diagnosisKinds,
  openEnrollmentRequestSchema,
  type OpenEnrollmentRequest,
} from '@shared/contracts/patients-contract';
import type { Site } from '@shared/contracts/sites-contract';
import { diagnosisWords } from '../../ui/words/clinical-words';
import type { EntryField } from '../entry-editor/entry-form';
import { inUnit } from '../entry-editor/units';

export const courseRules = openEnrollmentRequestSchema.shape;

const sessions = (key: string, label: string): EntryField => ({
  key,
  label,
  type: 'number',
  units: [inUnit('sessions')],
});

/** The fields of a new course; a course of 36 monitored sessions unless told otherwise. */
export const courseFields = (sites: readonly Site[]): readonly EntryField[] => [
  {
    key: 'qualifyingDiagnosis',
    label: 'Qualifying diagnosis',
    type: 'choice',
    options: diagnosisKinds.map((value) => ({ value, label: diagnosisWords[value] })),
  },
  { key: 'qualifyingEventOn', label: 'Event on', type: 'date' },
  { key: 'payer', label: 'Who pays', type: 'text' },
  {
    key: 'siteId',
    label: 'Site',
    type: 'choice',
    options: sites.map(({ id, name }) => ({ value: id, label: name })),
  },
  { key: 'enrolledOn', label: 'Enrolled on', type: 'date' },
  sessions('plannedSessions', 'Planned'),
  sessions('sessionLimit', 'At most'),
  { key: 'monitored', label: 'Exercises on a monitored place', type: 'check' },
];

export const courseStart = (siteId: string): Partial<OpenEnrollmentRequest> => ({
  qualifyingEventOn: undefined,
  siteId,
  plannedSessions: 36,
  sessionLimit: 36,
  monitored: true,
});

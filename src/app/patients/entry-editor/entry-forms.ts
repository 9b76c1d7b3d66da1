import type { DiagnosisKind } from '@shared/contracts/patients-contract';
import { diagnosisKinds } from '@shared/contracts/patients-contract';
import {
  clinicalEventKinds,
  conditionAnswers,
  conditionKinds,
  type ConditionKind,
} from '@shared/contracts/record-lists';
import { rhythms } from '@shared/clinical/prescribing/request';
import {
  conditionAnswerWords,
  conditionWords,
  diagnosisWords,
  eventWords,
  rhythmWords,
} from '../../ui/words/clinical-words';
import { date, options, rate } from './common-fields';
import { type EntryForm, type Values, formOf } from './entry-form';
import { centimeter, footAndInch, kilogram, pound } from './units';

export const restingRateForm = (): EntryForm =>
  formOf('resting-rates', { heading: 'Add a resting rate', saved: 'Resting rate saved.' }, [
    { ...rate('seated', 'Seated'), hint: 'After five minutes at rest' },
    rate('standing', 'Standing'),
    date('measuredOn', 'Measured on'),
  ]);

export const rhythmForm = (): EntryForm =>
  formOf('rhythms', { heading: 'Add a rhythm', saved: 'Rhythm saved.' }, [
    { key: 'rhythm', label: 'Rhythm', type: 'choice', options: options(rhythms, rhythmWords) },
    date('observedOn', 'Seen on'),
  ]);

export const bodyForm = (): EntryForm =>
  formOf('body-measurements', { heading: 'Add weight or height', saved: 'Measurement saved.' }, [
    { key: 'weightKg', label: 'Weight', type: 'number', units: [pound, kilogram] },
    { key: 'heightCm', label: 'Height', type: 'number', units: [footAndInch, centimeter] },
    date('measuredOn', 'Measured on'),
  ]);

export const diagnosisForm = (): EntryForm =>
  formOf(
    'diagnoses',
    { heading: 'Add a diagnosis', saved: 'Diagnosis saved.' },
    [
      {
        key: 'kind',
        label: 'Kind',
        type: 'choice',
        options: options<DiagnosisKind>(diagnosisKinds, diagnosisWords),
      },
      { key: 'description', label: 'Diagnosis', type: 'text' },
      date('onsetOn', 'Since'),
    ],
    { onsetOn: null },
  );

export const eventForm = (): EntryForm =>
  formOf('clinical-events', { heading: 'Add an event or procedure', saved: 'Event saved.' }, [
    {
      key: 'kind',
      label: 'What happened',
      type: 'choice',
      options: options(clinicalEventKinds, eventWords),
    },
    { key: 'description', label: 'In words', type: 'text', hint: 'Optional' },
    date('occurredOn', 'On'),
  ]);

/** The answers that an operation stands behind. */
const operated: readonly ConditionKind[] = ['transplant', 'ventricularAssistDevice'];

/** The ten conditions at once; those left unanswered or answered as before make no entry. */
export function conditionsForm(
  current: Readonly<Partial<Record<ConditionKind, string>>>,
): EntryForm {
  const changed = (values: Values): ConditionKind[] =>
    conditionKinds.filter((kind) => values[kind] !== null && values[kind] !== current[kind]);
  return {
    heading: 'Conditions that decide the method',
    save: 'Save the answers',
    saved: 'Answers saved.',
    rules: {},
    fields: [
      ...conditionKinds.map((kind) => ({
        key: kind,
        label: conditionWords[kind],
        type: 'choice' as const,
        none: 'Not answered',
        options: options(conditionAnswers[kind], conditionAnswerWords(kind)),
      })),
      {
        key: 'since',
        label: 'Date of the transplant or assist device',
        type: 'date',
        hint: 'When one of these two is answered anew',
      },
      {
        key: 'evidence',
        label: 'What showed that the heart rate responds again',
        type: 'text',
        optional: true,
        hint: 'For a recovered transplant, as the fall of the rate after a test',
      },
    ],
    initial: { since: null, ...current },
    toEntries: (values, idOf) =>
      changed(values).map((kind) => ({
        kind: 'conditions' as const,
        id: idOf(conditionKinds.indexOf(kind)),
        values: {
          kind,
          value: String(values[kind]),
          since: operated.includes(kind) ? (values['since'] as string | null) : null,
          evidence: kind === 'transplant' ? (values['evidence'] as string | null) : null,
        },
      })),
    pathOf: () => '',
  };
}

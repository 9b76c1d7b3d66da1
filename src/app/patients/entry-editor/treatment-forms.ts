import { dosingTimes, drugFlagWords, drugFlags } from '@shared/clinical/drugs/drug';
import {
  genericDrugOf,
  genericDrugsSource,
  suggestDrugs,
} from '@shared/clinical/drugs/generic-drugs';
import { icdStatuses, icdZoneKinds, rateActingDrugs } from '@shared/clinical/prescribing/request';
import {
  restrictionLimits,
  restrictionWords,
} from '@shared/clinical/restrictions/restriction-limits';
import { restrictionKinds } from '@shared/clinical/training/restrictions';
import { type PatientRecord, recordValues } from '@shared/contracts/record-contract';
import { pacingModes } from '@shared/contracts/record-treatment-contract';
import { icdWords, rateActingWords, zoneWords } from '../../ui/words/clinical-words';
import { date, number, options, rate } from './common-fields';
import { type EntryField, type EntryForm, type Line, type Values, formOf } from './entry-form';
import { bpm, cycleLength, inUnit } from './units';

type Entry<K extends keyof PatientRecord> = PatientRecord[K][number];

const suggestionsShown = 8;

export const dosingWords: Readonly<Record<string, string>> = {
  morning: 'Morning',
  noon: 'Noon',
  evening: 'Evening',
  bedtime: 'Bedtime',
  'as-needed': 'As needed',
};

const knownDrug = (name: unknown) => (typeof name === 'string' ? genericDrugOf(name) : undefined);

const medicationFields: readonly EntryField[] = [
  {
    key: 'name',
    label: 'Drug',
    type: 'text',
    hint: 'Generic name',
    suggest: (typed) => suggestDrugs(typed, suggestionsShown).map(({ name }) => name),
  },
  { key: 'salt', label: 'Salt', type: 'text', optional: true, hint: 'As succinate or tartrate' },
  { key: 'dose', label: 'Dose', type: 'text', hint: 'With its unit, as 50 mg' },
  { key: 'schedule', label: 'How often', type: 'text', hint: 'As twice a day' },
  date('startedOn', 'Taken since'),
  {
    key: 'rateActing',
    label: 'Acts on the heart rate',
    type: 'choice',
    none: 'No',
    options: options(rateActingDrugs, rateActingWords),
    hint: 'Filled in for drugs of our list; the label prevails',
  },
  {
    key: 'times',
    label: 'Times of day',
    type: 'marks',
    options: options(dosingTimes, dosingWords),
  },
  {
    key: 'flags',
    label: 'To know before exercise',
    type: 'marks',
    options: options(drugFlags, drugFlagWords),
  },
];

/** What our list knows of a drug by its name; a drug that it does not know is left as it was filled in. */
function knownOf({ name }: Values): Values {
  const drug = knownDrug(name);
  if (!drug) return {};
  const [salt] = drug.salts;
  return {
    rateActing: drug.rateActing,
    flags: drug.flags,
    ...(drug.salts.length === 1 && { salt }),
  };
}

/** What our list says of a drug that is typed. */
function linesOf(drug: ReturnType<typeof knownDrug>): Line[] {
  if (!drug) return [];
  const known: Line = { label: 'Class', value: drug.drugClass, source: genericDrugsSource };
  if (drug.salts.length < 2) return [known];
  const why = 'They act for different times: say which.';
  return [known, { label: 'Salt', value: drug.salts.join(' or '), why }];
}

const withSalts = (field: EntryField): EntryField =>
  field.key === 'salt' && field.type === 'text'
    ? { ...field, suggest: () => ['succinate', 'tartrate', 'dinitrate', 'mononitrate'] }
    : field;

export const medicationForm = (): EntryForm => ({
  ...formOf(
    'medications',
    { heading: 'Add a drug', saved: 'Drug saved.' },
    medicationFields.map(withSalts),
  ),
  fills: { name: knownOf },
  lines: ({ name }) => linesOf(knownDrug(name)),
});

/** A change of dose or schedule: the entry stops on the day the new one starts. */
export function changedMedicationForm({ id, values }: Entry<'medications'>): EntryForm {
  const { startedOn: _started, stoppedOn: _stopped, replaces: _replaces, ...kept } = values;
  return formOf(
    'medications',
    { heading: `Change ${kept.name}`, saved: `${kept.name} changed.`, save: 'Save the change' },
    medicationFields.map((field) =>
      field.key === 'startedOn' ? { ...field, label: 'Changed on' } : field,
    ),
    kept,
    { replaces: id },
  );
}

const zones: EntryField = {
  key: 'icdZones',
  label: 'Zones of the defibrillator',
  type: 'rows',
  add: 'Add a zone',
  hint: 'Where each zone begins, as a rate or a cycle length. Present without zones counts as not known.',
  rules: recordValues.devices.shape.icdZones.unwrap().element.shape,
  fields: [
    { key: 'rate', label: 'Begins at', type: 'number', units: [bpm, cycleLength] },
    {
      key: 'kind',
      label: 'It does',
      type: 'choice',
      options: options(icdZoneKinds, zoneWords),
      hint: 'Monitor watches; pacing and shock treat',
    },
  ],
};

/** @param last the latest check, whose settings stand in the fields */
export const deviceForm = (last: Entry<'devices'> | undefined): EntryForm =>
  formOf(
    'devices',
    { heading: 'Add a device check', saved: 'Device check saved.' },
    [
      {
        key: 'icdStatus',
        label: 'Defibrillator (ICD)',
        type: 'choice',
        options: options(icdStatuses, {
          ...icdWords,
          none: 'None',
          present: 'Present',
          unknown: 'Not known',
        }),
      },
      date('checkedOn', 'Checked on'),
      zones,
      {
        key: 'pacemaker',
        label: 'The device paces (pacemaker, or ICD with pacing)',
        type: 'check',
      },
      {
        key: 'pacingMode',
        label: 'Pacing mode',
        type: 'choice',
        none: 'Not known',
        options: options(pacingModes, {}),
        hint: 'R at the end: a sensor drives the rate',
      },
      rate('lowerRate', 'Lower rate'),
      { ...rate('upperTrackingRate', 'Upper tracking rate'), hint: 'Only with pacing' },
      { ...rate('upperSensorRate', 'Upper sensor rate'), hint: 'Only with pacing' },
    ],
    last && { ...last.values, checkedOn: undefined },
  );

const units = [
  ...new Set(Object.values(restrictionLimits).flatMap((limit) => (limit ? [limit.unit] : []))),
];

export const restrictionForm = (): EntryForm =>
  formOf(
    'restrictions',
    { heading: 'Add an order', saved: 'Order saved. It holds from now on.' },
    [
      {
        key: 'kind',
        label: 'Restriction',
        type: 'choice',
        options: options(restrictionKinds, restrictionWords),
      },
      {
        key: 'limit',
        label: 'Limit',
        type: 'number',
        units: [inUnit(units.join(', '))],
        hint: 'Lifting kg, oxygen L/min, systolic pressure mmHg; else empty',
      },
      { ...number('diastolic', 'Diastolic ceiling', 'mmHg'), hint: 'Beside a pressure ceiling' },
      { key: 'orderedBy', label: 'Ordered by', type: 'text' },
      date('orderedOn', 'Ordered on'),
      { ...date('until', 'Until'), hint: 'The last day; empty until it is lifted' },
      { key: 'detail', label: 'In words', type: 'text', hint: 'As left knee, by nasal cannula' },
    ],
    { until: null },
  );

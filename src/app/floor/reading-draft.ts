import type { SymptomCode } from '@shared/contracts/floor-contract';
import {
  vitalSignBounds,
  type VitalPhase,
  type VitalSign,
} from '@shared/clinical/vital-sign-bounds';

/** The fields of the pad in the order in which they are asked; each holds the digits as typed. */
export const padFields = [
  'heartRate',
  'systolic',
  'diastolic',
  'perceivedExertion',
  'oxygenSaturation',
] as const satisfies readonly VitalSign[];

/** What is being entered. It becomes a reading with an id of its own when it is saved. */
export interface ReadingDraft {
  readonly phase: VitalPhase;
  readonly digits: Readonly<Record<VitalSign, string>>;
  readonly active: VitalSign | null;
  /** Null while nobody asked; `['none']` when the patient was asked and had none. */
  readonly symptoms: readonly SymptomCode[] | null;
  readonly note: string;
  /** How long ago it was measured, for what is written down late. */
  readonly minutesAgo: number;
}

export const emptyDraft = (phase: VitalPhase): ReadingDraft => ({
  phase,
  digits: {
    heartRate: '',
    systolic: '',
    diastolic: '',
    perceivedExertion: '',
    oxygenSaturation: '',
  },
  active: 'heartRate',
  symptoms: null,
  note: '',
  minutesAgo: 0,
});

const longest = (field: VitalSign): number => String(vitalSignBounds[field].highest).length;

/** Only digits, no leading zero, no more than the largest value has. */
export const digitsIn = (field: VitalSign, text: string): string =>
  text.replace(/\D/g, '').replace(/^0+/, '').slice(0, longest(field));

export function typed(draft: ReadingDraft, field: VitalSign, text: string): ReadingDraft {
  const digits = { ...draft.digits, [field]: digitsIn(field, text) };
  return { ...draft, active: field, digits };
}

/** A key of the pad goes to the field that is on; without one it does nothing. */
export function pressed(draft: ReadingDraft, digit: string): ReadingDraft {
  const { active } = draft;
  return active === null ? draft : typed(draft, active, draft.digits[active] + digit);
}

export function erased(draft: ReadingDraft): ReadingDraft {
  const { active } = draft;
  return active === null ? draft : typed(draft, active, draft.digits[active].slice(0, -1));
}

/** The field after the one that is on; after the last none is. */
export function nextField(draft: ReadingDraft): ReadingDraft {
  const { active } = draft;
  const at = active === null ? padFields.length : padFields.indexOf(active);
  return { ...draft, active: padFields[at + 1] ?? null };
}

/** `none` takes the place of all others and the other way round; the last one taken away leaves *not asked*. */
export function withSymptom(draft: ReadingDraft, code: SymptomCode): ReadingDraft {
  const before = draft.symptoms ?? [];
  if (before.includes(code)) {
    const left = before.filter((one) => one !== code);
    return { ...draft, symptoms: left.length > 0 ? left : null };
  }
  const kept = code === 'none' ? [] : before.filter((one) => one !== 'none');
  return { ...draft, symptoms: [...kept, code] };
}

export const numberOf = (draft: ReadingDraft, field: VitalSign): number | null =>
  draft.digits[field] === '' ? null : Number(draft.digits[field]);

const isOutside = (value: number, field: VitalSign): boolean =>
  value < vitalSignBounds[field].lowest || value > vitalSignBounds[field].highest;

/** The rate once it can be one: while `12` of 127 is typed it is none. */
export function rateOf(draft: ReadingDraft): number | null {
  const rate = numberOf(draft, 'heartRate');
  return rate === null || isOutside(rate, 'heartRate') ? null : rate;
}

/** What keeps a draft from being saved, beside its fields, in words. */
export type DraftFaults = Readonly<Partial<Record<VitalSign, string>>>;

export function faultsOf(draft: ReadingDraft): DraftFaults {
  const faults: Partial<Record<VitalSign, string>> = {};
  for (const field of padFields) {
    const value = numberOf(draft, field);
    if (value === null || !isOutside(value, field)) continue;
    const { lowest, highest } = vitalSignBounds[field];
    faults[field] = `Enter ${lowest} to ${highest}`;
  }
  const [systolic, diastolic] = [numberOf(draft, 'systolic'), numberOf(draft, 'diastolic')];
  if (diastolic !== null && systolic === null) faults.systolic ??= 'Enter the systolic too';
  if (diastolic !== null && systolic !== null && diastolic >= systolic) {
    faults.diastolic ??= 'Must be below systolic';
  }
  return faults;
}

export const isEmpty = (draft: ReadingDraft): boolean =>
  padFields.every((field) => draft.digits[field] === '') &&
  draft.symptoms === null &&
  draft.note.trim() === '';

export const canSave = (draft: ReadingDraft): boolean =>
  !isEmpty(draft) && Object.keys(faultsOf(draft)).length === 0;

/** The values as the contract takes them; what was not taken is left out. */
export function valuesOf(draft: ReadingDraft) {
  const values: Partial<Record<VitalSign, number>> = {};
  for (const field of padFields) {
    const value = numberOf(draft, field);
    if (value !== null) values[field] = value;
  }
  const note = draft.note.trim();
  return {
    ...values,
    ...(draft.symptoms && { symptoms: [...draft.symptoms] }),
    ...(note && { note }),
  };
}

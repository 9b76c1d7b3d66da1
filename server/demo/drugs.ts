import type { DosingTime, DrugFlag } from '@shared/clinical/drugs/drug';
import { genericDrugOf } from '@shared/clinical/drugs/generic-drugs';
import type { Dice } from './dice';
import type { RateActingDrug } from './situations';

export interface Drug {
  readonly name: string;
  readonly salt: string | null;
  readonly flags: DrugFlag[];
  readonly times: DosingTime[];
  readonly rateActing: RateActingDrug | null;
  readonly dose: string;
  readonly schedule: string;
}

const once = 'once daily';
const twice = 'twice daily';

type Written = Pick<Drug, 'name' | 'dose' | 'schedule'> & { readonly salt?: string };

const rateActing: Record<RateActingDrug, readonly Written[]> = {
  'beta-blocker': [
    { name: 'Metoprolol', salt: 'succinate', dose: '50 mg', schedule: once },
    { name: 'Carvedilol', dose: '12.5 mg', schedule: twice },
    { name: 'Bisoprolol', dose: '5 mg', schedule: once },
  ],
  ivabradine: [{ name: 'Ivabradine', dose: '5 mg', schedule: twice }],
  'diltiazem-verapamil': [
    { name: 'Diltiazem, extended release', dose: '180 mg', schedule: once },
    { name: 'Verapamil, extended release', dose: '240 mg', schedule: once },
  ],
  digoxin: [{ name: 'Digoxin', dose: '0.125 mg', schedule: once }],
  'amiodarone-sotalol': [{ name: 'Amiodarone', dose: '200 mg', schedule: once }],
  'thyroid-hormone': [{ name: 'Levothyroxine', dose: '100 mcg', schedule: once }],
  other: [{ name: 'Clonidine', dose: '0.1 mg', schedule: twice }],
};

const others: readonly (Written & Pick<Drug, 'rateActing'>)[] = [
  { name: 'Aspirin', rateActing: null, dose: '81 mg', schedule: once },
  { name: 'Atorvastatin', rateActing: null, dose: '40 mg', schedule: 'at bedtime' },
  { name: 'Nitroglycerin', rateActing: null, dose: '0.4 mg', schedule: 'as needed' },
  { name: 'Lisinopril', rateActing: null, dose: '10 mg', schedule: once },
  { name: 'Furosemide', rateActing: null, dose: '20 mg', schedule: 'in the morning' },
  { name: 'Metformin', rateActing: null, dose: '500 mg', schedule: twice },
];

const timesOf: Readonly<Record<string, DosingTime[]>> = {
  [once]: ['morning'],
  [twice]: ['morning', 'evening'],
  'at bedtime': ['bedtime'],
  'in the morning': ['morning'],
  'as needed': ['as-needed'],
};

const whole = (drug: Written & Pick<Drug, 'rateActing'>): Drug => ({
  ...drug,
  salt: drug.salt ?? null,
  flags: [...(genericDrugOf(drug.name)?.flags ?? [])],
  times: timesOf[drug.schedule] ?? [],
});

/** A drug of each class, and two to four that do not act on the rate. */
export function drugList(classes: readonly RateActingDrug[], draw: Dice): Drug[] {
  return [
    ...classes.map((each) => ({ ...draw.pick(rateActing[each]), rateActing: each })),
    ...others.slice(0, draw.whole(2, 4)),
  ].map(whole);
}

/** The next dose up, in the same unit. */
export function doubled(dose: string): string {
  return dose.replace(/^[\d.]+/, (amount) => String(Number(amount) * 2));
}

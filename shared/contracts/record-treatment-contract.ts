import * as z from 'zod';
import { dosingTimes, drugFlags } from '../clinical/drugs/drug';
import { icdStatuses, icdZoneKinds, rateActingDrugs } from '../clinical/prescribing/request';
import { requestBounds } from '../clinical/prescribing/request-bounds';
import { restrictionLimits } from '../clinical/restrictions/restriction-limits';
import { restrictionKinds } from '../clinical/training/restrictions';
import { localDateField, noteField, numberField, textField } from './fields';

// What is taken, implanted and ordered.

const optional = <T extends z.ZodType>(field: T) => field.nullable().default(null);
const once = (given: readonly string[]): boolean => new Set(given).size === given.length;

export const medication = z
  .strictObject({
    name: textField(120, 'Enter the name of the drug'),
    /** As succinate, tartrate; a salt changes how long a drug acts. */
    salt: optional(textField(60, 'Enter the salt')),
    /** Null for a drug that does not act on the heart rate. */
    rateActing: optional(z.enum(rateActingDrugs)),
    /** What else staff must know before exercise. */
    flags: z.array(z.enum(drugFlags)).refine(once, 'Name each once').default([]),
    dose: textField(80, 'Enter the dose with its unit'),
    schedule: textField(80, 'Enter how often it is taken'),
    times: z.array(z.enum(dosingTimes)).refine(once, 'Name each once').default([]),
    startedOn: localDateField,
    stoppedOn: optional(localDateField),
    /** The entry that this one takes the place of: it stops on the day this one starts. */
    replaces: optional(z.uuid()),
  })
  .refine((drug) => drug.stoppedOn === null || drug.stoppedOn >= drug.startedOn, {
    path: ['stoppedOn'],
    error: 'It cannot stop before it started',
  });

/** How a pacemaker is programmed, by the letters of the NBG code; R at the end: a sensor drives the rate. */
export const pacingModes = [
  'AAI',
  'AAIR',
  'VVI',
  'VVIR',
  'VDD',
  'DDI',
  'DDIR',
  'DDD',
  'DDDR',
  'AOO',
  'VOO',
  'DOO',
] as const;
export type PacingMode = (typeof pacingModes)[number];

export const device = z
  .strictObject({
    icdStatus: z.enum(icdStatuses, 'Say whether there is a defibrillator'),
    icdZones: z
      .array(
        z.strictObject({
          rate: numberField(requestBounds.icdRate, 'bpm'),
          kind: z.enum(icdZoneKinds, 'Choose what the zone does'),
        }),
      )
      .max(20, 'Enter at most 20 zones')
      .default([]),
    pacemaker: z.boolean().default(false),
    pacingMode: optional(z.enum(pacingModes)),
    lowerRate: optional(numberField({ lowest: 30, highest: 150 }, 'bpm')),
    upperTrackingRate: optional(numberField(requestBounds.trackingRate, 'bpm')),
    upperSensorRate: optional(numberField(requestBounds.trackingRate, 'bpm')),
    checkedOn: localDateField,
  })
  .refine((entry) => entry.icdStatus === 'present' || entry.icdZones.length === 0, {
    path: ['icdZones'],
    error: 'Only a defibrillator that is present has zones',
  })
  .refine((entry) => entry.pacemaker || entry.upperTrackingRate === null, {
    path: ['upperTrackingRate'],
    error: 'Only a device that paces has a tracking rate',
  })
  .refine(
    (entry) =>
      entry.pacemaker ||
      (entry.pacingMode === null && entry.lowerRate === null && entry.upperSensorRate === null),
    { path: ['pacingMode'], error: 'Only a device that paces has a mode and rates' },
  )
  .refine(
    ({ lowerRate, upperTrackingRate, upperSensorRate }) =>
      [upperTrackingRate, upperSensorRate].every(
        (upper) => upper === null || lowerRate === null || upper > lowerRate,
      ),
    { path: ['lowerRate'], error: 'The lower rate is below the upper rates' },
  );

/** What may not be done, by whose order; the program's own defaults are no entries, and an order wins over them. */
export const restriction = z
  .strictObject({
    kind: z.enum(restrictionKinds, 'Choose the restriction'),
    /** Kilograms for a lifting limit, liters a minute for oxygen, mmHg systolic for a ceiling of blood pressure. */
    limit: optional(z.number('Enter a number')),
    /** mmHg, beside a systolic ceiling. */
    diastolic: optional(numberField({ lowest: 40, highest: 130 }, 'mmHg')),
    detail: noteField(300).default(''),
    orderedBy: textField(120, 'Say who ordered it'),
    orderedOn: localDateField,
    /** The last day on which it holds; null until it is lifted. */
    until: optional(localDateField),
  })
  .superRefine(({ kind, limit, diastolic, orderedOn, until }, context) => {
    const refuse = (path: string, message: string) =>
      context.addIssue({ code: 'custom', path: [path], message });
    const bounds = restrictionLimits[kind];
    if (bounds === null && limit !== null) refuse('limit', 'This restriction has no number');
    if (bounds !== null && (limit === null || limit < bounds.lowest || limit > bounds.highest)) {
      refuse('limit', `Enter ${bounds.lowest} to ${bounds.highest} ${bounds.unit}`);
    }
    if (diastolic !== null && (kind !== 'pressure' || limit === null || diastolic >= limit)) {
      refuse('diastolic', 'Enter a diastolic pressure below the systolic ceiling');
    }
    if (until !== null && until < orderedOn) refuse('until', 'It cannot end before it was ordered');
  });

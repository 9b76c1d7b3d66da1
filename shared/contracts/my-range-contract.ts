import * as z from 'zod';
import { cautionSeverity, type CautionCode } from '../clinical/prescribing/answer';
import { rangeFlagSchema } from './range-flag';
import './zod';

const beats = z.object({ lower: z.number(), upper: z.number() });
const cautionCodes = Object.keys(cautionSeverity) as [CautionCode, ...CautionCode[]];

/** What a patient is told of the own range; rates in beats a minute, effort on the Borg 6–20 scale. */
const toldSchema = z.object({
  /**
   * `review`: something has changed, so effort leads until the team has set a new range; `today`: a dose was missed, so
   * effort leads today.
   */
  state: z.enum(['in-force', 'review', 'today']),
  /** What has changed and when; not by whom. */
  changes: z.array(rangeFlagSchema.pick({ fact: true, effect: true, at: true })),
  /** Null where effort leads. */
  target: beats.nullable(),
  tenSecondCount: beats.nullable(),
  stayUnder: z.number().nullable(),
  resting: z.number(),
  effort: beats,
  /** Whether a shock from a device is a sign to stop. */
  hasDefibrillator: z.boolean(),
  cautions: z.array(z.enum(cautionCodes)),
  setOn: z.iso.datetime({ offset: true }),
  setBy: z.string(),
  /** The physician who signed too; null when there was one signature. */
  signedBy: z.string().nullable(),
});

/** `GET /api/my/range` */
export const myRangeSchema = z.object({
  /** The program's name. */
  program: z.string(),
  patient: z.string(),
  site: z.object({ name: z.string(), phone: z.string(), timeZone: z.string() }),
  /** Null while none is in force. */
  range: toldSchema.nullable(),
  /** What the program's policy says of days without a class. */
  home: z.object({
    perWeek: z.number(),
    warmUpMinutes: z.number(),
    coolDownMinutes: z.number(),
  }),
});
export type MyRange = z.infer<typeof myRangeSchema>;
export type ToldRange = NonNullable<MyRange['range']>;

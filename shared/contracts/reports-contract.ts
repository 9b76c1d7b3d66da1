import * as z from 'zod';
import { cursorField, localDateField } from './fields';

// Completion of courses, as counts with their rate, and the patients behind each count.

export const completionGroupings = [
  'none',
  'month',
  'site',
  'sex',
  'age-band',
  'payer',
  'diagnosis',
] as const;
export type CompletionGrouping = (typeof completionGroupings)[number];

/** Lower ends of the age bands, whole years at the first session. */
export const ageBands = ['under-55', '55-64', '65-74', '75-and-over'] as const;
export type AgeBand = (typeof ageBands)[number];

export const completionDefinitions = ['A', 'B'] as const;
export type CompletionDefinition = (typeof completionDefinitions)[number];

/** How much of the list: all who started, or a part of them. */
export const completionParts = ['enrolled', 'completed', 'ongoing', 'left'] as const;
export type CompletionPart = (typeof completionParts)[number];

const filters = {
  siteId: z.uuid().optional(),
  sex: z.enum(['female', 'male', 'unknown']).optional(),
  ageBand: z.enum(ageBands).optional(),
  payer: z.string().trim().min(1).max(100).optional(),
  diagnosis: z.string().trim().min(1).max(40).optional(),
};

const span = { from: localDateField, to: localDateField };

const inOrder = ({ from, to }: { from: string; to: string }): boolean => from < to;
const orderFault = {
  path: ['to'],
  message: '“To” must be after “from”; the last day is left out.',
};

/** First sessions from `from` (inclusive) to `to` (exclusive), dates local to the site. */
export const completionQuerySchema = z
  .strictObject({ ...span, groupBy: z.enum(completionGroupings).default('none'), ...filters })
  .refine(inOrder, orderFault);
export type CompletionQuery = z.infer<typeof completionQuerySchema>;

/** What a file is for: `outside` keeps back counts of 1 to 10 people, and what would give them away. */
export const sharings = ['inside', 'outside'] as const;
export type Sharing = (typeof sharings)[number];

/** The same, and who the file is for. */
export const completionFileQuerySchema = z
  .strictObject({
    ...span,
    groupBy: z.enum(completionGroupings).default('none'),
    ...filters,
    sharing: z.enum(sharings).default('inside'),
  })
  .refine(inOrder, orderFault);

/** The same, and which row and which of its counts to open. */
export const completionPatientsQuerySchema = z
  .strictObject({
    ...span,
    groupBy: z.enum(completionGroupings).default('none'),
    ...filters,
    group: z.string().max(100).optional(),
    part: z.enum(completionParts),
    cursor: cursorField.optional(),
    limit: z.coerce.number().int().min(1).max(100).default(25),
  })
  .refine(inOrder, orderFault);
export type CompletionPatientsQuery = z.infer<typeof completionPatientsQuerySchema>;

const count = z.int().min(0);
const fraction = z.number().min(0).max(1);

export const completionRowSchema = z.object({
  /** A month `YYYY-MM`, an id of a site, a code; `all` when nothing is grouped. */
  group: z.string(),
  label: z.string(),
  enrolled: count,
  completed: count,
  ongoing: count,
  /** Completed ÷ enrolled; null when nobody started. */
  rate: fraction.nullable(),
  /** The 95 % Wilson interval of the rate. */
  low: fraction.nullable(),
  high: fraction.nullable(),
  /** The rate if every ongoing course were completed: with `rate`, the span in which the final one will lie. */
  rateAtMost: fraction.nullable(),
  meanSessions: z.number().min(0).nullable(),
});
export type CompletionRow = z.infer<typeof completionRowSchema>;

export const completionReportSchema = z.object({
  definition: z.object({
    name: z.enum(completionDefinitions),
    plannedDefault: z.int(),
    withinWeeks: z.int(),
    text: z.string(),
  }),
  /** Final once every course is closed or past its 252 days. */
  final: z.boolean(),
  asOf: z.iso.datetime({ offset: true }),
  total: completionRowSchema,
  items: z.array(completionRowSchema),
});
export type CompletionReport = z.infer<typeof completionReportSchema>;

export const completionPatientSchema = z.object({
  enrollmentId: z.uuid(),
  patientId: z.uuid(),
  displayName: z.string(),
  recordNumber: z.string(),
  site: z.string(),
  diagnosis: z.string(),
  firstSessionOn: z.iso.date(),
  lastSessionOn: z.iso.date(),
  attended: count,
  attendedInWindow: count,
  planned: count,
  state: z.enum(['completed', 'ongoing', 'left']),
  closedReason: z.string().nullable(),
});
export type CompletionPatient = z.infer<typeof completionPatientSchema>;

export const completionPatientsSchema = z.object({
  /** How many there are in all: the count that was opened. */
  total: count,
  items: z.array(completionPatientSchema),
  nextCursor: z.string().nullable(),
});

export const reportSettingsSchema = z.object({
  completionDefinition: z.enum(completionDefinitions),
});
export const reportSettingsRequestSchema = z.strictObject({
  completionDefinition: z.enum(completionDefinitions),
});

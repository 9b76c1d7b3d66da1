import * as z from 'zod';
import { recurrenceFault } from '../scheduling/recurrence-rule';
import { localDateField as localDate, textField } from './fields';
import { classKindSchema } from './schedule-contract';
import './zod';

const localTime = z.string().regex(/^([01]\d|2[0-3]):[0-5]\d$/, 'Enter a time as HH:MM');

const templateFields = {
  name: textField(80, 'Enter a name'),
  kind: classKindSchema,
  /** An RFC 5545 rule of dates, such as FREQ=WEEKLY;BYDAY=MO,WE,FR */
  recurrence: z
    .string()
    .max(200)
    .refine((rule) => recurrenceFault(rule) === null, {
      error: ({ input }) => `${recurrenceFault(String(input)) ?? ''}`,
    }),
  startsOn: localDate,
  endsOn: localDate.nullable(),
  /** Wall time at the site. */
  localStart: localTime,
  durationMinutes: z.int().min(10, 'At least 10 minutes').max(240, 'At most 240 minutes'),
  capacity: z.int().min(1, 'At least 1 place').max(60, 'At most 60 places'),
  monitoredPlaces: z.int().min(0),
  priceItemId: z.uuid().nullable(),
};

interface Bounds {
  readonly capacity: number;
  readonly monitoredPlaces: number;
  readonly startsOn: string;
  readonly endsOn: string | null;
}

/** Faults of fields that only show when seen together. */
const together = <T extends z.ZodType<Bounds>>(schema: T) =>
  schema
    .refine(({ monitoredPlaces, capacity }) => monitoredPlaces <= capacity, {
      path: ['monitoredPlaces'],
      message: 'No more monitored places than places',
    })
    .refine(({ startsOn, endsOn }) => endsOn === null || endsOn >= startsOn, {
      path: ['endsOn'],
      message: 'Choose an end on or after the start',
    });

/** `POST /api/class-templates` */
export const newClassTemplateSchema = together(
  z.strictObject({ siteId: z.uuid(), ...templateFields }),
);
export type NewClassTemplate = z.infer<typeof newClassTemplateSchema>;

/** `PUT /api/class-templates/:id` */
export const classTemplateChangeSchema = together(
  z.strictObject({ ...templateFields, version: z.int().min(1) }),
);
export type ClassTemplateChange = z.infer<typeof classTemplateChangeSchema>;

export const classTemplateSchema = z.object({
  ...templateFields,
  id: z.uuid(),
  siteId: z.uuid(),
  version: z.int(),
});
export type ClassTemplate = z.infer<typeof classTemplateSchema>;

/** What an edit could not change: dates that hold more bookings than the new number of places. */
export const savedClassTemplateSchema = z.object({
  template: classTemplateSchema,
  keptPlaces: z.array(z.object({ localDate: z.iso.date(), booked: z.int() })),
});
export type SavedClassTemplate = z.infer<typeof savedClassTemplateSchema>;

/** `GET /api/class-templates?siteId`, with the prices that a class may have. */
export const classTemplatesQuerySchema = z.strictObject({ siteId: z.uuid() });

export const classTemplatesResponseSchema = z.object({
  items: z.array(classTemplateSchema),
  nextCursor: z.null(),
  prices: z.array(
    z.object({ id: z.uuid(), name: z.string(), amountMinor: z.int(), currency: z.string() }),
  ),
});
export type ClassTemplates = z.infer<typeof classTemplatesResponseSchema>;

/** `POST /api/closures`: a local date on which a site holds no class. */
export const closureRequestSchema = z.strictObject({
  siteId: z.uuid(),
  localDate,
  reason: textField(200, 'Enter a reason'),
});
export type ClosureRequest = z.infer<typeof closureRequestSchema>;

export const closureSchema = z.object({
  id: z.uuid(),
  siteId: z.uuid(),
  localDate: z.iso.date(),
  reason: z.string(),
});
export type Closure = z.infer<typeof closureSchema>;

export const closuresQuerySchema = z.strictObject({ siteId: z.uuid(), from: localDate });
export const closuresResponseSchema = z.object({
  items: z.array(closureSchema),
  nextCursor: z.null(),
});

/** How many appointments a closure cancelled. */
export const closedResponseSchema = z.object({ closure: closureSchema, cancelled: z.int() });

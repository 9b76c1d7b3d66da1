import * as z from 'zod';
import { enrollmentStatusSchema } from './patients-contract';
import './zod';

const count = z.int().min(0);

/** A session that was attended, as its signed record tells it. */
const attendedSchema = z.object({
  localDate: z.iso.date(),
  /** Mean of the readings at exercise, whole bpm; null where none was taken. */
  heartRate: z.int().nullable(),
  /** Mean effort at exercise on the Borg 6–20 scale; null where none was asked. */
  effort: z.int().nullable(),
  /** The range that the patient was told for that day, bpm; null where effort led. */
  target: z.object({ lower: z.number(), upper: z.number() }).nullable(),
});
export type AttendedSession = z.infer<typeof attendedSchema>;

const walkSchema = z.object({ performedOn: z.iso.date(), distanceMeters: z.number() });

const courseSchema = z.object({
  status: enrollmentStatusSchema,
  planned: z.int().min(1),
  done: count,
  /** Sessions booked that are still to come. */
  booked: count,
  closedOn: z.iso.date().nullable(),
  /** Earliest first; as many as are done. */
  sessions: z.array(attendedSchema),
  /** The first and the latest 6-minute walk since the event that led to the course; the same one where there is one. */
  walks: z.object({ first: walkSchema, latest: walkSchema }).nullable(),
});
export type CourseProgress = z.infer<typeof courseSchema>;

/** `GET /api/my/progress` */
export const myProgressSchema = z.object({
  site: z.object({ name: z.string(), phone: z.string() }),
  /** The course under way, else the latest; null before the first. */
  course: courseSchema.nullable(),
});
export type MyProgress = z.infer<typeof myProgressSchema>;

import * as z from 'zod';
import './zod';

export const roles = [
  'patient',
  'nurse',
  'exercise-physiologist',
  'physician',
  'front-desk',
  'director',
  'administrator',
] as const;

export const roleSchema = z.enum(roles);
export type Role = z.infer<typeof roleSchema>;

/** Everyone but patients. */
export const staffRoles: readonly Role[] = roles.filter((role) => role !== 'patient');

/** The page that reset and invitation links open; the token stands in the fragment: `/set-password#token=…`. */
export const setPasswordPath = '/set-password';

/** A single-factor password has at least 15 characters and no rule about their kinds (NIST SP 800-63B-4, 3.1.1.2). */
export const passwordLength = { minimum: 15, maximum: 128 } as const;

export const emailSchema = z.email('Enter an e-mail address like name@clinic.example').max(254);

export const newPasswordSchema = z
  .string()
  .min(passwordLength.minimum, `Use at least ${passwordLength.minimum} characters`)
  .max(passwordLength.maximum, `Use at most ${passwordLength.maximum} characters`);

export const sessionUserSchema = z.object({
  id: z.uuid(),
  displayName: z.string(),
  email: z.string(),
  roles: z.array(roleSchema),
  /** The person's own patient record, when there is one. */
  patientId: z.uuid().nullable(),
});
export type SessionUser = z.infer<typeof sessionUserSchema>;

export const demoAccountSchema = z.object({
  label: z.string(),
  email: z.string(),
  password: z.string(),
});
export type DemoAccount = z.infer<typeof demoAccountSchema>;

/** `GET /api/auth/session` */
export const sessionResponseSchema = z.object({
  user: sessionUserSchema.nullable(),
  /** Whether the product shows invented people; every page then says so. */
  demo: z.boolean(),
  /** Accounts to try, [] outside demo mode. */
  demoAccounts: z.array(demoAccountSchema),
});
export type SessionResponse = z.infer<typeof sessionResponseSchema>;

/** `POST /api/auth/sign-in`. An old password may be of any length: only its match counts. */
export const signInRequestSchema = z.strictObject({
  email: emailSchema,
  password: z.string().min(1, 'Enter your password').max(1000),
});
export type SignInRequest = z.infer<typeof signInRequestSchema>;

export const signInResponseSchema = z.union([
  z.object({ user: sessionUserSchema }),
  z.object({ secondFactorRequired: z.literal(true) }),
]);
export type SignInResponse = z.infer<typeof signInResponseSchema>;

/** `POST /api/auth/forgotten-password` → 204 whether or not the address exists. */
export const forgottenPasswordRequestSchema = z.strictObject({ email: emailSchema });
export type ForgottenPasswordRequest = z.infer<typeof forgottenPasswordRequestSchema>;

/** `POST /api/auth/password` → 204; the token of a reset or invitation link works once. */
export const setPasswordRequestSchema = z.strictObject({
  token: z.string().min(1).max(200),
  password: newPasswordSchema,
});
export type SetPasswordRequest = z.infer<typeof setPasswordRequestSchema>;

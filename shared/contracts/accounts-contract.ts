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

/** A single-factor password has at least 15 characters and no rule about their kinds (NIST SP 800-63B-4). */
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

/** `POST /api/auth/change-password` → 204; every other session of the person ends. */
export const changePasswordRequestSchema = z.strictObject({
  currentPassword: z.string().min(1, 'Enter your current password').max(1000),
  newPassword: newPasswordSchema,
});
export type ChangePasswordRequest = z.infer<typeof changePasswordRequestSchema>;

/** The page of the one-time link that an empty program prints: `/first-administrator#token=…`. */
export const firstAdministratorPath = '/first-administrator';

const displayNameSchema = z.string().trim().min(1, 'Enter a name').max(120);

/** `POST /api/auth/first-administrator` → 204; works while nobody has an account. */
export const firstAdministratorRequestSchema = z.strictObject({
  token: z.string().min(1).max(200),
  email: emailSchema,
  displayName: displayNameSchema,
  password: newPasswordSchema,
});
export type FirstAdministratorRequest = z.infer<typeof firstAdministratorRequestSchema>;

export const accountStatusSchema = z.enum(['invited', 'active', 'disabled']);

export const userSchema = z.object({
  id: z.uuid(),
  email: z.string(),
  displayName: z.string(),
  status: accountStatusSchema,
  roles: z.array(roleSchema),
  /** The sites whose patients a member of staff may see. */
  siteIds: z.array(z.uuid()),
  medicalDirector: z.boolean(),
  /** A student's entries wait for a co-signature. */
  student: z.boolean(),
});
export type User = z.infer<typeof userSchema>;

/** `GET /api/users`, by name; `who` leaves out the others. */
export const usersQuerySchema = z.strictObject({
  who: z.enum(['staff', 'patients']).optional(),
  cursor: z.string().max(500).optional(),
  limit: z.coerce.number().int().min(1).max(100).default(25),
});
export const usersResponseSchema = z.object({
  items: z.array(userSchema),
  nextCursor: z.string().nullable(),
});
export type UsersResponse = z.infer<typeof usersResponseSchema>;

const staffRole = roleSchema.exclude(['patient']);

/** `POST /api/users` invites a member of staff by e-mail; patients are invited from their record. */
export const newUserSchema = z.strictObject({
  email: emailSchema,
  displayName: displayNameSchema,
  roles: z.array(staffRole).min(1, 'Choose at least one role').max(roles.length),
  siteIds: z.array(z.uuid()).max(200).default([]),
  medicalDirector: z.boolean().default(false),
  student: z.boolean().default(false),
});
export type NewUser = z.output<typeof newUserSchema>;

/** `PATCH /api/users/:id`: what is left out stays. */
export const userChangeSchema = z.strictObject({
  displayName: displayNameSchema.optional(),
  roles: z.array(roleSchema).min(1, 'Choose at least one role').max(roles.length).optional(),
  siteIds: z.array(z.uuid()).max(200).optional(),
  medicalDirector: z.boolean().optional(),
  student: z.boolean().optional(),
  disabled: z.boolean().optional(),
});
export type UserChange = z.infer<typeof userChangeSchema>;

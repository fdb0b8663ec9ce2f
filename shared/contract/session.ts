import { z } from 'zod'
import { guestSessionSchema } from './guest.ts'

export const installationRoles = ['administrator', 'catalog-editor', 'member'] as const
export const installationRoleSchema = z.enum(installationRoles)
export type InstallationRole = z.infer<typeof installationRoleSchema>

export const emailSchema = z
  .string()
  .trim()
  .max(254)
  .pipe(z.email('write an e-mail address, as "name@example.org"'))
  .transform((email) => email.toLowerCase())
export const personNameSchema = z.string().trim().min(1, 'write a name').max(80)
/** Length is what counts (OWASP ASVS 5, 6.2.1): 12 characters or more, no rules on their kind. */
export const newPasswordSchema = z.string().min(12, 'use at least 12 characters').max(200)

export const userSchema = z.object({
  id: z.string(),
  email: z.string(),
  name: z.string(),
  role: installationRoleSchema,
})
export type User = z.infer<typeof userSchema>

/** GET /api/session. `csrfToken` goes back in the `x-csrf-token` header of every request that changes something. */
export const sessionSchema = z.object({
  user: userSchema.nullable(),
  /** The guest of a link that this browser is; an account's role in the same build goes before it. */
  guest: guestSessionSchema.nullable().default(null),
  /** True once, where the browser still carried the cookie of a guest whom the link no longer lets in. */
  visitEnded: z.boolean().default(false),
  csrfToken: z.string(),
  /** True until the first account exists: the first one becomes administrator. */
  firstAccount: z.boolean(),
  /** Demo accounts, only where the installation carries the demo. */
  demoAccounts: z.array(z.object({ email: z.string(), password: z.string(), name: z.string(), what: z.string() })),
})
export type Session = z.infer<typeof sessionSchema>

export const signInRequestSchema = z.strictObject({ email: emailSchema, password: z.string().min(1).max(200) })
export const registerRequestSchema = z.strictObject({
  email: emailSchema,
  name: personNameSchema,
  password: newPasswordSchema,
})
export const askResetRequestSchema = z.strictObject({ email: emailSchema })
export const resetPasswordRequestSchema = z.strictObject({ password: newPasswordSchema })
export const changePasswordRequestSchema = z.strictObject({
  current: z.string().min(1).max(200),
  next: newPasswordSchema,
})
export const updateAccountRequestSchema = z.strictObject({ name: personNameSchema })

/** A person as the administrator sees them. */
export const accountSchema = userSchema.extend({
  createdAt: z.string(),
  lastSeenAt: z.string().nullable(),
  disabled: z.boolean(),
})
export type Account = z.infer<typeof accountSchema>
export const updateUserRequestSchema = z.strictObject({
  role: installationRoleSchema.optional(),
  disabled: z.boolean().optional(),
})

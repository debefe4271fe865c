import { z } from 'zod'

export const ROLES = ['technician', 'supervisor', 'auditor', 'administrator'] as const
export type Role = (typeof ROLES)[number]

/** Roles in the words that stand on screens and in the record. */
export const ROLE_WORDS: Record<Role, string> = {
  technician: 'Technician',
  supervisor: 'Supervisor',
  auditor: 'Auditor',
  administrator: 'Administrator',
}

export const PASSWORD_MIN = 10
export const PASSWORD_MAX = 200
export const NAME_MAX = 80
export const EMAIL_MAX = 254

export const emailSchema = z.string({ required_error: 'Enter an e-mail address' }).trim().toLowerCase()
  .min(1, 'Enter an e-mail address').max(EMAIL_MAX, `At most ${EMAIL_MAX} characters`).email('This is not an e-mail address')

export const passwordSchema = z.string({ required_error: 'Enter a password' })
  .min(PASSWORD_MIN, `At least ${PASSWORD_MIN} characters`).max(PASSWORD_MAX, `At most ${PASSWORD_MAX} characters`)

export const personNameSchema = z.string({ required_error: 'Enter a name' }).trim().min(1, 'Enter a name').max(NAME_MAX, `At most ${NAME_MAX} characters`)

export const signInSchema = z.object({
  email: emailSchema,
  password: z.string({ required_error: 'Enter the password' }).min(1, 'Enter the password').max(PASSWORD_MAX),
})

/** Wrong passwords are counted over this many minutes; then the account may try again. */
export const SIGN_IN_WINDOW_MINUTES = 15
/** So many for one account from anywhere, and so many from one address for any account. */
export const PER_ACCOUNT = 10
export const PER_ADDRESS = 50

/** The first administrator, made when nobody is there yet. */
export const setupSchema = z.object({ email: emailSchema, name: personNameSchema, password: passwordSchema })

export const personCreateSchema = z.object({
  email: emailSchema,
  name: personNameSchema,
  role: z.enum(ROLES, { errorMap: () => ({ message: 'Choose a role' }) }),
  /** given by an administrator, for one sign-in; null: they are invited by mail to choose their own */
  password: passwordSchema.nullable(),
  siteIds: z.array(z.string().uuid()).max(500).default([]),
})

export const personUpdateSchema = z.object({
  name: personNameSchema,
  role: z.enum(ROLES, { errorMap: () => ({ message: 'Choose a role' }) }),
  siteIds: z.array(z.string().uuid()).max(500),
  disabled: z.boolean(),
  password: passwordSchema.optional(),
}).partial()

/** A person as an administrator sees them; times in ISO 8601, UTC. */
export interface PersonItem {
  id: string
  email: string
  name: string
  role: Role
  siteIds: string[]
  /** The password was given by an administrator and not changed since. */
  mustChangePassword: boolean
  /** When they were invited by mail, until they choose a password. */
  invitedAt: string | null
  disabledAt: string | null
  createdAt: string
}

/** What a list of people is asked for. */
export const personFilterSchema = z.object({
  q: z.string().trim().max(100, 'At most 100 characters').default(''),
  role: z.enum(ROLES, { errorMap: () => ({ message: 'Choose a role' }) }).optional(),
  account: z.enum(['on', 'off'], { errorMap: () => ({ message: 'Choose on or off' }) }).optional(),
  after: z.string().max(1000).optional(),
})

/** A page of people, by name; `all` and `on` count every account. */
export interface PeoplePage { items: PersonItem[], next: string | null, all: number, on: number }

export interface SiteName { id: string, code: string, name: string }

/** Who is signed in, and the sites that are theirs. */
export interface Account { id: string, name: string, email: string, role: Role, mustChangePassword: boolean, sites: SiteName[] }

export const passwordChangeSchema = z.object({
  current: z.string().min(1, 'Enter the present password').max(PASSWORD_MAX),
  next: passwordSchema,
}).refine(value => value.current !== value.next, { path: ['next'], message: 'Choose a password that differs from the present one' })

/** Hours that an invitation is good, and a link to a new password. */
export const INVITATION_HOURS = 7 * 24
export const RESET_HOURS = 1
/** So many links to a new password may be asked for in an hour, for one account and from one address. */
export const RESETS_PER_ACCOUNT = 5
export const RESETS_PER_ADDRESS = 20

export const forgotSchema = z.object({ email: emailSchema })
export const passwordByLinkSchema = z.object({ password: passwordSchema })

/** What a link to a password is about. */
export interface PasswordLink { name: string, email: string, until: string }

export const DEVICE_NAME_MAX = 60
const deviceName = z.string().trim().min(1, 'Name this device').max(DEVICE_NAME_MAX, `At most ${DEVICE_NAME_MAX} characters`)
export const deviceRenameSchema = z.object({ name: deviceName })
export const deviceEnrolSchema = z.object({
  id: z.string().uuid(),
  name: deviceName,
  publicKey: z.string().regex(/^[A-Za-z0-9_-]{43}$/, 'A public key is 32 bytes in base64url'),
  password: z.string().min(1, 'Enter your password').max(PASSWORD_MAX),
  /** the device of the same person whose key this one takes the place of: it is revoked */
  replaces: z.string().uuid().nullable().default(null),
})

/** A signing device; times in ISO 8601, UTC. */
export interface DeviceItem {
  id: string
  name: string
  publicKey: string
  enrolledAt: string
  /** When the server last took an entry of it. */
  lastSeenAt: string | null
  revokedAt: string | null
  /** Who revoked it, by name. */
  revokedBy: string | null
  /** It was revoked because its browser made a new key. */
  replaced: boolean
}

import { array, boolean, string, type InferType } from 'yup'
import { body, choice, email, text } from './fields.ts'
import { newPasswordField } from './passwordRules.ts'
import { hands, roles, type Hand, type Role } from './roles.ts'

export const themes = ['system', 'light', 'dark'] as const
export type Theme = (typeof themes)[number]

/** The signed-in person as the client knows them. */
export interface SessionUser {
  id: string
  displayName: string
  email: string
  roles: Role[]
  workingHand: Hand
  theme: Theme
  newlyQualified: boolean
}

/** Answer of `GET /api/session`: who is signed in (null: nobody) and what the client must know about this clinic. */
export interface SessionView {
  user: SessionUser | null
  clinic: { name: string; timeZone: string; today: string; demo: boolean; inboxUrl: string | null }
  /** Seconds of idle time left before the server ends this sign-in; null when nobody is signed in. */
  idleSecondsLeft: number | null
  demoSignIns: { role: Role; name: string; email: string; password: string }[]
}

export const signInSchema = body({
  email: string().required('Enter your e-mail address').max(254, 'That address is too long'),
  password: string().required('Enter your password').max(1024, 'That password is too long'),
  sharedComputer: boolean().required(),
})
export type SignIn = InferType<typeof signInSchema>

export const profileSchema = body({
  workingHand: choice('a working hand', hands),
  theme: choice('a theme', themes),
})
export type Profile = InferType<typeof profileSchema>

export const passwordChangeSchema = body({
  currentPassword: string().required('Enter your current password').max(1024),
  newPassword: newPasswordField,
})
export type PasswordChange = InferType<typeof passwordChangeSchema>

export const passwordResetRequestSchema = body({ email: email() })
export type PasswordResetRequest = InferType<typeof passwordResetRequestSchema>

const linkToken = string()
  .required('This link is not complete')
  .matches(/^[A-Za-z0-9_-]{43}$/, 'This link is not complete')

export const tokenPurposes = ['invitation', 'password_reset'] as const
export type TokenPurpose = (typeof tokenPurposes)[number]

/** Sets a password through an invitation or a reset link. */
export const tokenPasswordSchema = body({ token: linkToken, newPassword: newPasswordField })
export type TokenPassword = InferType<typeof tokenPasswordSchema>

export const staffInvitationSchema = body({
  displayName: text('The name', { min: 2, max: 120 }),
  email: email(),
  roles: array(choice('a role', roles)).required().min(1, 'Choose at least one role').max(roles.length),
  newlyQualified: boolean().required(),
})
export type StaffInvitation = InferType<typeof staffInvitationSchema>

export const userChangeSchema = body({
  roles: array(choice('a role', roles)).required().min(1, 'Choose at least one role').max(roles.length),
  newlyQualified: boolean().required(),
})
export type UserChange = InferType<typeof userChangeSchema>

/** A person in the list of people (administrators and leads). */
export interface UserRow {
  id: string
  displayName: string
  email: string
  roles: Role[]
  newlyQualified: boolean
  state: 'invited' | 'active' | 'disabled'
  lastSignInAt: string | null
  version: number
  can: { change: boolean; disable: boolean; enable: boolean }
}

/** Colleagues to choose from, e.g. when a case is allocated. */
export interface TherapistChoice {
  id: string
  displayName: string
  /** Null for a therapist: how many children a colleague holds is for lead and administrator. */
  openCases: number | null
}

/** 'Anna Able (2 open cases)'; the name alone where the number may not be known. */
export const therapistChoiceLabel = ({ displayName, openCases }: TherapistChoice): string =>
  openCases === null
    ? displayName
    : `${displayName} (${openCases} open ${openCases === 1 ? 'case' : 'cases'})`

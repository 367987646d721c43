import type {
  PasswordChange,
  PasswordResetRequest,
  Profile,
  SessionView,
  SignIn,
  TokenPassword,
} from '@shared/users.ts'
import { http } from '@/api/http.ts'

/** Signing in and out, and what each person may change about their own account. */
export const sessionApi = {
  /** In the background it only asks; otherwise it also extends the sign-in. */
  current: ({ background = false } = {}) => http.get<SessionView>('/session', { background }),
  signIn: (given: SignIn) => http.post<SessionView>('/sign-in', given),
  signOut: () => http.post('/sign-out'),
  askForReset: (request: PasswordResetRequest) => http.post('/password-resets', request),
  confirmReset: (given: TokenPassword) => http.post('/password-resets/confirm', given),
  confirmInvitation: (given: TokenPassword) => http.post('/invitations/confirm', given),
  saveProfile: (profile: Profile) => http.patch<SessionView>('/me', profile),
  changePassword: (change: PasswordChange) => http.post('/me/password', change),
}

import { defineStore } from 'pinia'
import { computed, ref, shallowRef } from 'vue'
import type { Role } from '@shared/roles.ts'
import type { Profile, SessionView, SignIn } from '@shared/users.ts'
import { sessionApi } from '@/api/session.ts'
import { stateUser, watchAnswers } from '@/api/http.ts'

/**
 * `unknown` before the first answer, then `signedOut` or `signedIn`. `ended`: the sign-in of the person this page was
 * made for is over. `replaced`: another person is signed in in this browser now. In both the page is kept, covered.
 */
export type SessionState = 'unknown' | 'signedOut' | 'signedIn' | 'ended' | 'replaced'

/** Who is signed in, and what the client must know about the clinic. */
export const useSessionStore = defineStore('session', () => {
  const view = shallowRef<SessionView | null>(null)
  const state = ref<SessionState>('unknown')
  /** Milliseconds of the page's own clock at which the server ends the sign-in; null when it is not running. */
  const endsAt = ref<number | null>(null)
  /** Rises each time the same person has signed in again on a kept page: whatever failed may be sent again. */
  const resumed = ref<number>(0)
  let idleSeconds: number | null = null

  const user = computed(() => view.value?.user ?? null)
  const clinic = computed(() => view.value?.clinic ?? null)
  const demoSignIns = computed(() => view.value?.demoSignIns ?? [])
  const signedIn = computed(() => state.value === 'signedIn')

  /** Does the signed-in person hold this role (or one of these)? */
  const can = (...roles: Role[]) => user.value?.roles.some((role) => roles.includes(role)) ?? false

  const startCountdown = (seconds: number | null) => {
    endsAt.value = seconds === null ? null : performance.now() + seconds * 1000
  }

  const adopt = (answer: SessionView) => {
    view.value = answer
    stateUser(answer.user?.id ?? null)
    idleSeconds = answer.idleSecondsLeft
    startCountdown(answer.idleSecondsLeft)
    state.value = answer.user ? 'signedIn' : 'signedOut'
  }

  watchAnswers(({ status, code, background }) => {
    const made = state.value === 'signedIn' || state.value === 'ended' || state.value === 'replaced'
    if (!made) return
    if (status === 401 && code === 'signed_out') {
      state.value = 'ended'
      endsAt.value = null
    } else if (code === 'session_changed') {
      state.value = 'replaced'
      endsAt.value = null
    } else if (status < 500 && !background && state.value === 'signedIn') {
      startCountdown(idleSeconds)
    }
  })

  /** Asks the server once who is signed in; later calls wait for the same answer. A failed try may be repeated. */
  let asking: Promise<void> | null = null
  const load = () => {
    asking ??= sessionApi.current().then(adopt, (error: unknown) => {
      asking = null
      throw error
    })
    return asking
  }

  /**
   * Compares this page with the server. `extend` counts as activity and so lengthens the sign-in.
   * Never takes over another person's session into a page made for this one.
   */
  const check = async ({ extend = false } = {}) => {
    const answer = await sessionApi.current({ background: !extend })
    const mine = user.value
    if (mine && answer.user && answer.user.id !== mine.id) {
      state.value = 'replaced'
      endsAt.value = null
    } else if (mine && !answer.user) {
      state.value = 'ended'
      endsAt.value = null
    } else if (mine && state.value !== 'signedIn') {
      adopt(answer)
      resumed.value += 1
    } else if (extend) {
      adopt(answer)
    } else {
      startCountdown(answer.idleSecondsLeft)
    }
  }

  /** Signs in. Answers whether this is the person the page was made for (or the page was made for nobody). */
  const signIn = async (given: SignIn): Promise<'same' | 'other'> => {
    const before = user.value
    // The page's former person no longer counts: the server must not compare this request with them.
    stateUser(null)
    try {
      const answer = await sessionApi.signIn(given)
      if (before && answer.user?.id !== before.id) return 'other'
      adopt(answer)
      if (before) resumed.value += 1
      return 'same'
    } finally {
      if (before) stateUser(before.id)
    }
  }

  /** Ends the sign-in on the server. The caller then loads a fresh page, so that nothing stays in memory. */
  const signOut = async () => {
    await sessionApi.signOut()
    state.value = 'signedOut'
    endsAt.value = null
  }

  const saveProfile = async (profile: Profile) => {
    adopt(await sessionApi.saveProfile(profile))
  }

  return {
    user,
    clinic,
    demoSignIns,
    state,
    signedIn,
    endsAt,
    resumed,
    can,
    load,
    check,
    signIn,
    signOut,
    saveProfile,
  }
})

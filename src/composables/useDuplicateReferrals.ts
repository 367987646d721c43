import { useQuery } from '@pinia/colada'
import { computed, onScopeDispose, ref, toValue, watch, type MaybeRefOrGetter } from 'vue'
import { isDay } from '@shared/days.ts'
import { referralsApi } from '@/api/referrals.ts'

const typingPauseInMs = 400

interface TypedChild {
  givenName: string
  familyName: string
  birthDate: string | null
}

/**
 * Children and open referrals of the same name and birth date, looked for while somebody types: a pause after the last
 * key, and only once both names and a real birth date are there. Empty until then.
 */
export function useDuplicateReferrals(child: MaybeRefOrGetter<TypedChild>) {
  const asked = ref({ givenName: '', familyName: '', birthDate: '' })
  let pause: ReturnType<typeof setTimeout> | undefined
  onScopeDispose(() => clearTimeout(pause))

  watch(
    () => {
      const { givenName, familyName, birthDate } = toValue(child)
      return [givenName.trim(), familyName.trim(), birthDate ?? ''] as const
    },
    ([givenName, familyName, birthDate]) => {
      clearTimeout(pause)
      pause = setTimeout(() => (asked.value = { givenName, familyName, birthDate }), typingPauseInMs)
    },
    { immediate: true },
  )

  const complete = computed(
    () => asked.value.givenName !== '' && asked.value.familyName !== '' && isDay(asked.value.birthDate),
  )
  const lookUp = useQuery({
    key: () => ['referral-duplicates', asked.value.givenName, asked.value.familyName, asked.value.birthDate],
    query: () => referralsApi.duplicates(asked.value),
    enabled: complete,
  })
  return computed(() => (complete.value ? (lookUp.data.value ?? []) : []))
}

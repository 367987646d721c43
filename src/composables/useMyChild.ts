import { useMutation, useQuery } from '@pinia/colada'
import { computed, toValue, type MaybeRefOrGetter } from 'vue'
import type { MyConsent } from '@shared/family.ts'
import type { OwnContact } from '@shared/guardians.ts'
import { familyApi } from '@/api/family.ts'
import { wordsFor } from '@/composables/problems.ts'

type ConsentChange = { consent: MyConsent; reason: string | null }

/** A parent's page of one child: what is there, and the two things they change themselves. */
export function useMyChild(childId: MaybeRefOrGetter<string>) {
  const child = useQuery({
    key: () => ['my-child', toValue(childId)],
    query: () => familyApi.child(toValue(childId)),
  })
  const consent = useMutation({
    mutation: ({ consent: chosen, reason }: ConsentChange) =>
      chosen.consentId !== null && chosen.inForce
        ? familyApi.withdrawConsent(toValue(childId), chosen.consentId, reason)
        : familyApi.giveConsent(toValue(childId), chosen.purpose),
    onSettled: () => child.refetch(),
  })
  return {
    child,
    saveContact: (contact: OwnContact, version: number) =>
      familyApi.updateContact(toValue(childId), contact, version),
    give: (chosen: MyConsent) => consent.mutate({ consent: chosen, reason: null }),
    withdraw: (chosen: MyConsent, reason: string) =>
      consent.mutate({ consent: chosen, reason: reason.trim() === '' ? null : reason.trim() }),
    changing: computed(() =>
      consent.isLoading.value ? (consent.variables.value?.consent.purpose ?? null) : null,
    ),
    problem: computed(() =>
      consent.error.value && consent.variables.value
        ? { purpose: consent.variables.value.consent.purpose, message: wordsFor(consent.error.value) }
        : null,
    ),
  }
}

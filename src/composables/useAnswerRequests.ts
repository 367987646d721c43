import { useQuery, useQueryCache } from '@pinia/colada'
import { ref, toValue, watch, type MaybeRefOrGetter } from 'vue'
import { answerRequestsApi } from '@/api/answerRequests.ts'
import { newIdempotencyKey } from '@/api/http.ts'
import { useAction } from '@/composables/useAction.ts'
import { childKey } from '@/composables/useChild.ts'
import { useConfirmStep } from '@/composables/useConfirmStep.ts'
import type { AnswerRequestDetails, AnswerRequestView } from '@shared/answerRequests.ts'

/** What was asked about a child, and the acts of whoever asks. */
export function useAnswerRequests(child: MaybeRefOrGetter<string>) {
  const childId = () => toValue(child)
  const confirm = useConfirmStep()
  const page = ref<number>(1)
  watch(childId, () => {
    page.value = 1
  })
  const requests = useQuery({
    key: () => childKey(childId(), 'answer-requests', page.value),
    query: () => answerRequestsApi.forChild(childId(), page.value),
    placeholderData: (previous) => previous,
  })
  const cache = useQueryCache()
  // All pages: what is new moves the rest, and the first one holds the counts.
  const renew = () => cache.invalidateQueries({ key: childKey(childId(), 'answer-requests') })
  const choices = useQuery({
    key: () => childKey(childId(), 'answer-choices'),
    query: () => answerRequestsApi.choices(childId()),
  })
  const asking = ref<boolean>(false)
  let key = newIdempotencyKey()
  const begin = async () => {
    // One key for each time the form is opened: sent again after a lost answer it asks nobody twice.
    key = newIdempotencyKey()
    await choices.refetch()
    asking.value = true
  }
  const ask = (asked: AnswerRequestDetails) => answerRequestsApi.ask(childId(), asked, key)
  const asked = async () => {
    asking.value = false
    page.value = 1
    await renew()
  }

  const reminding = ref<string | null>(null)
  const reminder = useAction(async ({ id }: AnswerRequestView) => {
    reminding.value = id
    try {
      await answerRequestsApi.remind(childId(), id)
      await renew()
    } finally {
      reminding.value = null
    }
  })
  const cancelling = useAction(async ({ id, version }: AnswerRequestView) => {
    await answerRequestsApi.cancel(childId(), id, version).finally(renew)
  })
  const cancel = async (request: AnswerRequestView) => {
    const yes = await confirm({
      title: `Withdraw what ${request.askedOf} was asked?`,
      text: 'The questions close at once and a link in an e-mail ends. What was answered so far is kept.',
      action: 'Withdraw',
    })
    if (yes) await cancelling.run(request)
  }
  return { requests, page, choices, asking, begin, ask, asked, reminding, reminder, cancelling, cancel }
}

import { readonly, ref, toValue, type MaybeRefOrGetter } from 'vue'
import { useRouter } from 'vue-router'
import { alertsApi } from '@/api/alerts.ts'
import { conclusionsApi } from '@/api/conclusions.ts'
import { historiesApi } from '@/api/histories.ts'
import { newIdempotencyKey } from '@/api/http.ts'
import { measuresApi } from '@/api/measures.ts'
import { questionnairesApi } from '@/api/questionnaires.ts'
import { useAction } from '@/composables/useAction.ts'
import { useChildRefresh } from '@/composables/useChild.ts'
import type { AlertRaised } from '@shared/alerts.ts'
import type { HistoryStart } from '@shared/histories.ts'
import type { MeasureStart } from '@shared/measureSchemas.ts'
import type { QuestionnaireStart } from '@shared/questionnaires.ts'

export type Startable = 'questionnaire' | 'measure' | 'history'

const params = { questionnaire: 'questionnaireId', measure: 'measureId', history: 'historyId' } as const

/** What can be begun on the hand profile. Each opening of a form has a key of its own, so nothing starts twice. */
export function useProfileStart(child: MaybeRefOrGetter<string>) {
  const childId = () => toValue(child)
  const router = useRouter()
  const refresh = useChildRefresh(childId)
  const starting = ref<Startable | null>(null)
  let key = newIdempotencyKey()

  const open = (what: Startable) => {
    key = newIdempotencyKey()
    starting.value = what
  }
  const close = () => {
    starting.value = null
  }
  /** Leads to what was begun. */
  const go = async (what: Startable, begun: { id: string }) => {
    await router.push({ name: what, params: { childId: childId(), [params[what]]: begun.id } })
    await refresh()
  }

  let raiseKey = newIdempotencyKey()
  const raise = async (raised: AlertRaised) => {
    const alert = await alertsApi.raise(childId(), raised, raiseKey)
    // Only what was answered gets a new key: sent again after a lost answer it is the same sign.
    raiseKey = newIdempotencyKey()
    return alert
  }

  const conclusionKey = newIdempotencyKey()
  const concluding = useAction(async () => {
    const { id } = await conclusionsApi.start(childId(), { replacesId: null }, conclusionKey)
    await router.push({ name: 'conclusion', params: { childId: childId(), conclusionId: id } })
    await refresh()
  })

  return {
    starting: readonly(starting),
    open,
    close,
    go,
    refresh,
    concluding,
    startQuestionnaire: (start: QuestionnaireStart) => questionnairesApi.start(childId(), start, key),
    startMeasure: (start: MeasureStart) => measuresApi.start(childId(), start, key),
    startHistory: (start: HistoryStart) => historiesApi.start(childId(), start, key),
    raise,
  }
}

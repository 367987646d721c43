import { useQuery } from '@pinia/colada'
import { toValue, type MaybeRefOrGetter } from 'vue'
import { formsApi } from '@/api/forms.ts'

/** Every edition of every questionnaire the clinic has, in use and retired; asked for once it is `wanted`. */
export const useQuestionnaireForms = (wanted: MaybeRefOrGetter<boolean> = true) =>
  useQuery({ key: ['forms'], query: formsApi.all, enabled: () => toValue(wanted) })

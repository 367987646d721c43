import { http } from '@/api/http.ts'
import type { QuestionnaireDraft, QuestionnaireStart, QuestionnaireView } from '@shared/questionnaires.ts'

const path = (childId: string) => `/children/${childId}/questionnaires`

export const questionnairesApi = {
  start: (childId: string, start: QuestionnaireStart, idempotencyKey: string) =>
    http.post<QuestionnaireView>(path(childId), start, { idempotencyKey }),
  one: (childId: string, id: string) => http.get<QuestionnaireView>(`${path(childId)}/${id}`),
  save: (childId: string, id: string, draft: QuestionnaireDraft, version: number) =>
    http.put<QuestionnaireView>(`${path(childId)}/${id}`, draft, { ifMatch: version }),
  discard: (childId: string, id: string, version: number) =>
    http.delete<void>(`${path(childId)}/${id}`, undefined, { ifMatch: version }),
  lock: (childId: string, id: string, version: number) =>
    http.post<QuestionnaireView>(`${path(childId)}/${id}/lock`, {}, { ifMatch: version }),
}

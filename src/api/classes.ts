import type { AdviceReplyGiven, PupilPage, PupilView, TeacherClassRow } from '@shared/schoolAdvice.ts'
import { http, type ReadOptions } from '@/api/http.ts'

/** What a teacher may see and do. */
export const classesApi = {
  all: () => http.get<TeacherClassRow[]>('/classes'),
  pupils: (classId: string, query: ReadOptions['query']) =>
    http.get<PupilPage>(`/classes/${classId}/pupils`, { query }),
  pupil: (childId: string) => http.get<PupilView>(`/pupils/${childId}`),
  reply: (childId: string, adviceId: string, given: AdviceReplyGiven) =>
    http.post<PupilView>(`/pupils/${childId}/advice/${adviceId}/replies`, given),
}

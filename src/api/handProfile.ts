import { http } from '@/api/http.ts'
import type { HandProfileView } from '@shared/handProfile.ts'

export const handProfileApi = {
  forChild: (childId: string) => http.get<HandProfileView>(`/children/${childId}/hand-profile`),
}

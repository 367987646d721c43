import type { ReviewListPage, ReviewView } from '@shared/review.ts'
import { http, type ReadOptions } from '@/api/http.ts'

export const reviewApi = {
  overview: () => http.get<ReviewView>('/review'),
  list: (figure: string, query: ReadOptions['query']) =>
    http.get<ReviewListPage>(`/review/${figure}`, { query }),
}

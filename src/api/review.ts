import type { ReviewFigureId, ReviewListPage, ReviewView } from '@shared/review.ts'
import { http } from './http.ts'

export const reviewApi = {
  overview: () => http.get<ReviewView>('/review'),
  list: (figure: ReviewFigureId, query: { page?: number }) =>
    http.get<ReviewListPage>(`/review/${figure}`, { query }),
}

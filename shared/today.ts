import type { Attention } from './attention.ts'

/** One thing that waits for this person, most pressing first. */
export interface TodayItem {
  id: string
  title: string
  detail: string
  level: Attention
  to: string
  taskId: string | null
}

export interface TodayView {
  greeting: string
  groups: { id: string; label: string; total: number; items: TodayItem[] }[]
}

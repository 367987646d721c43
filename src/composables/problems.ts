import { HttpProblem } from '@/api/http.ts'

/** Status of a refused request; 0 when no answer came; null when the failure is of another kind. */
export const statusOf = (error: unknown): number | null =>
  error instanceof HttpProblem ? error.status : null

/** Sentences for the person: what happened, what was kept, what to do. */
export function wordsFor(error: unknown): string {
  if (error instanceof HttpProblem) return error.message
  return 'This page met something it was not made for, so it stopped before it was done. Load the page again and look whether it was saved.'
}

/** Did the person or the page itself stop this request? Then there is nothing to report. */
export const wasStopped = (error: unknown) => error instanceof DOMException && error.name === 'AbortError'

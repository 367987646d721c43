/** What every refused request answers, in one shape. */
export interface Problem {
  /** Stable word for programs, e.g. `invalid`, `stale`, `not_found`, `signed_out`. */
  code: string
  /** One or two sentences for people: what happened, what was kept, what to do. */
  message: string
  /** For 422: message by field path, e.g. `carers[0].email`. */
  fields?: Record<string, string>
  /** For 409 after a stale save: what is stored now. */
  current?: unknown
  requestId: string
}

import { type InferType } from 'yup'
import { body, choice, text } from './fields.ts'

/** Where a child's episode of care stands. */
export const episodeStates = [
  'referred',
  'triaged',
  'waiting',
  'consented',
  'assessing',
  'formulated',
  'active',
  'review',
  'discharged',
  'advice_only',
  'redirected',
  'declined',
  'moved_away',
  'consent_withdrawn',
  'closed_unseen',
] as const
export type EpisodeState = (typeof episodeStates)[number]

export const episodeStateLabels: Record<EpisodeState, string> = {
  referred: 'Referred',
  triaged: 'Triaged',
  waiting: 'Waiting',
  consented: 'Consent given',
  assessing: 'Assessing',
  formulated: 'Conclusion reached',
  active: 'In therapy',
  review: 'In review',
  discharged: 'Discharged',
  advice_only: 'Advice only',
  redirected: 'Redirected',
  declined: 'Declined',
  moved_away: 'Moved away',
  consent_withdrawn: 'Consent withdrawn',
  closed_unseen: 'Closed, not seen',
}

export const closedStates: readonly EpisodeState[] = [
  'discharged',
  'advice_only',
  'redirected',
  'declined',
  'moved_away',
  'consent_withdrawn',
  'closed_unseen',
]
const exits: readonly EpisodeState[] = closedStates.filter((state) => state !== 'discharged')

export const isOpen = (state: EpisodeState) => !closedStates.includes(state)

const onward: Record<EpisodeState, readonly EpisodeState[]> = {
  referred: ['triaged'],
  triaged: ['waiting', 'consented'],
  waiting: ['consented'],
  consented: ['assessing'],
  assessing: ['formulated'],
  formulated: ['active', 'review', 'discharged'],
  active: ['review', 'discharged'],
  review: ['active', 'discharged'],
  discharged: [],
  advice_only: [],
  redirected: [],
  declined: [],
  moved_away: [],
  consent_withdrawn: [],
  closed_unseen: [],
}

/** States that may follow; the exits are open from any state that is not closed. */
export const nextStates = (from: EpisodeState): EpisodeState[] =>
  isOpen(from) ? [...onward[from], ...exits] : []

export const stateChangeSchema = body({
  to: choice('the next state', episodeStates),
  reason: text('The reason', { min: 2, max: 500 }),
})
export type StateChange = InferType<typeof stateChangeSchema>

export interface StateChangeView {
  from: EpisodeState | null
  to: EpisodeState
  reason: string
  by: string
  at: string
}

import type { AlertPage } from '@shared/alerts.ts'
import type { AnswerRequestPage } from '@shared/answerRequests.ts'
import { conclusionStateLabels, type ConclusionView } from '@shared/conclusions.ts'
import type { HandProfileView } from '@shared/handProfile.ts'
import type { HistoryView } from '@shared/histories.ts'

/** '3', or '3, 1 in draft': how many there are and what is still open. */
export function countWords(all: readonly { lockedAt: string | null; replacedById: string | null }[]): string {
  const holding = all.filter(({ replacedById }) => replacedById === null)
  if (holding.length === 0) return 'none'
  const drafts = holding.filter(({ lockedAt }) => lockedAt === null).length
  return drafts === 0 ? String(holding.length) : `${holding.length}, ${drafts} in draft`
}

/** The conclusion to go to: the one being written, else the one that holds; null when there is none. */
export const currentConclusion = (conclusions: readonly ConclusionView[]): ConclusionView | null =>
  conclusions.find(({ state }) => state === 'draft') ??
  conclusions.find(({ replacedById }) => replacedById === null) ??
  null

/** How many still wait for an answer, of all that were asked. */
function askedWords({ total, waiting }: AnswerRequestPage): string {
  if (total === 0) return 'nobody'
  return waiting === 0 ? 'all back or ended' : `${waiting} waiting`
}

function signWords({ total, open }: AlertPage): string {
  if (open > 0) return `${open} open`
  return total === 0 ? 'none' : 'none open'
}

function concludedWords(conclusions: readonly ConclusionView[]): string {
  const current = currentConclusion(conclusions)
  return current === null ? 'none' : conclusionStateLabels[current.state].toLowerCase()
}

export interface ProfilePart {
  id: string
  label: string
  /** Null until it is known. */
  state: string | null
}

/** The contents of the page with the state of each part; a part that did not load yet has none. */
export const profileContents = (read: {
  profile: HandProfileView | undefined
  histories: HistoryView[] | undefined
  requests: AnswerRequestPage | undefined
  alerts: AlertPage | undefined
  conclusions: ConclusionView[] | undefined
}): ProfilePart[] => [
  {
    id: 'questionnaires',
    label: 'Questionnaires',
    state: read.profile ? countWords(read.profile.questionnaires) : null,
  },
  { id: 'measures', label: 'Measures', state: read.profile ? countWords(read.profile.measures) : null },
  { id: 'history', label: 'History', state: read.histories ? countWords(read.histories) : null },
  { id: 'asked', label: 'Asked', state: read.requests ? askedWords(read.requests) : null },
  { id: 'signs', label: 'Warning signs', state: read.alerts ? signWords(read.alerts) : null },
  {
    id: 'conclusion',
    label: 'Conclusion',
    state: read.conclusions ? concludedWords(read.conclusions) : null,
  },
]

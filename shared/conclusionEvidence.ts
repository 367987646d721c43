import type { EvidenceChoice, EvidenceKind } from './conclusions.ts'
import { formatDay, type Day } from './days.ts'
import type { FormScore } from './forms.ts'
import { sampleTaskLabels, type SampleTask } from './handwriting.ts'
import { historyInformants, type HistoryInformant } from './histories.ts'
import { formatQuotient } from './laterality.ts'
import {
  measureKindLabels,
  type HandSummary,
  type MeasureKind,
  type MeasureScore,
  type SideSummary,
  type SkillScore,
} from './measures.ts'
import { informantLabels, type Informant } from './questionnaires.ts'
import { sessionTypeLabels, type SessionType } from './sessionNotes.ts'

/** Something closed on the child's record that a conclusion may rest on. */
export interface EvidenceRow {
  kind: EvidenceKind
  id: string
  on: Day
  /** Title of the form; the stored word for kind of measure, task, session or writing hand. Null where there is none. */
  what: string | null
  /** Who answered; null where nobody was asked. */
  informant: string | null
  score: FormScore | MeasureScore | null
  /** A newer closed one took its place. */
  superseded: boolean
}

/** Stand in every report; what a measure needs besides comes with the measure. */
export const reportCautions: readonly string[] = [
  'The figures tell what was answered and seen on these days. They are no diagnosis, and no norms for children are claimed.',
  'Which hand is chosen and how well each hand does are different things. They stand side by side and are not averaged.',
  'Nothing here is a reason to have a child use the other hand.',
]

const joined = (parts: readonly (string | null)[]) => parts.filter((part) => part !== null).join(', ')

const formResult = (score: FormScore): string => {
  const items = `${score.answered} ${score.answered === 1 ? 'activity' : 'activities'} answered`
  if (score.quotient !== null) return `${formatQuotient(score.quotient)}, ${items}`
  return `${score.total === null ? 'not scorable' : `total ${score.total}`}, ${items}`
}

const mean = ({ mean: value }: HandSummary, unit: SkillScore['unit']) =>
  value === null ? 'not measured' : `${value.toFixed(1)}${unit === 'seconds' ? ' s' : ''}`

const side = (name: string, { side: found }: SideSummary) => (found === null ? null : `${name} ${found}`)

const measureResult = (score: MeasureScore): string => {
  switch (score.kind) {
    case 'reaching':
      return `${score.left} left, ${score.right} right`
    case 'pegs':
    case 'tapping':
    case 'dots':
      return `left hand ${mean(score.left, score.unit)}, right hand ${mean(score.right, score.unit)}`
    case 'sides': {
      const found = joined([
        side('foot', score.foot),
        side('eye far off', score.eyeFar),
        side('eye near', score.eyeNear),
        side('ear', score.ear),
      ])
      return found === '' ? 'no side found' : found
    }
    case 'seating':
      if (score.marks === null) return 'size not measured'
      return score.marks.length === 0
        ? 'outside the table of furniture sizes'
        : `furniture size ${score.marks.join(' or ')}`
  }
}

const isFormScore = (score: FormScore | MeasureScore): score is FormScore => 'formVersion' in score

const resultOf = ({ kind, score }: EvidenceRow): string | null => {
  if (score === null) return kind === 'measure' ? 'not done' : null
  return isFormScore(score) ? formResult(score) : measureResult(score)
}

const writingHandWords: Record<string, string> = {
  left: 'wrote with the left hand',
  right: 'wrote with the right hand',
  swaps: 'changed hands while writing',
}

const historyWords: Record<HistoryInformant, string> = {
  guardian: 'History from the family',
  therapist: 'History taken by the therapist',
}

const isHistoryInformant = (word: string): word is HistoryInformant =>
  (historyInformants as readonly string[]).includes(word)

const headOf = ({ kind, what, informant }: EvidenceRow): string => {
  switch (kind) {
    case 'questionnaire':
      return joined([what, informant && (informantLabels[informant as Informant] ?? informant)])
    case 'measure':
      return measureKindLabels[what as MeasureKind] ?? 'Measure'
    case 'history':
      return informant !== null && isHistoryInformant(informant) ? historyWords[informant] : 'History'
    case 'writing_observation':
      return 'Writing observed'
    case 'sample':
      return `Handwriting sample${what ? `: ${sampleTaskLabels[what as SampleTask].toLowerCase()}` : ''}`
    case 'session_note':
      return `Note of ${what ? sessionTypeLabels[what as SessionType].toLowerCase() : 'a session'}`
  }
}

/** A piece of evidence as one line: 'Reaching across the midline, 3 Mar 2026: 14 left, 7 right'. */
export function evidenceWords(row: EvidenceRow): string {
  const result =
    row.kind === 'writing_observation' ? row.what && (writingHandWords[row.what] ?? null) : resultOf(row)
  const line = `${headOf(row)}, ${formatDay(row.on)}${result ? `: ${result}` : ''}`
  return row.superseded ? `${line} (a newer one took its place)` : line
}

export const evidenceChoice = (row: EvidenceRow): EvidenceChoice => ({
  kind: row.kind,
  id: row.id,
  on: row.on,
  words: evidenceWords(row),
})

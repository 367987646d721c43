import type { AdviceFacts } from './adviceFacts.ts'

export const adviceAudiences = ['teacher', 'parent', 'child', 'therapist'] as const
export type AdviceAudience = (typeof adviceAudiences)[number]

/** How firm the ground is. Where sources of two kinds stand behind an item the weaker kind is shown. */
export const adviceGrades = ['peer_reviewed', 'professional_consensus', 'common_practice'] as const
export type AdviceGrade = (typeof adviceGrades)[number]
export const adviceGradeLabels: Record<AdviceGrade, string> = {
  peer_reviewed: 'Peer-reviewed study',
  professional_consensus: 'Therapists’ or health-service guidance',
  common_practice: 'Common practice',
}

export interface AdviceItem {
  id: string
  /** What to do. */
  text: string
  /** Why it helps, in one plain sentence for a teacher. */
  because: string
  audiences: readonly AdviceAudience[]
  /** Completed years, both included. */
  ageFrom: number
  ageTo: number
  /** Printed with the item. */
  caution: string | null
  grade: AdviceGrade
  source: string
  /** Only for a child known to write with the left hand. */
  needsLeftWriter: boolean
  /** Holds for letters that run left to right and is not carried over to scripts that run the other way. */
  leftToRightOnly: boolean
  /** The fact that calls for the item, in words ("the page sits right of the middle"); null when none does. */
  offeredFor: (facts: AdviceFacts) => string | null
}

/** '−3 cm', '20°': measures as they stand in a reason. */
export const measure = (value: number, unit: string): string =>
  `${value < 0 ? '−' : ''}${Math.round(Math.abs(value) * 10) / 10}${unit === '°' ? '' : ' '}${unit}`

/** `words` when the fact is known to be true. */
export const whenTrue = (fact: boolean | null, words: string): string | null => (fact === true ? words : null)

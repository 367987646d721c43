import type { WritingHand } from './children.ts'
import { asksToSwitchHand } from './handSwitching.ts'
import { bareScores, checkWording } from './wording.ts'

/**
 * Why a sentence of a therapist cannot go to a school, in words; null when it can. A school gets what to do and why it
 * helps: no scores, no judging words, and never the advice to use another hand.
 */
export function teacherTextProblem(text: string, writingHand: WritingHand | null): string | null {
  const hand = writingHand === 'swaps' ? null : writingHand
  if (asksToSwitchHand(text, hand))
    return 'We do not advise changing a child’s hand. Say what helps this hand.'
  const [blocked] = checkWording(text).filter((hit) => hit.level === 'blocked')
  if (blocked) return `“${blocked.text}” cannot go to a school. ${blocked.why}`
  const [score] = bareScores(text)
  return score ? `“${score.text}” is a score. Tell the school what was seen, not the figure.` : null
}

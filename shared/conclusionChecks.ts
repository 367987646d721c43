import {
  conclusionTexts,
  type ConclusionContent,
  type ConclusionFinding,
  type ConclusionText,
  type HandPreference,
} from './conclusions.ts'
import { asksToSwitchHand } from './handSwitching.ts'
import type { Hand } from './roles.ts'
import { sentencesOf } from './sentences.ts'
import { checkWording } from './wording.ts'

const handOf: Record<HandPreference, Hand | null> = {
  left_settled: 'left',
  left_emerging: 'left',
  right_settled: 'right',
  right_emerging: 'right',
  mixed_steady_by_task: null,
  swaps_within_task: null,
  possibly_switched: null,
  unclear: null,
}

/** The hand a conclusion speaks for; null where it speaks for neither. */
export const preferredHand = (preference: HandPreference | null): Hand | null =>
  preference === null ? null : handOf[preference]

const isBlank = (text: string | null) => text === null || text.trim() === ''

/**
 * What a conclusion must say before it is signed, by field; empty when nothing is missing. `contradictions` are the
 * disagreements in the evidence: they need the therapist's word, and no more than that.
 */
export function missingForSigning(
  content: ConclusionContent,
  contradictions: readonly string[] = [],
): Record<string, string> {
  const missing: Record<string, string> = {}
  if (content.handPreference === null) missing.handPreference = 'Choose what you conclude about the hands'
  if (content.confidence === null) missing.confidence = 'Choose how sure you are'
  if (content.evidence.length === 0) missing.evidence = 'Choose at least one piece of evidence'
  if (isBlank(content.strengths)) missing.strengths = 'Write what goes well: strengths come first'
  if (isBlank(content.mattersToChild)) missing.mattersToChild = 'Write what matters to the child'
  if (isBlank(content.reasoning)) missing.reasoning = 'Write how you came to the conclusion'
  if (content.plan === null) missing.plan = 'Choose what happens next'
  if (content.plan === 'medical_review' && isBlank(content.planDetail))
    missing.planDetail = 'Write what the doctor is asked to look at, and how soon'
  if (contradictions.length > 0 && isBlank(content.aboutDisagreements))
    missing.aboutDisagreements = 'Write what you make of the disagreements listed here'
  return missing
}

const switching = {
  message:
    'We do not advise changing the hand a child uses. Say what makes the work easier for the hand in use. What was once ' +
    'asked of the child may stand here as history.',
  instead: [
    'was asked to use the right hand at age…',
    'uses the left hand for…',
    'tools made for the left hand',
  ],
}

const refused = /\b(?:not|never|no|without|nobody|instead of|rather than|n['’]t)\b/i

/** Sentences of a plan that give the work to the hand the child does not prefer. */
const workForTheOtherHand = (plan: string, hand: Hand): string[] =>
  sentencesOf(plan)
    .map(({ text }) => text)
    .filter((text) => asksToSwitchHand(text, hand) && !asksToSwitchHand(text) && !refused.test(text))

const findingsOf = (field: ConclusionText, text: string, hand: Hand | null): ConclusionFinding[] => {
  const hits = checkWording(text).map((hit): ConclusionFinding => {
    const { why: message, instead } =
      hit.ruleId === 'change-the-hand' ? { why: switching.message, instead: switching.instead } : hit
    return { field, level: hit.level, phrase: hit.text, message, instead: [...instead] }
  })
  // Only the plan asks for anything; elsewhere "draws with the right hand" is what was seen.
  const asked = field === 'planDetail' && hand !== null ? workForTheOtherHand(text, hand) : []
  return [...hits, ...asked.map((phrase) => ({ field, level: 'blocked' as const, phrase, ...switching }))]
}

/**
 * Words of a draft not to use of a child, field by field. `blocked` stops the signature; `discouraged` is shown with
 * better words. A text that would have the child change hands is blocked, told as history it is not.
 */
export function conclusionFindings(content: ConclusionContent): ConclusionFinding[] {
  const hand = preferredHand(content.handPreference)
  return conclusionTexts.flatMap((field) => {
    const text = content[field]
    return text === null ? [] : findingsOf(field, text, hand)
  })
}

/** Everything in the text itself that keeps it from being signed, by field; empty when it may be. */
export function signingProblems(
  content: ConclusionContent,
  contradictions: readonly string[],
): Record<string, string> {
  const blocked = conclusionFindings(content)
    .filter(({ level }) => level === 'blocked')
    .map(({ field, phrase, message }) => [field, `“${phrase}”: ${message}`] as const)
  // The first finding of a field stands beside it; the others follow once it is answered.
  return { ...Object.fromEntries(blocked.toReversed()), ...missingForSigning(content, contradictions) }
}

import type { AdviceFacts } from './adviceFacts.ts'
import type { AdviceAudience, AdviceItem } from './adviceItem.ts'
import { adviceItems } from './adviceItems.ts'
import type { ScriptDirection } from './referrals.ts'

export interface AdviceOffer {
  item: AdviceItem
  /** The fact behind the offer, for the therapist: "because the page sits right of the middle". May name a finding. */
  triggeredBy: string
  /** The item's caution with what this child's record adds to it. */
  caution: string | null
}

const leftToRightNote = 'This is for writing that runs left to right only.'

/** What is printed with an item: its own caution, and for a child who writes in both directions which one it is for. */
export function cautionFor(item: AdviceItem, scriptDirection: ScriptDirection | null): string | null {
  const forOneDirection = item.leftToRightOnly && scriptDirection === 'both'
  const words = [item.caution, forOneDirection ? leftToRightNote : null].filter((part) => part !== null)
  return words.length === 0 ? null : words.join(' ')
}

function offer(item: AdviceItem, facts: AdviceFacts): AdviceOffer | null {
  if (facts.ageMonths === null) return null
  const age = Math.floor(facts.ageMonths / 12)
  if (age < item.ageFrom || age > item.ageTo) return null
  if (item.needsLeftWriter && facts.writingHand !== 'left') return null
  if (item.leftToRightOnly && facts.scriptDirection !== 'ltr' && facts.scriptDirection !== 'both') return null
  const fact = item.offeredFor(facts)
  if (fact === null) return null
  return { item, triggeredBy: `because ${fact}`, caution: cautionFor(item, facts.scriptDirection) }
}

/**
 * Items of the library that the record calls for, for one audience, in the order of the library. A therapist always
 * picks from them; nothing reaches a school or family by itself.
 */
export const offeredAdvice = (facts: AdviceFacts, audience: AdviceAudience): AdviceOffer[] =>
  adviceItems
    .filter((item) => item.audiences.includes(audience))
    .map((item) => offer(item, facts))
    .filter((found) => found !== null)

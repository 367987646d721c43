import type { Hand } from './roles.ts'

/** Matches when the hand itself is meant: not a hand skill, not the right-hand side of a page. */
export const handItself = String.raw`(?![\s-]+(?:eye|control|skills?|strength|positions?|functions?|coordination|use|movements?|sizes?|spans?|over|washing|posture|hygiene|placement|muscles?|growth|signals?|tools?|side|page|corner|edge|column|margin|end|seat|drawer|shelf|wall|desk)\b)`

const whose = String.raw`(?:(?:the|a|an|her|his|their|its|my|your)\s+)?(?:\p{L}+['’]s\s+)?`
const hand = String.raw`(?:right|left|other|opposite|correct|proper|normal)[\s-]+hand(?:ed(?:ness)?)?\b${handItself}`
const change = String.raw`(?:switch|swap|chang|mov|transfer|convert|shift|turn)(?:e|es|ed|ing|s|ping|ped|ting|ted|ring|red)?`
const tool = String.raw`(?:pencil|pen|crayon|pencil grip|writing|writing hand|handedness|hands?|over)`
// Passing an object from hand to hand is play, not a change of hand.
const someone = String.raw`(?!(?:ball|bag|bean|toy|object|cup|page|paper|book|jar|lid|ruler|cube|block|coin|bead|it|thing|weight|bar|rope|card)\p{L}*\b)[\p{L}-]+`

/** "Switch to the right hand", "change his writing over to the other hand", "become right-handed". */
export const changeOfHandPatterns: readonly string[] = [
  String.raw`\b${change}\s+(?:(?:${whose}${tool}|(?:the\s+)?${someone})\s+){0,3}?(?:over\s+)?(?:in)?to\s+(?:(?:using|use|writing|write|drawing|draw)\s+(?:with\s+)?)?${whose}${hand}`,
  String.raw`\b(?:become|becomes|becoming|learns? to be|be made|turn(?:s|ed)? into|make \p{L}+)\s+(?:a\s+)?(?:right|left)[\s-]+hand(?:ed|er)\b`,
  String.raw`\b(?:right|left|other|correct|proper)\s+hand\s+(?:instead of|rather than|not)\s+${whose}(?:left|right|other|wrong)\b`,
  String.raw`\b(?:stop|stops|avoid|avoids|discourage|discourages|less|not|never|without|quit|give up)\s+(?:the\s+)?(?:us(?:e|es|ing)|writ(?:e|es|ing)|draw(?:s|ing)?)(?:\s+of)?(?:\s+(?:with|in))?\s+${whose}(?:left|right)[\s-]+hand\b`,
  String.raw`\b(?:retrain|re-train|train|convert|correct)(?:s|ed|ing)?\s+${whose}(?:(?:left|right|other|writing|preferred|dominant)[\s-]+)?(?:hand(?:edness)?|hand preference)\b${handItself}`,
]

const skilledWork = String.raw`(?:writ(?:e|es|ing)|draw(?:s|ing)?|colou?r(?:s|ing)?|hold(?:s|ing)?\s+(?:${whose}\w+\s+)?(?:pencil|pen|crayon)|pencil|pen)`
const writesWith = (side: Hand): string[] => [
  String.raw`\b${skilledWork}\s+(?:[\w'’]+\s+){0,4}?(?:with|in|by|using)\s+${whose}${side}[\s-]+hand\b`,
  String.raw`\bus(?:e|es|ing)\s+${whose}${side}[\s-]+hand\s+(?:for|to|when)\s+(?:writ(?:e|ing)|draw(?:ing)?|colou?r(?:ing)?)\b`,
]

/**
 * Does a text ask a child to change hands? Moving work to the hand the child does not write with counts; giving the
 * other hand a helper's job ("the right hand steadies the page") does not. With no known writing hand only an outright
 * change of hand counts.
 */
export function asksToSwitchHand(text: string, writingHand: Hand | null = null): boolean {
  const otherSide: Hand | null = writingHand === null ? null : writingHand === 'left' ? 'right' : 'left'
  const patterns =
    otherSide === null ? changeOfHandPatterns : [...changeOfHandPatterns, ...writesWith(otherSide)]
  return patterns.some((pattern) => new RegExp(pattern, 'iu').test(text))
}

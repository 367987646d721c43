import type { Hand } from './roles.ts'

const hand = String.raw`(?:right|left|other|opposite|correct|proper|normal)[\s-]+hand(?:ed(?:ness)?)?`
const possessive = String.raw`(?:(?:the|a|an|her|his|their|its|my|your|child['’]s)\s+)?`
const change = String.raw`(?:switch|swap|chang|mov|transfer|convert|shift|turn)(?:e|es|ed|ing|s|ping|ped|ting|ted|ring|red)?`
const tool = String.raw`(?:pencil|pen|crayon|pencil grip|writing|writing hand|handedness|hands?|over)`

/** "Switch to the right hand", "change his writing over to the other hand", "become right-handed". */
const changeOfHand = [
  String.raw`\b${change}\s+(?:${possessive}${tool}\s+)*(?:over\s+)?(?:in)?to\s+(?:(?:using|use|writing|write|drawing|draw)\s+(?:with\s+)?)?${possessive}${hand}\b`,
  String.raw`\b(?:become|becomes|becoming|learns? to be|be made|turn(?:s|ed)? into|make \w+)\s+(?:a\s+)?(?:right|left)[\s-]+hand(?:ed|er)\b`,
  String.raw`\b(?:right|left|other|correct|proper)\s+hand\s+(?:instead of|rather than|not)\s+${possessive}(?:left|right|other|wrong)\b`,
  String.raw`\b(?:stop|stops|avoid|avoids|discourage|discourages|less|not|never|without|quit|give up)\s+(?:the\s+)?(?:us(?:e|es|ing)|writ(?:e|es|ing)|draw(?:s|ing)?)(?:\s+of)?(?:\s+(?:with|in))?\s+${possessive}(?:left|right)[\s-]+hand\b`,
  String.raw`\b(?:retrain|re-train|train|convert|correct)(?:s|ed|ing)?\s+${possessive}(?:(?:left|right|other|writing|preferred|dominant)[\s-]+)?(?:hand(?:edness)?|hand preference)\b`,
]

const skilledWork = String.raw`(?:writ(?:e|es|ing)|draw(?:s|ing)?|colou?r(?:s|ing)?|hold(?:s|ing)?\s+(?:${possessive}\w+\s+)?(?:pencil|pen|crayon)|pencil|pen)`
const writesWith = (side: Hand): string[] => [
  String.raw`\b${skilledWork}\s+(?:[\w'’]+\s+){0,4}?(?:with|in|by|using)\s+${possessive}${side}[\s-]+hand\b`,
  String.raw`\bus(?:e|es|ing)\s+${possessive}${side}[\s-]+hand\s+(?:for|to|when)\s+(?:writ(?:e|ing)|draw(?:ing)?|colou?r(?:ing)?)\b`,
]

/**
 * Does a text ask a child to change hands? Moving work to the hand the child does not write with counts; giving the
 * other hand a helper's job ("the right hand steadies the page") does not. With no known writing hand only an outright
 * change of hand counts.
 */
export function asksToSwitchHand(text: string, writingHand: Hand | null = null): boolean {
  const otherSide: Hand | null = writingHand === null ? null : writingHand === 'left' ? 'right' : 'left'
  const patterns = otherSide === null ? changeOfHand : [...changeOfHand, ...writesWith(otherSide)]
  return patterns.some((pattern) => new RegExp(pattern, 'iu').test(text))
}

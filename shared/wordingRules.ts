import { changeOfHandPatterns, handItself } from './handSwitching.ts'

export type WordingLevel = 'blocked' | 'discouraged'

export interface WordingRule {
  id: string
  /** Regular-expression sources, matched without regard to case; straight apostrophes and hyphens stand for all kinds. */
  patterns: readonly string[]
  level: WordingLevel
  why: string
  instead: readonly string[]
  /** Allowed where the sentence tells what was once asked of the child, or says that it is not done. */
  allowedAsHistory?: true
}

const hand = String.raw`hands?\b${handItself}`
const possessive = String.raw`(?:(?:the|her|his|their|its|my|your|child's)\s+)?`
const preference = String.raw`(?:hand\s+)?(?:dominance|preference|laterality|handedness|lateralisation)`

/** Words not to use of a child who is left-handed or still choosing a hand. Nothing is wrong with either. */
export const wordingRules: readonly WordingRule[] = [
  {
    id: 'wrong-hand',
    patterns: [String.raw`\bwrong[\s-]+hand(?:s|ed(?:ness)?|er)?\b`],
    level: 'blocked',
    why: 'No hand is the wrong one.',
    instead: ['the left hand', 'the other hand', 'the hand the child does not usually use'],
  },
  {
    id: 'good-or-bad-hand',
    patterns: [
      String.raw`(?<!\b(?:lend|lends|lending|gave|give|gives|need|needs)\s+a\s+)\bgood\s+(?!hands\b)${hand}`,
      String.raw`\bbad\s+${hand}`,
    ],
    level: 'blocked',
    why: 'It makes one hand sound better than the other.',
    instead: ['leading hand', 'helper hand', 'the left hand', 'the right hand'],
  },
  {
    id: 'correct-hand',
    patterns: [String.raw`\b(?:the|her|his|their|a|its|your|with|in)\s+(?:correct|proper)\s+${hand}`],
    level: 'blocked',
    why: 'Either hand is right for the child who uses it.',
    instead: ['the right hand', 'the left hand', 'leading hand'],
  },
  {
    id: 'suffers-from-left-handedness',
    patterns: [
      String.raw`\b(?:suffer(?:s|ed|ing)?|afflicted|a victim)\s+(?:from|with|of)\s+(?:being\s+)?left[\s-]+hand(?:ed(?:ness)?)?\b`,
    ],
    level: 'blocked',
    why: 'Left-handedness is not an illness.',
    instead: ['is left-handed', 'uses the left hand for…'],
  },
  {
    id: 'label-for-left-hander',
    patterns: [String.raw`\bleft(?:y|ie|ies)\b`, String.raw`\bsouthpaws?\b`],
    level: 'blocked',
    why: 'A nickname turns the hand into a label.',
    instead: ['is left-handed', 'a left-handed child'],
  },
  {
    id: 'judging-word',
    patterns: [
      String.raw`\bawkward(?:ly|ness)?\b(?!\s+(?:time|times|question|questions|corner|corners|shape|shapes|space))`,
      String.raw`\bclums(?:y|ily|ier|iest|iness)\b`,
      String.raw`\bmess(?:y|ily|ier|iest|iness)\b(?!\s+play\b)`,
      String.raw`\blaz(?:y|ily|ier|iest|iness)\b(?!\s+(?:eye|day|days|morning|mornings|afternoon|summer|mondays?|tuesdays?|wednesdays?|thursdays?|fridays?|saturdays?|sundays?)\b)`,
      String.raw`\bcareless(?:ly|ness)?\b`,
    ],
    level: 'blocked',
    why: 'It judges the child. Say what happens and when, and what the setting has to do with it.',
    instead: [
      'is finding … takes more effort when…',
      'the desk puts two elbows together',
      'the ink smears as the hand follows it',
    ],
  },
  {
    id: 'slur-for-left-hander',
    patterns: [
      String.raw`\b(?:cack|kack|cag|caggy|keggy|keggie|kegg|cuddy|coggy|gammy|gawk)[\s-]*(?:hand(?:ed|ers?)?|fist(?:ed)?|wift(?:y|ie|er))\b`,
      String.raw`\bcorr(?:y|ie|ey)[\s-]*(?:hand|fist)ed\b`,
      String.raw`\b(?:ham|butter)[\s-]*(?:fisted|handed|finger(?:s|ed))\b`,
      String.raw`\b(?:all|fingers\s+and)\s+thumbs\b`,
      String.raw`\btwo\s+left\s+(?:hands|feet)\b`,
    ],
    level: 'blocked',
    why: 'It mocks left-handed people.',
    instead: ['is left-handed', 'is finding … takes more effort when…'],
  },
  {
    id: 'abnormal-dominance',
    patterns: [
      String.raw`\b(?:abnormal(?:ly)?|deviant|pathological|disordered|faulty|defective)\s+${preference}\b`,
    ],
    level: 'blocked',
    why: 'Using the left hand, or both, is ordinary.',
    instead: ['is left-handed', 'is still choosing a hand', 'uses different hands for different jobs'],
  },
  {
    id: 'change-the-hand',
    patterns: [
      ...changeOfHandPatterns,
      String.raw`\b(?:re-?train|convert|cure|fix|break)(?:s|ed|en|ing)?\s+${possessive}(?:habit\s+of\s+)?(?:left|right)[\s-]*hand(?:ed(?:ness)?|er)\b`,
      String.raw`\b(?:convert|re-?train)(?:s|ed|ing)?\s+(?:him|her|them|\w+\s+)?(?:\w+\s+)?to\s+(?:the\s+|use\s+the\s+|using\s+the\s+)?right\b`,
      String.raw`\bconverted\s+left[\s-]*hand(?:ed|er)\b`,
      String.raw`\bre-?trained\s+(?:left|right)[\s-]*hand(?:ed|er)\b`,
    ],
    level: 'blocked',
    why: 'We do not advise changing a child’s hand. What was once asked of the child may be recorded.',
    instead: ['was asked to use the right hand at age…', 'writes with the left hand'],
    allowedAsHistory: true,
  },
  {
    id: 'failed',
    patterns: [String.raw`(?<!\b(?:without|never)\s)\bfail(?:s|ed|ing|ures?)?\b`],
    level: 'discouraged',
    why: 'It says what the child is not, and nothing about what would help.',
    instead: ['is finding … takes more effort when…', 'is not yet…'],
  },
  {
    id: 'still-left-handed',
    patterns: [
      String.raw`\bstill\s+(?:being\s+)?left[\s-]+handed\b`,
      String.raw`\bstill\s+(?:us(?:es|ing)|writ(?:es|ing)\s+with|prefer(?:s|ring)|choos(?:es|ing))\s+${possessive}left\b`,
    ],
    level: 'discouraged',
    why: '"Still" sounds as if it should have passed.',
    instead: ['is left-handed', 'uses the left hand for…'],
  },
  {
    id: 'hooked',
    patterns: [
      String.raw`\bhooked\b(?!\s+(?:on|up|by)\b)`,
      String.raw`\bhook(?:s|ing)?\s+(?:the|her|his|their)\s+(?:hand|wrist|arm)\b`,
    ],
    level: 'discouraged',
    why: 'It describes the child as bent. Say where the hand is.',
    instead: ['hand above the line', 'above-line writing'],
  },
  {
    id: 'confused-dominance',
    patterns: [
      String.raw`\b(?:confused|muddled|mixed[\s-]up|unresolved|poor)\s+(?:hand\s+)?(?:dominance|laterality|handedness)\b`,
    ],
    level: 'discouraged',
    why: 'The child is not confused: hand use takes its own time.',
    instead: ['is still choosing a hand', 'uses different hands for different jobs'],
  },
  {
    id: 'normal-meaning-right-handed',
    patterns: [
      String.raw`\bnormal\s+${hand}`,
      String.raw`\bnormal(?:ly)?[\s-]+handed(?:ness)?\b`,
      String.raw`\bnormal\s+(?:side|dominance|laterality|hand\s+(?:preference|dominance))\b`,
      String.raw`\bnormal\s+(?:children|pupils|kids|writers|classmates)\b`,
    ],
    level: 'discouraged',
    why: 'It makes right-handed the measure of everyone.',
    instead: ['right-handed', 'the right hand', 'most children'],
  },
  {
    id: 'poor-compliance',
    patterns: [
      String.raw`\b(?:poor|low|bad|partial)\s+complian(?:ce|t)\b`,
      String.raw`\bnon[\s-]*complian(?:ce|t)\b`,
    ],
    level: 'discouraged',
    why: 'Families fit practice into full days: say what got in the way.',
    instead: ['practice was hard to fit in'],
  },
  {
    id: 'did-not-attend',
    patterns: [
      String.raw`\bDNA(?:'?d|s|ed)?\b`,
      String.raw`\b(?:did\s+not|didn't|does\s+not|doesn't|failed\s+to)\s+attend\b`,
      String.raw`\bno[\s-]shows?\b`,
      String.raw`\bnon[\s-]*attend(?:ance|ers?)\b`,
    ],
    level: 'discouraged',
    why: 'A child depends on an adult to come.',
    instead: ['was not brought'],
  },
]

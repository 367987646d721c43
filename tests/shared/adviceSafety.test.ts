import { describe, expect, it } from 'vitest'
import { adviceItems } from '../../shared/adviceItems.ts'
import { isSafetyAdvice } from '../../shared/adviceSafety.ts'

// Common practice, no source: whatever speaks of blades, pain, a tired arm or safeguarding is a warning.
const speaksOfHarm =
  /scissors|sharpener|blades?\b|\bcut(?:s|ting)?\b|\bsnips\b|\bpain\b|\bhurts\b|arm is tired|safeguarding/i

describe('advice that warns of harm', () => {
  it.each(adviceItems.map(({ id, text, caution }) => [id, `${text} ${caution ?? ''}`] as const))(
    '%s is a warning exactly when its words speak of harm',
    (id, words) => {
      expect(isSafetyAdvice(id)).toBe(speaksOfHarm.test(words))
    },
  )
})

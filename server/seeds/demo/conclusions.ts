import type { DemoConclusion } from './assessmentTypes.ts'
import { conclusionsAdaeze } from './conclusionsAdaeze.ts'
import { conclusionsMairi } from './conclusionsMairi.ts'
import { conclusionsRohan } from './conclusionsRohan.ts'
import { conclusionsTomasz } from './conclusionsTomasz.ts'

/** What the therapists concluded; of one child in the order of writing. */
export const conclusions: readonly DemoConclusion[] = [
  ...conclusionsAdaeze,
  ...conclusionsMairi,
  ...conclusionsRohan,
  ...conclusionsTomasz,
]

import { children01to05 } from './children01to05.ts'
import { children06to10 } from './children06to10.ts'
import { children11to15 } from './children11to15.ts'
import { children16to20, gethinAgain } from './children16to20.ts'
import { children21to25 } from './children21to25.ts'
import { children26to30 } from './children26to30.ts'
import { children31to35 } from './children31to35.ts'
import { children36to40, conradAgain } from './children36to40.ts'
import type { DemoChild, DemoLaterReferral } from './demoTypes.ts'

/** The forty children of the demo, in the order of the scenario. */
export const children: readonly DemoChild[] = [
  ...children01to05,
  ...children06to10,
  ...children11to15,
  ...children16to20,
  ...children21to25,
  ...children26to30,
  ...children31to35,
  ...children36to40,
]

/** Referrals about children who are known already. They are entered and left undecided. */
export const laterReferrals: readonly DemoLaterReferral[] = [
  { child: 19, referral: gethinAgain },
  { child: 40, referral: conradAgain },
]

import type { DemoObservation } from './demoTypes.ts'
import { observations01to20 } from './observations01to20.ts'
import { observations21to40 } from './observations21to40.ts'

/** What was seen of posture, paper, pencil and place. */
export const observations: readonly DemoObservation[] = [...observations01to20, ...observations21to40]

import type { DemoHistory } from './assessmentTypes.ts'
import { histories01to20 } from './histories01to20.ts'
import { histories21to40 } from './histories21to40.ts'

/** How things began, child by child in order of telling. */
export const histories: readonly DemoHistory[] = [...histories01to20, ...histories21to40]

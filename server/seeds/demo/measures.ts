import type { DemoMeasure } from './assessmentTypes.ts'
import { measures01to20 } from './measures01to20.ts'
import { measures21to40 } from './measures21to40.ts'

/** Reaching, skill, sides and seats, child by child. */
export const measures: readonly DemoMeasure[] = [...measures01to20, ...measures21to40]

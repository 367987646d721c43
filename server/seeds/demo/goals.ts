import type { DemoGoal } from './demoTypes.ts'
import { goals01to06 } from './goals01to06.ts'
import { goals13to18 } from './goals13to18.ts'
import { goals21to28 } from './goals21to28.ts'
import { goals29to40 } from './goals29to40.ts'

/** Goals in the order in which each child's were set; notes name them by that place. */
export const goals: readonly DemoGoal[] = [...goals01to06, ...goals13to18, ...goals21to28, ...goals29to40]

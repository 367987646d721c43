import type { DemoNote } from './demoTypes.ts'
import { notesAdaeze1 } from './notesAdaeze1.ts'
import { notesAdaeze2 } from './notesAdaeze2.ts'
import { notesMairi } from './notesMairi.ts'
import { notesRohan } from './notesRohan.ts'
import { notesTomasz } from './notesTomasz.ts'

/** All session notes of the demo, by therapist. */
export const sessionNotes: readonly DemoNote[] = [
  ...notesAdaeze1,
  ...notesAdaeze2,
  ...notesTomasz,
  ...notesMairi,
  ...notesRohan,
]

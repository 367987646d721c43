import { eyeWords } from '@/components/measures/measureWords.ts'
import { earActions, eyeActions, footActions } from '@shared/measures.ts'
import { earActionLabels, footActionLabels } from '@shared/sides.ts'

export type SideGroup = 'foot' | 'eye' | 'ear'

interface SideGroupRows {
  id: SideGroup
  words: string
  actions: { action: string; words: string }[]
}

const rows = <Action extends string>(actions: readonly Action[], words: Record<Action, string>) =>
  actions.map((action) => ({ action, words: words[action] }))

/** Foot, eye and ear with their actions, in the order they are recorded. */
export const sideGroups: SideGroupRows[] = [
  { id: 'foot', words: 'Foot', actions: rows(footActions, footActionLabels) },
  { id: 'eye', words: 'Eye', actions: rows(eyeActions, eyeWords) },
  { id: 'ear', words: 'Ear', actions: rows(earActions, earActionLabels) },
]

export const tryWords = ['1st try', '2nd try', '3rd try'] as const

import type { ConclusionView } from '@shared/conclusions.ts'

/** '3', or '3, 1 draft': how many there are and what is still open. */
export function countWords(all: readonly { lockedAt: string | null; replacedById: string | null }[]): string {
  const holding = all.filter(({ replacedById }) => replacedById === null)
  if (holding.length === 0) return 'none'
  const drafts = holding.filter(({ lockedAt }) => lockedAt === null).length
  return drafts === 0 ? String(holding.length) : `${holding.length}, ${drafts} in draft`
}

/** The conclusion to go to: the one being written, else the one that holds; null when there is none. */
export const currentConclusion = (conclusions: readonly ConclusionView[]): ConclusionView | null =>
  conclusions.find(({ state }) => state === 'draft') ??
  conclusions.find(({ replacedById }) => replacedById === null) ??
  null

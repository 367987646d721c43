import { isOpen, type EpisodeState } from '@shared/episodes.ts'

/** The tone that supports the word of a state: under way, waiting for somebody, or closed. */
export function stateTone(state: EpisodeState): 'petal' | 'rain' | 'pollen' | 'plain' {
  if (!isOpen(state)) return 'plain'
  if (state === 'active' || state === 'assessing' || state === 'formulated') return 'petal'
  return state === 'review' ? 'pollen' : 'rain'
}

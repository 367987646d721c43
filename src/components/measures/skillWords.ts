import type { SkillKind } from '@shared/measures.ts'

/** What each task calls its field, its unit and its space bar. */
export const skillWords: Record<SkillKind, { field: string; unit: string; space: string }> = {
  pegs: { field: 'Or type the time', unit: 's', space: 'starts and stops' },
  tapping: { field: 'Or type the count', unit: 'taps', space: 'taps; the first tap starts the time' },
  dots: { field: 'Dots inside their circle', unit: 'dots', space: 'starts the time' },
}

/** The word on the main button. Tapping has its start on the pad, so its button only readies it. */
export function mainWords(kind: SkillKind, running: boolean): string {
  if (kind === 'tapping') return 'Ready'
  if (kind === 'pegs') return running ? 'Stop' : 'Start'
  return running ? 'Time runs' : 'Start'
}

/** What a handwriting sample was of. */
export const sampleTasks = ['copy', 'alphabet', 'free'] as const
export type SampleTask = (typeof sampleTasks)[number]
export const sampleTaskLabels: Record<SampleTask, string> = {
  copy: 'Copying a sentence',
  alphabet: 'Alphabet from memory',
  free: 'Own words',
}

/** Kind of writing: only samples of the same task and script are compared. */
export const sampleScripts = ['print', 'joined', 'partly_joined', 'right_to_left', 'other'] as const
export type SampleScript = (typeof sampleScripts)[number]
export const sampleScriptLabels: Record<SampleScript, string> = {
  print: 'Separate letters',
  joined: 'Joined letters',
  partly_joined: 'Partly joined letters',
  right_to_left: 'Right-to-left script',
  other: 'Another script',
}

export const smudgeLevels = ['none', 'light', 'heavy'] as const
export type SmudgeLevel = (typeof smudgeLevels)[number]
export const smudgeLabels: Record<SmudgeLevel, string> = {
  none: 'No smudging',
  light: 'Some smudging',
  heavy: 'Much smudging',
}

/**
 * Letters per minute. A true zero stays 0; null when a part is missing or no time passed.
 * No norm is built in: tasks and scripts differ too much between studies, so a child is set beside earlier samples of their own.
 */
export function lettersPerMinute(sample: { letters: number | null; seconds: number | null }): number | null {
  if (sample.letters === null || sample.seconds === null || sample.seconds <= 0) return null
  return (sample.letters * 60) / sample.seconds
}

/** Readable letters (or words) as a percentage of those attempted; null when nothing was attempted or counted. */
export function percentLegible(sample: { legible: number | null; attempted: number | null }): number | null {
  if (sample.legible === null || sample.attempted === null || sample.attempted <= 0) return null
  return (100 * sample.legible) / sample.attempted
}

/** Speed counting readable letters only; null as for `lettersPerMinute`. */
export const legibleLettersPerMinute = (sample: {
  legible: number | null
  seconds: number | null
}): number | null => lettersPerMinute({ letters: sample.legible, seconds: sample.seconds })

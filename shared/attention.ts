/** The three attention levels, in rising order. */
export const attentionLevels = ['soon', 'due', 'overdue'] as const
export type Attention = (typeof attentionLevels)[number]
export const attentionLabels: Record<Attention, string> = { soon: 'Soon', due: 'Due', overdue: 'Overdue' }

import { createLine } from '../inLine.ts'

/** Printing a PDF is heavy: one at a time in this process, whatever it is. */
export const printInTurn = createLine({ atOnce: 1, mostWaiting: 8, retryAfterSeconds: 5 })

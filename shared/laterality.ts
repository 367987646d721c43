/** Points or marks gathered for each hand. */
export interface HandCounts {
  left: number
  right: number
}

/**
 * Laterality quotient, 100 (R - L) / (R + L), from -100 (left) to +100 (right), unrounded.
 * Null when no mark was given: 0 would read as "no preference".
 * Oldfield 1971, Neuropsychologia 9:97-113, as restated on a public common-data-elements page.
 */
export function lateralityQuotient({ left, right }: HandCounts): number | null {
  const total = left + right
  return total === 0 ? null : (100 * (right - left)) / total
}

/** One activity in the published two-mark convention; null is "no experience of it". */
export type HandMark = 'left_twice' | 'left_once' | 'both' | 'right_once' | 'right_twice' | null

const marksOf: Record<NonNullable<HandMark>, HandCounts> = {
  left_twice: { left: 2, right: 0 },
  left_once: { left: 1, right: 0 },
  both: { left: 1, right: 1 },
  right_once: { left: 0, right: 1 },
  right_twice: { left: 0, right: 2 },
}

export interface MarkScore extends HandCounts {
  answered: number
  quotient: number | null
}

function scoreMarks(marks: readonly HandMark[], most: 1 | 2): MarkScore {
  const given = marks.filter((mark) => mark !== null).map((mark) => marksOf[mark])
  const left = given.reduce((sum, mark) => sum + Math.min(mark.left, most), 0)
  const right = given.reduce((sum, mark) => sum + Math.min(mark.right, most), 0)
  return { left, right, answered: given.length, quotient: lateralityQuotient({ left, right }) }
}

/**
 * Oldfield's marks: one for the preferred hand, two where the other hand would not be used unless forced, one in each
 * column for either hand. Blanks leave both sums.
 */
export const twoMarkScore = (marks: readonly HandMark[]): MarkScore => scoreMarks(marks, 2)

/**
 * The same without usually/always: one mark for the preferred hand, one each for both. Counting activities separates
 * people as well as weighting them (Bishop et al. 1996, Br J Psychol 87:269-285, abstract).
 */
export const oneMarkScore = (marks: readonly HandMark[]): MarkScore => scoreMarks(marks, 1)

/** Degree of preference apart from its side: the size of the quotient, 0 to 100. */
export const quotientStrength = (quotient: number): number => Math.abs(quotient)

/** Side of the quotient alone. Zero has no side. */
export const quotientDirection = (quotient: number): 'left' | 'none' | 'right' =>
  quotient < 0 ? 'left' : quotient > 0 ? 'right' : 'none'

/** '−88.2', '+6.7', '0.0' with a true minus sign; 'not scorable' for null. Rounds for display only. */
export function formatQuotient(quotient: number | null): string {
  if (quotient === null) return 'not scorable'
  const digits = Math.abs(quotient).toFixed(1)
  if (Number(digits) === 0) return digits
  return `${quotient < 0 ? '−' : '+'}${digits}`
}

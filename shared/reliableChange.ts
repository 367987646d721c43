/** 1.96, as the method is published; the more exact z would change nothing that is shown. */
const limit = 1.96

/**
 * Standard error of measurement, SD √(1 − r), in the unit of the measure.
 * Throws RangeError for a negative SD or r outside 0 to 1.
 */
export function standardErrorOfMeasurement({ sd, r }: { sd: number; r: number }): number {
  if (!(sd >= 0 && r >= 0 && r <= 1)) throw new RangeError(`No standard error for SD ${sd} and r ${r}`)
  return sd * Math.sqrt(1 - r)
}

/** Standard error of a difference between two occasions: √2 SEM. */
export const standardErrorOfDifference = (sem: number): number => Math.SQRT2 * sem

/** Smallest change beyond measurement error at 95 %: 1.96 √2 SEM. */
export const minimalDetectableChange = (sem: number): number => limit * standardErrorOfDifference(sem)

export interface ReliableChange {
  sem: number
  seDifference: number
  /** Change in standard errors of the difference; null when that error is zero (r = 1 or SD = 0). */
  index: number | null
  mdc95: number
  /** Is the change beyond measurement error at 95 %? Null where the index is. */
  reliable: boolean | null
}

/** Reliable change from a standard error of measurement that was published as such. */
export function reliableChangeFromSem(sem: number, before: number, after: number): ReliableChange {
  const seDifference = standardErrorOfDifference(sem)
  const index = seDifference === 0 ? null : (after - before) / seDifference
  return {
    sem,
    seDifference,
    index,
    mdc95: minimalDetectableChange(sem),
    reliable: index === null ? null : Math.abs(index) >= limit,
  }
}

/**
 * Reliable change index, (x₂ − x₁) ÷ (SD √(2 (1 − r))). Jacobson & Truax 1991, J Consult Clin Psychol 59:12-19; the
 * square root of two was missing in a paper of 1984 and put right in 1986.
 */
export const reliableChange = (
  norms: { sd: number; r: number },
  before: number,
  after: number,
): ReliableChange => reliableChangeFromSem(standardErrorOfMeasurement(norms), before, after)

export interface Reliability {
  measure: string
  coefficient: string
  source: string
}

/** Reliabilities that were read, none of them with a standard deviation for children of one age. */
export const reliabilitiesRead: readonly Reliability[] = [
  {
    measure: 'Nine-hole pegs, 826 children of 5 to 10',
    coefficient: 'retest .81 and .79',
    source: 'Smith et al. 2000, Percept Mot Skills 90:823-843',
  },
  {
    measure: 'Nine-hole pegs, ages 3 to 85',
    coefficient: 'retest right .95, left .92',
    source: 'Wang et al. 2011, J Hand Ther 24:313-321',
  },
  {
    measure: 'Nine-hole pegs, adults',
    coefficient: 'retest right .69, left .43; between raters .97 and .99',
    source: 'Mathiowetz et al. 1985',
  },
  {
    measure: 'Difference between the hands in tapping, online',
    coefficient: 'at least .75',
    source: 'Parker et al. 2020',
  },
]

export const reliableChangeCautions: readonly string[] = [
  'Differences between the hands are less reliable than the times of each hand: retest was significant in 2 of 7 tasks ' +
    '(Provins & Cunliffe 1972, 20 people).',
  'Children get quicker with practice on pegs (Mathiowetz et al. 1985): some change is practice.',
]

/** Whether a change is told from measurement error, and why (not). */
export interface ReliableChangeNote {
  used: boolean
  why: string
  cautions: string[]
}

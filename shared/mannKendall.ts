import { normalUpperTail } from './normalDistribution.ts'

/** With so many values or fewer the exact distribution is used, as a statistics program's help page recommends. */
export const mostForExact = 10

export interface MannKendall {
  n: number
  /** Increases less decreases over all pairs. */
  s: number
  increases: number
  decreases: number
  ties: number
  /** Variance of S with the correction for ties. */
  variance: number
  /** With the correction for continuity; null when the variance is 0. */
  z: number | null
  /** In the direction of S; null when every value is the same or there is only one. */
  pOneSided: number | null
  pTwoSided: number | null
  method: 'exact' | 'normal' | null
}

function add(counts: Map<number, number>, key: number, more: number): void {
  const before = counts.get(key)
  counts.set(key, before === undefined ? more : before + more)
}

const tieGroups = (series: readonly number[]): number[] => {
  const counts = new Map<number, number>()
  for (const value of series) add(counts, value, 1)
  return [...counts.values()]
}

const scoreOf = (series: readonly number[]): number[] =>
  series.flatMap((later, index) => series.slice(0, index).map((earlier) => Math.sign(later - earlier)))

/**
 * Share of all orders of the values whose S is `s` or more. Ties are kept: each value is put in turn before, between or
 * behind what stands, group by group, so that 10 values need a few hundred steps and not 10! orders.
 */
function exactTail(groups: readonly number[], s: number): number {
  // Ways to interleave a tie group of `size` with `placed` others, by what each way adds to S.
  let ways = new Map([[0, 1]])
  let placed = 0
  for (const size of groups) {
    const group = interleavings(placed, size)
    const next = new Map<number, number>()
    for (const [sum, count] of ways) for (const [added, times] of group) add(next, sum + added, count * times)
    ways = next
    placed += size
  }
  let all = 0
  let tail = 0
  for (const [sum, count] of ways) {
    all += count
    if (sum >= s) tail += count
  }
  return tail / all
}

/** Numbers of ways to place `size` equal, larger values among `placed`, by the S they add. */
function interleavings(placed: number, size: number): Map<number, number> {
  let ways = new Map<string, { taken: number; sum: number; count: number }>([
    ['0|0', { taken: 0, sum: 0, count: 1 }],
  ])
  // Walk along the gaps: a larger value behind g of the smaller ones gains g and loses the rest.
  for (let gap = 0; gap <= placed; gap += 1) {
    const next: typeof ways = new Map()
    for (const { taken, sum, count } of ways.values())
      for (let more = 0; taken + more <= size; more += 1) {
        const state = { taken: taken + more, sum: sum + more * (2 * gap - placed), count }
        const key = `${state.taken}|${state.sum}`
        const known = next.get(key)
        next.set(key, known ? { ...state, count: known.count + count } : state)
      }
    ways = next
  }
  const bySum = new Map<number, number>()
  for (const { taken, sum, count } of ways.values()) if (taken === size) add(bySum, sum, count)
  return bySum
}

/**
 * Mann-Kendall test for a trend in values given in order of time: later-minus-earlier signs. Exact for ten values or
 * fewer, otherwise the normal approximation with corrections for ties and for continuity. Mann 1945, Econometrica
 * 13:245-259; Kendall 1975. Sessions of one child are not independent: a description, no proof.
 */
export function mannKendall(series: readonly number[]): MannKendall {
  const signs = scoreOf(series)
  const increases = signs.filter((sign) => sign > 0).length
  const decreases = signs.filter((sign) => sign < 0).length
  const s = increases - decreases
  const n = series.length
  const groups = tieGroups(series)
  const spread = (count: number) => count * (count - 1) * (2 * count + 5)
  const variance = (spread(n) - groups.reduce((sum, size) => sum + spread(size), 0)) / 18
  const base = { n, s, increases, decreases, ties: signs.length - increases - decreases, variance }
  if (variance === 0) return { ...base, z: null, pOneSided: null, pTwoSided: null, method: null }

  const z = (s - Math.sign(s)) / Math.sqrt(variance)
  const exact = n <= mostForExact
  const pOneSided = exact ? exactTail(groups, Math.abs(s)) : normalUpperTail(Math.abs(z))
  return {
    ...base,
    z,
    pOneSided,
    pTwoSided: Math.min(1, 2 * pOneSided),
    method: exact ? 'exact' : 'normal',
  }
}

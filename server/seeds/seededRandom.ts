/** Random numbers that come out the same for the same seed, so that a drawing or a made-up date never changes. */
export interface SeededRandom {
  /** 0 up to, not including, 1. */
  unit: () => number
  /** Evenly between -size and +size. */
  around: (size: number) => number
  /** The items in a new order. */
  shuffled: <T>(items: readonly T[]) => T[]
}

/** The generator known as mulberry32 (public domain): small, quick and good enough for pictures, not for secrets. */
export function seededRandom(seed: number): SeededRandom {
  let state = seed >>> 0
  const unit = () => {
    state = (state + 0x6d2b79f5) >>> 0
    let mixed = Math.imul(state ^ (state >>> 15), state | 1)
    mixed ^= mixed + Math.imul(mixed ^ (mixed >>> 7), mixed | 61)
    return ((mixed ^ (mixed >>> 14)) >>> 0) / 4_294_967_296
  }
  return {
    unit,
    around: (size) => (unit() * 2 - 1) * size,
    shuffled: (items) =>
      items
        .map((item) => ({ item, at: unit() }))
        .toSorted((a, b) => a.at - b.at)
        .map(({ item }) => item),
  }
}

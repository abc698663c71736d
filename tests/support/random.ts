/** Chance that is the same for the same seed: mulberry32. */
export function createRandom(seed: number) {
  let state = seed >>> 0
  const next = (): number => {
    state = (state + 0x6d2b79f5) >>> 0
    let mixed = Math.imul(state ^ (state >>> 15), state | 1)
    mixed ^= mixed + Math.imul(mixed ^ (mixed >>> 7), mixed | 61)
    return ((mixed ^ (mixed >>> 14)) >>> 0) / 2 ** 32
  }
  const below = (end: number): number => Math.floor(next() * end)
  return {
    next,
    below,
    pick: <T>(list: readonly T[]): T => list[below(list.length)] as T,
    chance: (part: number): boolean => next() < part,
  }
}
export type Random = ReturnType<typeof createRandom>

/** Sets of samples as words of 32 bits, so that a thousand samples are compared in thirty steps. */
function toBits(column: Uint8Array): Uint32Array {
  const bits = new Uint32Array(Math.ceil(column.length / 32))
  for (const [at, entry] of column.entries()) {
    if (entry !== 0) bits[at >>> 5]! |= 1 << (at & 31)
  }
  return bits
}

function areDisjoint(first: Uint32Array, second: Uint32Array): boolean {
  for (let word = 0; word < first.length; word++) {
    if ((first[word]! & second[word]!) !== 0) return false
  }
  return true
}

function meetOf(first: Uint32Array, second: Uint32Array): Uint32Array {
  return first.map((word, at) => word & second[at]!)
}

/** One column of each kind, by its position. */
function distinctColumns(columns: readonly Uint32Array[]): number[] {
  const seen = new Set<string>()
  return [...columns.keys()].filter((at) => {
    const key = columns[at]!.join()
    const isNew = !seen.has(key)
    seen.add(key)
    return isNew
  })
}

function smallFamily(
  columns: readonly Uint32Array[],
  kinds: readonly number[],
): number[] | undefined {
  const empty = kinds.find((at) => columns[at]!.every((word) => word === 0))
  if (empty !== undefined) return [empty]
  for (const [place, first] of kinds.entries()) {
    for (const second of kinds.slice(place + 1)) {
      if (areDisjoint(columns[first]!, columns[second]!)) return [first, second]
    }
  }
  for (const [place, first] of kinds.entries()) {
    for (const [further, second] of kinds.slice(place + 1).entries()) {
      const meet = meetOf(columns[first]!, columns[second]!)
      const third = kinds.slice(place + further + 2).find((at) => areDisjoint(meet, columns[at]!))
      if (third !== undefined) return [first, second, third]
    }
  }
  return undefined
}

function meetOfAll(columns: readonly Uint32Array[], family: readonly number[]): Uint32Array {
  return family.map((at) => columns[at]!).reduce(meetOf)
}

/**
 * The smallest family of columns in which no sample is met by all: exactly so up to three columns, beyond that one
 * from which none can be left out.
 * @param columns by column and sample, 0 where it is not met; equally many samples each
 * @returns positions of columns, the first such family; undefined where a sample is met by all
 */
export function smallestDisjoint(columns: readonly Uint8Array[]): number[] | undefined {
  if (columns.length === 0) return undefined
  const bits = columns.map(toBits)
  const kinds = distinctColumns(bits)
  if (meetOfAll(bits, kinds).some((word) => word !== 0)) return undefined
  const small = smallFamily(bits, kinds)
  if (small !== undefined) return small
  let family = kinds
  for (const at of kinds) {
    const without = family.filter((other) => other !== at)
    if (meetOfAll(bits, without).every((word) => word === 0)) family = without
  }
  return family
}

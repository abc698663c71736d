import Color from 'colorjs.io'
import { describe, expect, it } from 'vitest'
import { formatHex } from '#shared/color/format-color.ts'
import { mapToGamut } from '#shared/color/gamut-map.ts'
import { byteOf } from '#shared/color/transfer.ts'
import { oklchOfText, ratioOfTexts, unroundedRatio } from './color-measures.ts'
import { readVectors } from './read-vectors.ts'

interface Row {
  readonly algorithm: string
  readonly input: string
  readonly expected: { readonly space: string; readonly coords: readonly number[] }
  readonly tolerance: number
}
const { cases, algorithmsDisagree } = readVectors<{
  readonly cases: readonly Row[]
  readonly algorithmsDisagree: {
    readonly cases: readonly {
      readonly ok: string
      readonly minde: string
      readonly raytrace: string
      readonly ratioOnWhite: readonly [number, number]
    }[]
  }
}>('gamut-map')

const PINNED = 'binary search with local MINDE (JND 0.02, epsilon 0.0001)'
const pinned = cases.filter(({ algorithm }) => algorithm === PINNED)

/** mulberry32, public domain: the same colors on every run. */
function seededRandom(seed: number): () => number {
  let state = seed
  return () => {
    state = (state + 0x6d2b79f5) | 0
    let t = Math.imul(state ^ (state >>> 15), 1 | state)
    t = (t + Math.imul(t ^ (t >>> 7), 61 | t)) ^ t
    return ((t ^ (t >>> 14)) >>> 0) / 4294967296
  }
}

function referenceBytes(l: number, c: number, h: number, space: 'srgb' | 'p3'): number[] {
  const mapped = new Color('oklch', [l, c, h]).to(space).toGamut({ method: 'css', space })
  return mapped.coords.map((coord) => byteOf(coord!))
}

describe('gamut mapping by binary search with local MINDE', () => {
  it('leaves out the rows of the two algorithms that are not the pinned one', () => {
    const others = new Set(cases.filter((row) => !pinned.includes(row)).map((row) => row.algorithm))
    expect([...others]).toEqual(['ray trace (4 passes)', 'plain chroma reduction (no local clip)'])
    expect(pinned).toHaveLength(5)
  })

  it.each(pinned)('answers $input', ({ input, expected, tolerance }) => {
    const { l, c, h } = oklchOfText(input)
    const mapped = mapToGamut(l!, c!, h ?? 0, 'srgb')
    for (const [i, coord] of expected.coords.entries()) {
      expect(Math.abs(mapped[i]! - coord)).toBeLessThanOrEqual(tolerance)
    }
  })

  it.each(algorithmsDisagree.cases)(
    'answers $ok as $minde, where ray trace gives $raytrace',
    (row) => {
      const { l, c, h } = oklchOfText(row.ok)
      const mapped = [...mapToGamut(l!, c!, h!, 'srgb')]
      const bytes = mapped.map(byteOf)
      expect(formatHex(bytes[0]!, bytes[1]!, bytes[2]!)).toBe(row.minde)
      // The collection's ratios are of unrounded components.
      const [r, g, b] = mapped.map((component) => component * 255)
      expect(unroundedRatio([r!, g!, b!], [255, 255, 255])).toBeCloseTo(row.ratioOnWhite[0], 3)
      const [minde, raytrace] = [row.minde, row.raytrace].map((hex) => ratioOfTexts(hex, '#ffffff'))
      expect(raytrace! - minde!).toBeGreaterThan(0.5)
    },
  )

  // Oracle: colorjs.io 0.7.1, toGamut({ method: 'css' }), an implementation apart from ours.
  it.each(['srgb', 'p3'] as const)(
    'answers 2,000 random colors in %s to the byte as the reference library does',
    (gamut) => {
      const random = seededRandom(20251028)
      const differing: string[] = []
      for (let i = 0; i < 2000; i++) {
        const l = random()
        const c = random() * 0.4
        const h = random() * 360
        const ours = [...mapToGamut(l, c, h, gamut)].map(byteOf)
        const theirs = referenceBytes(l, c, h, gamut)
        if (ours.join() !== theirs.join())
          differing.push(`oklch(${l} ${c} ${h}): ${ours} ${theirs}`)
      }
      expect(differing).toEqual([])
    },
  )
})

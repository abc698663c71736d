import { describe, expect, it } from 'vitest'
import { contrastRatio, relativeLuminance } from '#shared/color/luminance.ts'
import { bytesOf, type Rgb, ratioOfTexts, unroundedRatio } from './color-measures.ts'
import { readVectors } from './read-vectors.ts'

interface Row {
  readonly fg: string
  readonly bg: string
  readonly stated: number | string | null
  readonly computed: number
  readonly passes: { readonly [threshold: string]: boolean }
  readonly source: string
}
interface Near {
  readonly fg: string
  readonly ratio: number
}
interface Vectors {
  readonly tolerance: number
  readonly cases: readonly Row[]
  readonly nearThreshold: readonly {
    readonly threshold: number
    readonly bg: string
    readonly justFails: Near
    readonly justPasses: Near
  }[]
  readonly printedCoefficients: {
    readonly cases: readonly {
      readonly threshold: number
      readonly fg: string
      readonly bg: string
      readonly wcag: number
      readonly xyzY: number
    }[]
  }
  readonly eightBits: {
    readonly cases: readonly {
      readonly threshold: number
      readonly oklch: string
      readonly hex: string
      readonly rounded: number
      readonly exact: number
    }[]
  }
  readonly thresholdConstant: { readonly differingEightBitValues: readonly number[] }
}
const vectors = readVectors<Vectors>('wcag-ratios')

/** A printed ratio is sometimes rounded and sometimes truncated. */
function isPrintedAs(ratio: number, stated: number): boolean {
  const unit = 10 ** -(String(stated).split('.')[1]?.length ?? 0)
  return Math.abs(ratio - stated) <= unit
}

describe('WCAG contrast ratios', () => {
  it('answers all 66 pairs of the collection', () => {
    expect(vectors.cases).toHaveLength(66)
  })

  it.each(vectors.cases)('answers $fg on $bg as published ($source)', (row) => {
    const ratio = ratioOfTexts(row.fg, row.bg)
    expect(Math.abs(ratio - row.computed)).toBeLessThanOrEqual(vectors.tolerance)
    for (const [threshold, passes] of Object.entries(row.passes)) {
      expect(ratio >= Number(threshold)).toBe(passes)
    }
    if (typeof row.stated === 'string') {
      const [, sign, threshold] = /^(>=|<)(.+)$/.exec(row.stated)!
      expect(ratio >= Number(threshold)).toBe(sign === '>=')
    } else if (row.stated === 3.000644) {
      // That library weighs with the exact matrix, not with WCAG's printed coefficients.
      expect(Math.abs(ratio - row.stated)).toBeLessThan(2e-5)
    } else if (row.stated !== null) {
      expect(isPrintedAs(ratio, row.stated)).toBe(true)
    }
  })

  it.each(vectors.nearThreshold)('leaves $threshold on $bg unrounded at both edges', (edge) => {
    const fails = ratioOfTexts(edge.justFails.fg, edge.bg)
    const passes = ratioOfTexts(edge.justPasses.fg, edge.bg)
    expect(fails).toBeCloseTo(edge.justFails.ratio, 12)
    expect(passes).toBeCloseTo(edge.justPasses.ratio, 12)
    expect(fails).toBeLessThan(edge.threshold)
    expect(passes).toBeGreaterThanOrEqual(edge.threshold)
  })

  it.each(vectors.printedCoefficients.cases)(
    'answers $fg on $bg at $threshold by the printed coefficients, not the exact matrix',
    ({ fg, bg, threshold, wcag, xyzY }) => {
      const ratio = ratioOfTexts(fg, bg)
      expect(ratio).toBeCloseTo(wcag, 10)
      expect(ratio >= threshold).not.toBe(xyzY >= threshold)
    },
  )

  it.each(vectors.eightBits.cases)(
    'answers $oklch on white by its bytes $hex, where $threshold flips',
    ({ oklch, hex, rounded, exact, threshold }) => {
      expect(bytesOf(oklch)).toEqual(bytesOf(hex))
      const ratio = ratioOfTexts(oklch, '#ffffff')
      expect(ratio).toBeCloseTo(rounded, 5)
      expect(ratio >= threshold).not.toBe(exact >= threshold)
    },
  )

  it('leaves every byte the same under the old threshold 0.03928', () => {
    const old = (byte: number) =>
      byte / 255 <= 0.03928 ? byte / 255 / 12.92 : ((byte / 255 + 0.055) / 1.055) ** 2.4
    const differing = Array.from({ length: 256 }, (_, byte) => byte).filter(
      (byte) => Math.abs(relativeLuminance(byte, byte, byte) - old(byte)) > 1e-15,
    )
    expect(differing).toEqual(vectors.thresholdConstant.differingEightBitValues)
  })

  it('answers by the formula of WCAG 2.2 for every grey against every grey', () => {
    for (let i = 0; i < 256; i += 5) {
      for (let j = 0; j < 256; j += 5) {
        const first: Rgb = [i, i, i]
        const second: Rgb = [j, j, j]
        const ratio = contrastRatio(relativeLuminance(...first), relativeLuminance(...second))
        expect(ratio).toBeCloseTo(unroundedRatio(first, second), 12)
      }
    }
  })
})

import { describe, expect, it } from 'vitest'
import { formatHex } from '#shared/color/format-color.ts'
import {
  blended,
  blendedInLinearLight,
  bytesOf,
  laidOver,
  type Rgb,
  ratioOfBytes,
  unroundedRatio,
} from './color-measures.ts'
import { readVectors } from './read-vectors.ts'

interface Vectors {
  readonly tolerance: number
  readonly cases: readonly {
    readonly fg: string
    readonly fgAlpha: number
    readonly bg: string
    readonly effectiveHex: string
    readonly ratioExact: number
    readonly ratioAfter8BitRounding: number
  }[]
  readonly unknownBackdrops: readonly {
    readonly fg: string
    readonly bg: string
    readonly bgAlpha: number
    readonly overBlack: { readonly hex: string; readonly ratio: number }
    readonly overWhite: { readonly hex: string; readonly ratio: number }
    readonly worst: number
  }[]
  readonly stacks: readonly {
    readonly canvas: string
    readonly layers: readonly (readonly [string, number])[]
    readonly text: readonly [string, number]
    readonly effectiveBg: string
    readonly effectiveFg: string
    readonly ratio: number
  }[]
  readonly eightBitRoundingEffect: { readonly flips: number; readonly samples: number }
  readonly linearBlendMistakes: readonly {
    readonly fg: string
    readonly alpha: number
    readonly bg: string
    readonly right: number
    readonly ifBlendedInLinearLight: number
  }[]
}
const vectors = readVectors<Vectors>('alpha-compositing')
const { tolerance } = vectors

describe('alpha compositing', () => {
  it.each(vectors.cases)('answers $fg at $fgAlpha on $bg by bytes and by formula', (row) => {
    const fg = bytesOf(row.fg)
    const bg = bytesOf(row.bg)
    const shown = laidOver(fg, row.fgAlpha, bg)
    expect(formatHex(...shown)).toBe(row.effectiveHex)
    expect(Math.abs(ratioOfBytes(shown, bg) - row.ratioAfter8BitRounding)).toBeLessThanOrEqual(
      tolerance,
    )
    const exact = unroundedRatio(blended(fg, row.fgAlpha, bg), bg)
    expect(Math.abs(exact - row.ratioExact)).toBeLessThanOrEqual(tolerance)
  })

  // These rows measure the formula: their hex is a rounded label beside an unrounded ratio.
  it.each(vectors.unknownBackdrops)(
    'answers $fg on $bg at $bgAlpha over black and white',
    (row) => {
      const bg = bytesOf(row.bg)
      for (const [under, expected] of [
        [[0, 0, 0], row.overBlack],
        [[255, 255, 255], row.overWhite],
      ] as const) {
        expect(formatHex(...laidOver(bg, row.bgAlpha, under))).toBe(expected.hex)
        const ratio = unroundedRatio(bytesOf(row.fg), blended(bg, row.bgAlpha, under))
        expect(Math.abs(ratio - expected.ratio)).toBeLessThanOrEqual(tolerance)
      }
    },
  )

  it.each(vectors.stacks)('answers a stack of layers from the ground up', (row) => {
    let under = bytesOf(row.canvas)
    let exact: Rgb = under
    for (const [color, alpha] of row.layers) {
      under = laidOver(bytesOf(color), alpha, under)
      exact = blended(bytesOf(color), alpha, exact)
    }
    const [text, alpha] = row.text
    expect(formatHex(...under)).toBe(row.effectiveBg)
    expect(formatHex(...laidOver(bytesOf(text), alpha, under))).toBe(row.effectiveFg)
    const ratio = unroundedRatio(blended(bytesOf(text), alpha, exact), exact)
    expect(Math.abs(ratio - row.ratio)).toBeLessThanOrEqual(tolerance)
  })

  it('answers 60 of 76,032 verdicts otherwise than without rounding, two more at exact halves', () => {
    const white: Rgb = [255, 255, 255]
    let samples = 0
    let published = 0
    const atHalves: number[] = []
    for (let grey = 0; grey < 256; grey++) {
      for (let percent = 1; percent <= 99; percent++) {
        const alpha = percent / 100
        const fg: Rgb = [grey, grey, grey]
        const exact = unroundedRatio(blended(fg, alpha, white), white)
        const rounded = laidOver(fg, alpha, white)
        // The collection rounds in units of 0 to 1, where some halves fall just short in doubles.
        const unit = Math.round(255 * ((grey / 255) * alpha + (1 - alpha)))
        for (const threshold of [3, 4.5, 7]) {
          samples++
          const isExact = exact >= threshold
          const isPublished = ratioOfBytes([unit, unit, unit], white) >= threshold
          if (isExact !== isPublished) published++
          if (isPublished !== ratioOfBytes(rounded, white) >= threshold) {
            atHalves.push((grey * percent + 255 * (100 - percent)) % 100)
          }
        }
      }
    }
    expect(samples).toBe(vectors.eightBitRoundingEffect.samples)
    expect(published).toBe(vectors.eightBitRoundingEffect.flips)
    expect(atHalves).toEqual([50, 50])
  })

  it.each(vectors.linearBlendMistakes)('refuses to blend $fg at $alpha in linear light', (row) => {
    const fg = bytesOf(row.fg)
    const bg = bytesOf(row.bg)
    const mistaken = unroundedRatio(blendedInLinearLight(fg, row.alpha, bg), bg)
    expect(mistaken).toBeCloseTo(row.ifBlendedInLinearLight, 5)
    const exact = unroundedRatio(blended(fg, row.alpha, bg), bg)
    expect(exact).toBeCloseTo(row.right, 5)
    const measured = ratioOfBytes(laidOver(fg, row.alpha, bg), bg)
    expect(Math.abs(measured - row.right)).toBeLessThan(0.1)
  })
})

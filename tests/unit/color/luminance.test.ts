import Color from 'colorjs.io'
import * as fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { compositeChannel } from '#shared/color/composite.ts'
import { contrastRatio, relativeLuminance, relativeLuminanceP3 } from '#shared/color/luminance.ts'
import { srgbBytesToP3Bytes } from '#shared/color/p3.ts'
import { byteOf } from '#shared/color/transfer.ts'

const byte = fc.integer({ min: 0, max: 255 })
const color = fc.tuple(byte, byte, byte)

describe('contrastRatio', () => {
  it('answers the same both ways and from 1 to 21, in sRGB and in P3', () => {
    void fc.assert(
      fc.property(color, color, (first, second) => {
        for (const luminance of [relativeLuminance, relativeLuminanceP3]) {
          const y1 = luminance(...first)
          const y2 = luminance(...second)
          const ratio = contrastRatio(y1, y2)
          expect(contrastRatio(y2, y1)).toBe(ratio)
          expect(ratio).toBeGreaterThanOrEqual(1)
          expect(ratio).toBeLessThanOrEqual(21)
        }
      }),
    )
  })

  it('answers 21 for white on black in both, never a hair above', () => {
    expect(contrastRatio(relativeLuminance(255, 255, 255), 0)).toBe(21)
    expect(contrastRatio(relativeLuminanceP3(255, 255, 255), 0)).toBe(21)
    expect(contrastRatio(1.000001, 0)).toBe(21)
  })

  it('answers 1 for a color on itself', () => {
    void fc.assert(
      fc.property(color, (bytes) => {
        const y = relativeLuminance(...bytes)
        expect(contrastRatio(y, y)).toBe(1)
      }),
    )
  })
})

describe('compositeChannel', () => {
  it('answers #000 at 0.54 on white as 4.61, not the 2.06 of linear light', () => {
    const grey = compositeChannel(0, 0.54, 255)
    expect(grey).toBe(117)
    const ratio = contrastRatio(
      relativeLuminance(grey, grey, grey),
      relativeLuminance(255, 255, 255),
    )
    expect(ratio.toFixed(2)).toBe('4.61')
  })

  it('answers exact integer arithmetic, halves upwards, for every alpha of k/255', () => {
    void fc.assert(
      fc.property(byte, byte, byte, (top, k, under) => {
        const twice = 2 * (top * k + under * (255 - k))
        expect(compositeChannel(top, k / 255, under)).toBe(Math.floor((twice + 255) / 510))
      }),
      { numRuns: 5000 },
    )
  })

  it('answers the layer when opaque, what lies beneath when clear, and 128 half way', () => {
    expect(compositeChannel(7, 1, 200)).toBe(7)
    expect(compositeChannel(7, 0, 200)).toBe(200)
    expect(compositeChannel(0, 0.5, 255)).toBe(128)
  })
})

describe('srgbBytesToP3Bytes', () => {
  // Oracle: colorjs.io.
  it('answers the Display P3 bytes that the reference library gives', () => {
    void fc.assert(
      fc.property(color, ([r, g, b]) => {
        const { coords } = new Color('srgb', [r / 255, g / 255, b / 255]).to('p3')
        expect([...srgbBytesToP3Bytes(r, g, b)]).toEqual(coords.map((coord) => byteOf(coord!)))
      }),
      { numRuns: 1000 },
    )
    expect([...srgbBytesToP3Bytes(255, 0, 0)]).toEqual([234, 51, 35])
  })

  it('leaves greys as they are', () => {
    for (let grey = 0; grey < 256; grey++) {
      expect([...srgbBytesToP3Bytes(grey, grey, grey)]).toEqual([grey, grey, grey])
    }
  })
})

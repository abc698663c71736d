import { describe, expect, it } from 'vitest'
import { deltaEOk } from '#shared/color/difference.ts'
import { mixColors } from '#shared/color/mix.ts'
import type { Oklch } from '#shared/color/oklch.ts'
import { parseColor } from '#shared/color/parse-color.ts'
import { rampByRatio } from '#shared/color/ramp.ts'
import { readoutsOf } from '#shared/color/readouts.ts'
import { oklchOf, type SpacedColor } from '#shared/color/to-oklch.ts'

// CSS Color 4, 4.4: a missing component counts as 0 wherever a value is needed.
const MISSING: Oklch = { l: null, c: null, h: null, alpha: 1 }
const BLACK: Oklch = { l: 0, c: 0, h: 0, alpha: 1 }
const some: Oklch = { l: 0.6, c: 0.1, h: 40, alpha: 1 }

function colorOf(css: string): Oklch {
  const reading = parseColor(css)
  if (!reading.ok) throw new Error(reading.reason)
  return reading.color
}

describe('a missing component', () => {
  it('answers the difference of a color without lightness and chroma as that of black', () => {
    expect(deltaEOk(MISSING, some)).toBe(deltaEOk(BLACK, some))
    expect(deltaEOk(some, MISSING)).toBe(deltaEOk(some, BLACK))
    expect(deltaEOk(MISSING, BLACK)).toBe(0)
  })

  it('answers the readouts of black, and none of its own three components', () => {
    const { oklch, css: _written, ...rest } = readoutsOf(MISSING)
    const { oklch: own, css: _black, ...black } = readoutsOf(BLACK)
    expect(rest).toEqual(black)
    expect([oklch, own]).toEqual([
      [null, null, null],
      [0, 0, 0],
    ])
  })

  it('answers a ramp of greys, whose chroma stays missing, on a ground without lightness', () => {
    const seed = { l: 0.5, c: null, h: 40, alpha: 1 }
    const steps = rampByRatio({ seed, ground: MISSING }, [4.5])
    expect(steps).toEqual(rampByRatio({ seed, ground: BLACK }, [4.5]))
    const [{ color, ratio, rendered }] = steps as [(typeof steps)[0]]
    expect(color.c).toBeNull()
    expect(ratio).toBeGreaterThanOrEqual(4.5)
    expect(new Set([rendered.r, rendered.g, rendered.b]).size).toBe(1)
  })

  it('answers a lightness that conversions took a hair outside 0 to 1 as 0 and 1', () => {
    const at = (l: number) => oklchOf({ space: 'oklch', components: [l, 0, null], alpha: 1 })
    expect([at(-0.00001), at(1.00001)]).toMatchObject([{ color: { l: 0 } }, { color: { l: 1 } }])
    expect([at(-0.00002).ok, at(1.00002).ok]).toEqual([false, false])
  })

  it('answers lab, lch, hsl and hwb with none as with 0', () => {
    for (const [missing, zero] of [
      ['lab(50 none none)', 'lab(50 0 0)'],
      ['lab(none 0 0)', 'lab(0 0 0)'],
      ['lch(50 none 40)', 'lch(50 0 40)'],
      ['hsl(40 none 50%)', 'hsl(40 0% 50%)'],
      ['hsl(none 50% none)', 'hsl(0 50% 0%)'],
      ['hwb(40 none none)', 'hwb(40 0% 0%)'],
    ] as const) {
      expect(colorOf(missing)).toEqual(colorOf(zero))
    }
  })

  // CSS Color 4, 12.2: carried forward to the analogous component, taken from the other color; else 0.
  it('answers a mix that takes what is missing from the other color', () => {
    const rgb = (...components: [number | null, number | null, number | null]): SpacedColor => ({
      space: 'srgb',
      components,
      alpha: 1,
    })
    const mixed = mixColors(rgb(1, null, null), rgb(0, 0.4, 0.8), { space: 'srgb', part: 0.5 })
    expect(mixed.components).toEqual([0.5, 0.4, 0.8])
    const half = { space: 'oklab', part: 0.5 } as const
    expect(mixColors(rgb(0.2, null, null), rgb(0.2, null, null), half)).toEqual(
      mixColors(rgb(0.2, 0, 0), rgb(0.2, 0, 0), half),
    )
  })
})

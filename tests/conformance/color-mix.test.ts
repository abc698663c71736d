import Color from 'colorjs.io'
import { describe, expect, it } from 'vitest'
import { readCssColor } from '#shared/color/css-color.ts'
import { HUE_METHODS, type HueMethod, MIX_SPACES, mixColors } from '#shared/color/mix.ts'
import type { SpacedColor } from '#shared/color/to-oklch.ts'
import { readVectors } from './read-vectors.ts'

const { cases, tolerance: common } = readVectors<{
  readonly tolerance: number
  readonly cases: readonly {
    readonly expr: string
    readonly expected: string
    /** In units of the space, where it is not the collection's. */
    readonly tolerance?: number
  }[]
}>('color-mix')

function colorOf(text: string): SpacedColor {
  const reading = readCssColor(text)
  if (!reading.ok) throw new TypeError(`${text}: ${reading.reason}`)
  return reading.value
}

const SIDE = /^(.+?)(?:\s+([\d.]+)%)?$/

/** Reads `color-mix(in space [method hue], a [p%], b [p%])`; percentages that are left out add up to 100. */
function mixOf(expression: string): SpacedColor {
  const inner = expression.slice('color-mix('.length, -1)
  const [where = '', ...rest] = inner.split(/,(?![^(]*\))/)
  const [, space = '', method = 'shorter'] = where.trim().split(/\s+/)
  const sides = rest.map((side) => SIDE.exec(side.trim())!)
  const [first, second] = sides.map(([, text = '']) => colorOf(text))
  const [p, q] = sides.map(([, , percent]) => (percent === undefined ? undefined : Number(percent)))
  const part = (q ?? (p === undefined ? 50 : 100 - p)) / 100
  return mixColors(first!, second!, {
    space: MIX_SPACES.find((name) => name === space)!,
    part,
    hue: HUE_METHODS.find((name) => name === method) as HueMethod,
  })
}

describe('mixing', () => {
  it.each(cases)('answers $expr as $expected', ({ expr, expected, tolerance = common }) => {
    const mix = mixOf(expr)
    const wanted = colorOf(expected)
    expect(mix.space).toBe(wanted.space)
    for (const [at, component] of wanted.components.entries()) {
      const got = mix.components[at]!
      if (component === null || got === null) expect(got).toBe(component)
      else expect(Math.abs(got - component)).toBeLessThanOrEqual(tolerance)
    }
    expect(mix.alpha).toBeCloseTo(wanted.alpha!, 6)
  })

  // Oracle: colorjs.io 0.7.1, Color.mix with premultiplied alpha.
  it.each(MIX_SPACES)('answers a third of a translucent teal in olive in %s', (space) => {
    const names: Record<string, string> = { 'display-p3': 'p3', 'srgb-linear': 'srgb-linear' }
    const [a, b] = ['rgb(20 130 140 / 0.4)', 'rgb(120 110 10)']
    const reference = new Color(a).mix(new Color(b), 1 / 3, {
      space: names[space] ?? space,
      outputSpace: names[space] ?? space,
      premultiplied: true,
      hue: 'shorter',
    })
    const mix = mixColors(colorOf(a), colorOf(b), { space, part: 1 / 3 })
    const scale = ['lab', 'lch', 'hsl', 'hwb'].includes(space) ? 1e-3 : 1e-5
    for (const [at, coord] of reference.coords.entries()) {
      expect(Math.abs(mix.components[at]! - Number(coord))).toBeLessThan(scale)
    }
    expect(mix.alpha).toBeCloseTo(Number(reference.alpha), 9)
  })

  it('answers each end of a mix as the color that stands there', () => {
    const [a, b] = [colorOf('oklch(0.4 0.1 20)'), colorOf('oklch(0.8 0.05 200)')]
    expect(mixColors(a, b, { space: 'oklch', part: 0 }).components).toEqual([0.4, 0.1, 20])
    expect(mixColors(a, b, { space: 'oklch', part: 1 }).components).toEqual([0.8, 0.05, 200])
  })

  it('answers two linear-light colors half-way as the mean of their light, and at 0 and 1 as themselves', () => {
    // Common practice, no source: a linear interpolation at t = 0, ½ and 1.
    const [red, blue] = [colorOf('color(srgb-linear 1 0 0)'), colorOf('color(srgb-linear 0 0 1)')]
    const at = (part: number) =>
      mixColors(red, blue, { space: 'srgb-linear', part }).components.map((one) => one!)
    expect([at(0), at(0.5), at(1)]).toEqual([
      [1, 0, 0],
      [0.5, 0, 0.5],
      [0, 0, 1],
    ])
  })

  it('leaves a component missing that both colors lack, and takes the other where one does', () => {
    const mix = (a: string, b: string, space: 'oklch' | 'lch') =>
      mixColors(colorOf(a), colorOf(b), { space, part: 0.5 })
    expect(mix('oklch(0.4 0 none)', 'oklch(0.6 0 none)', 'oklch').components[2]).toBeNull()
    expect(mix('oklch(0.4 0.1 none)', 'oklch(0.6 0.1 80)', 'oklch').components[2]).toBe(80)
    // The lightness that oklch lacks is missing in lch too.
    expect(mix('oklch(none 0.1 80)', 'lch(60 20 80)', 'lch').components[0]).toBe(60)
    expect(mix('rgb(0 0 0 / none)', 'rgb(255 255 255 / none)', 'oklch').alpha).toBeNull()
  })

  it.each([-0.1, 1.1, Number.NaN])('refuses a part of %s', (part) => {
    const white = colorOf('#fff')
    expect(() => mixColors(white, white, { space: 'oklab', part })).toThrow(TypeError)
  })
})

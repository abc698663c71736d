import * as fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { parseColor } from '#shared/color/parse-color.ts'
import { renderColor } from '#shared/color/render.ts'
import { readDtcgColor, writeDtcgColor, writeDtcgSrgb } from '#shared/formats/dtcg-color.ts'

const part = (max: number) => fc.option(fc.double({ min: 0, max, noNaN: true }), { nil: null })
const byte = fc.integer({ min: 0, max: 255 })

describe('readDtcgColor', () => {
  it('answers every color that writeDtcgColor writes', () => {
    const stored = fc.record({
      l: part(1),
      c: part(0.5),
      h: fc.option(fc.double({ min: 0, max: 360, maxExcluded: true, noNaN: true }), { nil: null }),
      alpha: fc.double({ min: 0, max: 1, noNaN: true }),
    })
    void fc.assert(
      fc.property(stored, (color) => {
        expect(readDtcgColor(JSON.parse(JSON.stringify(writeDtcgColor(color))))).toEqual({
          ok: true,
          color: {
            l: color.l === null ? null : color.l + 0,
            c: color.c === null ? null : color.c + 0,
            h: color.h === null ? null : color.h + 0,
            alpha: color.alpha + 0,
          },
        })
      }),
    )
  })

  it('answers what ships as the bytes it was written from', () => {
    void fc.assert(
      fc.property(byte, byte, byte, byte, (r, g, b, a) => {
        const rendered = { r, g, b, a, p3r: 0, p3g: 0, p3b: 0, gamut: 'srgb' as const }
        const reading = readDtcgColor(writeDtcgSrgb(rendered))
        if (!reading.ok) throw new Error(JSON.stringify(reading.faults))
        expect(renderColor(reading.color)).toMatchObject({ r, g, b, a })
      }),
    )
  })

  it('answers hsl and hwb in percent, as CSS does', () => {
    for (const [space, text] of [
      ['hsl', 'hsl(220 60% 50%)'],
      ['hwb', 'hwb(220 20% 20%)'],
    ] as const) {
      const components = space === 'hsl' ? [220, 60, 50] : [220, 20, 20]
      expect(readDtcgColor({ colorSpace: space, components })).toEqual(parseColor(text))
    }
  })

  // Ranges of the DTCG color module, "Supported color spaces": one step outside each.
  it.each([
    ['srgb', [1.001, 0, 0]],
    ['srgb-linear', [0, -0.001, 0]],
    ['display-p3', [0, 0, 1.1]],
    ['a98-rgb', [2, 0, 0]],
    ['prophoto-rgb', [-1, 0, 0]],
    ['rec2020', [0, 0, 1.5]],
    ['xyz-d65', [0, 1.2, 0]],
    ['xyz-d50', [0, 0, 1.2]],
    ['hsl', [360, 0, 0]],
    ['hsl', [0, 101, 0]],
    ['hwb', [0, 0, -1]],
    ['lab', [101, 0, 0]],
    ['lch', [50, -1, 0]],
    ['lch', [50, 1, 360]],
    ['oklab', [1.1, 0, 0]],
    ['oklch', [0.5, 0.1, -1]],
    ['oklch', [-0.1, 0.1, 0]],
  ])('refuses %s %j as out of range', (colorSpace, components) => {
    const reading = readDtcgColor({ colorSpace, components })
    expect(reading.ok).toBe(false)
    if (!reading.ok) expect(reading.faults.map(({ code }) => code)).toEqual(['color-range'])
  })

  it('leaves a and b of lab and oklab unbounded, and a hex that differs unread', () => {
    expect(readDtcgColor({ colorSpace: 'lab', components: [50, -200, 200] }).ok).toBe(true)
    // The module's own sample: hsl 330 100 50 beside a hex that is not it.
    const sample = { colorSpace: 'hsl', components: [330, 100, 50], hex: '#ff00ff' }
    expect(readDtcgColor(sample)).toEqual(parseColor('hsl(330 100% 50%)'))
  })

  it('refuses shapes, with every fault', () => {
    const codes = (value: unknown) => {
      const reading = readDtcgColor(value)
      return reading.ok ? [] : reading.faults.map(({ code, pointer }) => `${code} ${pointer}`)
    }
    expect(codes('#3366cc')).toEqual(['color-shape '])
    expect(codes([])).toEqual(['color-shape '])
    expect(codes({})).toEqual(['color-shape ', 'color-shape '])
    expect(codes({ colorSpace: 'display-p3-linear', components: [0, 0, 0] })).toEqual([
      'color-shape /colorSpace',
    ])
    expect(codes({ colorSpace: 'srgb', components: [0, 0] })).toEqual(['color-shape /components'])
    expect(
      codes({ colorSpace: 'srgb', components: [Number.NaN, '1', null], alpha: 'none', hex: 'red' }),
    ).toEqual([
      'color-component /components/0',
      'color-component /components/1',
      'color-component /components/2',
      'color-alpha /alpha',
      'color-hex /hex',
    ])
    expect(codes({ colorSpace: 'constructor', components: [0, 0, 0], 'a/b': 1 })).toEqual([
      'color-shape /a~1b',
      'color-shape /colorSpace',
    ])
  })

  it('refuses a color whose lightness lies above white', () => {
    const reading = readDtcgColor({ colorSpace: 'lab', components: [100, 104, -51] })
    expect(reading).toMatchObject({
      ok: false,
      faults: [{ code: 'color-range', pointer: '/components' }],
    })
  })
})

describe('writeDtcgColor', () => {
  it('answers oklch with none for what is missing, and alpha always', () => {
    expect(writeDtcgColor({ l: 0.5, c: 0, h: null, alpha: 1 })).toEqual({
      colorSpace: 'oklch',
      components: [0.5, 0, 'none'],
      alpha: 1,
    })
    expect(writeDtcgColor({ l: null, c: null, h: 20, alpha: null })).toEqual({
      colorSpace: 'oklch',
      components: ['none', 'none', 20],
      alpha: 0,
    })
  })
})

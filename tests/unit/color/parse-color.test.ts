import * as fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { formatHex, formatOklch } from '#shared/color/format-color.ts'
import type { Oklch } from '#shared/color/oklch.ts'
import { parseColor } from '#shared/color/parse-color.ts'
import { renderColor } from '#shared/color/render.ts'

function read(text: string): Oklch {
  const reading = parseColor(text)
  if (!reading.ok) throw new Error(reading.reason)
  return reading.color
}

function shipped(text: string): string {
  const { r, g, b, a } = renderColor(read(text))
  return formatHex(r, g, b, a)
}

function reasonFor(text: string): string {
  const reading = parseColor(text)
  if (reading.ok) throw new Error(`${text} was read.`)
  return reading.reason
}

const component = (max: number) =>
  fc.option(fc.double({ min: 0, max, noNaN: true, noDefaultInfinity: true }), { nil: null })
const stored = fc.record({
  l: component(1),
  c: component(0.5),
  h: fc.option(fc.double({ min: 0, max: 360, maxExcluded: true, noNaN: true }), { nil: null }),
  alpha: component(1),
})

describe('parseColor', () => {
  it('answers every stored color from its own text, missing components too', () => {
    void fc.assert(
      fc.property(stored, (color) => {
        const plain = { ...color, h: color.h === 0 ? 0 : color.h }
        expect(read(formatOklch(plain))).toEqual({
          l: plain.l === 0 ? 0 : plain.l,
          c: plain.c === 0 ? 0 : plain.c,
          h: plain.h,
          alpha: plain.alpha === 0 ? 0 : plain.alpha,
        })
      }),
    )
  })

  // Values by CSS Color 4, "Specifying Colors", one per notation.
  it.each([
    ['#36c', '#3366cc'],
    ['#36c8', '#3366cc88'],
    ['#3366CC', '#3366cc'],
    ['#3366cc80', '#3366cc80'],
    ['rebeccapurple', '#663399'],
    ['  RED\n', '#ff0000'],
    ['transparent', '#00000000'],
    ['rgb(51 102 204)', '#3366cc'],
    ['rgb(20% 40% 80%)', '#3366cc'],
    ['rgb(20% 102 204)', '#3366cc'],
    ['rgba(51, 102, 204, 50%)', '#3366cc80'],
    ['rgb(51, 102, 204, 0.5)', '#3366cc80'],
    ['hsl(220 60% 50%)', '#3366cc'],
    ['hsl(220deg, 60%, 50%)', '#3366cc'],
    ['hsla(220 60 50 / 1)', '#3366cc'],
    ['hsl(0.5turn 100% 50%)', '#00ffff'],
    ['hsl(200grad 100% 50%)', '#00ffff'],
    ['hwb(220 20% 20%)', '#3366cc'],
    ['color(srgb 0.2 0.4 0.8)', '#3366cc'],
    ['color( srgb 20% 40% 80% )', '#3366cc'],
    ['color(srgb-linear 0 1 1)', '#00ffff'],
    ['color(display-p3 1 1 1)', '#ffffff'],
    ['color(display-p3-linear 1 1 1)', '#ffffff'],
    ['color(a98-rgb 1 1 1)', '#ffffff'],
    ['color(prophoto-rgb 1 1 1)', '#ffffff'],
    ['color(rec2020 1 1 1)', '#ffffff'],
    ['color(xyz 0 0 0)', '#000000'],
    ['color(xyz-d65 0.95046 1 1.08906)', '#ffffff'],
    ['color(xyz-d50 0.9643 1 0.8251)', '#ffffff'],
    ['oklch(.5.1 20)', '#944a4b'],
  ])('answers %s as %s', (text, hex) => {
    expect(shipped(text)).toBe(hex)
  })

  // CSS Color 4 clamps these when it parses them; the library leaves rgb() and a negative saturation as written.
  it.each([
    ['rgb(300 -20 0)', '#ff0000'],
    ['rgb(120% -5% 0%)', '#ff0000'],
    ['rgba(300, -20, 0, 2)', '#ff0000'],
    ['hsl(0 -20% 50%)', '#808080'],
    ['oklch(1.4 0 0)', '#ffffff'],
    ['oklch(-0.2 0.1 20)', '#000000'],
    ['oklch(0.5 -0.1 20)', '#636363'],
    ['lab(140 0 0)', '#ffffff'],
    ['oklab(0.5 0 0 / 140%)', '#636363'],
    ['hwb(0 100% 100%)', '#808080'],
  ])('answers %s clamped to %s', (text, hex) => {
    expect(shipped(text)).toBe(hex)
  })

  it('leaves components of color() and saturation above 100% unclamped', () => {
    expect(read('color(srgb 1.2 -0.1 0)').c).toBeGreaterThan(read('color(srgb 1 0 0)').c!)
    expect(read('hsl(120 130% 50%)').c).toBeGreaterThan(read('hsl(120 100% 50%)').c!)
  })

  it('answers none as missing, in each place of oklch() and in any alpha', () => {
    expect(read('oklch(none none none / none)')).toEqual({ l: null, c: null, h: null, alpha: null })
    expect(read('oklch(0.5 0 none)')).toEqual({ l: 0.5, c: 0, h: null, alpha: 1 })
    expect(read('rgb(255 none 0 / none)')).toEqual({ ...read('#f00'), alpha: null })
  })

  it('answers a missing hue where a conversion gives a grey, and keeps one that is written', () => {
    for (const grey of ['#777', 'hsl(200 0% 40%)', 'lch(50 0 90)', 'lab(50 0 0)', 'hwb(9 50% 50%)'])
      expect(read(grey)).toMatchObject({ c: 0, h: null })
    expect(read('oklch(0.5 0 90)')).toMatchObject({ c: 0, h: 90 })
    // CSS Color 4: hue is powerless in LCH at a chroma of 0.0015 or less.
    expect(read('lch(1 0.0015 40)')).toMatchObject({ c: 0, h: null })
    expect(read('lch(1 0.0016 40)').h).not.toBeNull()
  })

  it('answers hues turned into 0 to 360, exact where they already lie there', () => {
    expect(read('oklch(0.5 0.1 -90)').h).toBe(270)
    expect(read('oklch(0.5 0.1 360)').h).toBe(0)
    expect(read('oklch(0.5 0.1 -1e-20)').h).toBe(0)
    expect(read('oklch(0.5 0.1 0.5turn)').h).toBe(180)
    expect(read('oklch(0.5 0.1 123.45678901234567)').h).toBe(123.45678901234567)
  })

  it.each([
    ['calc(1)', /calc\(\)/],
    ['oklch(calc(0.5 * 1) 0 0)', /calc\(\) is not accepted/],
    ['rgb(min(1, 2) 0 0)', /min\(\) is not accepted/],
    ['var(--brand)', /var\(\)/],
    ['oklch(var(--l) 0 0)', /var\(\) is not accepted/],
    ['currentColor', /currentcolor/],
    ['oklch(from red l c h)', /relative colour/],
    ['rgb(from rgb(1 2 3) r g b)', /relative colour/],
    ['color-mix(in oklch, red, blue)', /color-mix\(\)/],
    ['color-mix(in oklch, rgb(1 2 3), blue)', /color-mix\(\)/],
    ['light-dark(red, blue)', /light-dark\(\)/],
    ['contrast-color(red)', /contrast-color\(\)/],
    ['device-cmyk(0 0 0 1)', /device-cmyk\(\)/],
    ['Canvas', /"canvas" is not a CSS colour/],
    ['constructor', /not a CSS colour/],
    ['fff', /not a CSS colour/],
    ['', /empty/],
    ['#12345', /3, 4, 6 or 8/],
    ['oklch(0.5 0.1 20', /not a CSS colour/],
    ['oklch(0.5 0.1)', /not written as CSS Color 4 asks/],
    ['oklch(0.5 0.1 20 0.5)', /not written as CSS Color 4 asks/],
    ['oklch(0.5 0.1 20%)', /not written as CSS Color 4 asks/],
    ['oklch(0.5, 0.1, 20)', /not written as CSS Color 4 asks/],
    ['rgb(10%, 20, 30)', /not written as CSS Color 4 asks/],
    ['rgb(none, 20, 30)', /not written as CSS Color 4 asks/],
    ['rgb(10px 0 0)', /numbers, percentages, angles and none only/],
    ['rgb(NaN 0 0)', /numbers, percentages, angles and none only/],
    ['color(hsv 1 1 1)', /known colour space/],
    ['color(srgb)', /known colour space/],
    ['oklch(0.5 1e999 0)', /not a finite number/],
    ['hsl(0 0% 150%)', /lightness 1\.\d+ lies outside 0 to 1/],
    [`#${'f'.repeat(300)}`, /at most 256/],
  ])('refuses %s with the reason', (text, reason) => {
    expect(reasonFor(text)).toMatch(reason)
  })

  it('answers or refuses any text without throwing', () => {
    const piece = fc.constantFrom(
      'rgb(',
      'oklch(',
      'color(',
      'none',
      ' ',
      '/',
      ',',
      '1',
      '.5',
      '-',
      '%',
      'deg',
      ')',
      '#',
      'e',
      'calc(',
      'from',
      'srgb',
      'xyz',
    )
    void fc.assert(
      fc.property(fc.array(piece, { maxLength: 14 }), (pieces) => {
        const reading = parseColor(pieces.join(''))
        if (reading.ok) expect(reading.color.l ?? 0).toBeLessThanOrEqual(1)
        else expect(reading.reason.length).toBeGreaterThan(5)
      }),
      { numRuns: 2000 },
    )
    void fc.assert(fc.property(fc.string(), (text) => typeof parseColor(text).ok === 'boolean'))
  })
})

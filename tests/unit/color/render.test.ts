import * as fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { formatHex } from '#shared/color/format-color.ts'
import { isInGamut, mappedChroma, mapToGamut } from '#shared/color/gamut-map.ts'
import { contrastRatio, relativeLuminance } from '#shared/color/luminance.ts'
import { srgbBytesToP3Bytes } from '#shared/color/p3.ts'
import { parseColor } from '#shared/color/parse-color.ts'
import { renderColor } from '#shared/color/render.ts'
import { writeLinear } from '#shared/color/rgb-gamut.ts'
import { byteOf, encodedOf } from '#shared/color/transfer.ts'

function render(text: string) {
  const reading = parseColor(text)
  if (!reading.ok) throw new Error(reading.reason)
  return renderColor(reading.color)
}

const hexOf = (text: string) => {
  const { r, g, b, a } = render(text)
  return formatHex(r, g, b, a)
}

const byte = fc.integer({ min: 0, max: 255 })

describe('renderColor', () => {
  it('leaves all 4,096 short hexes as they are on their way through OKLCH', () => {
    const moved: string[] = []
    for (let n = 0; n < 4096; n++) {
      const short = n.toString(16).padStart(3, '0')
      const long = `#${[...short].map((digit) => digit + digit).join('')}`
      const reading = parseColor(`#${short}`)
      if (!reading.ok || renderColor(reading.color).gamut !== 'srgb') moved.push(short)
      else if (hexOf(`#${short}`) !== long) moved.push(short)
    }
    expect(moved).toEqual([])
  })

  it('leaves any hex as it is, its alpha too', () => {
    void fc.assert(
      fc.property(byte, byte, byte, byte, (r, g, b, a) => {
        const hex = formatHex(r, g, b, a)
        expect(hexOf(hex)).toBe(hex)
      }),
    )
  })

  // Examples of the engine's specification: Chromium clips the first to #00d600.
  it.each([
    ['oklch(0.7 0.4 150)', '#00c248'],
    ['oklch(0.3 0.4 270)', '#180098'],
    ['oklch(0.57 0.107 266.8)', '#5b75b7'],
    ['oklch(0.465 0.075 90.6)', '#695722'],
  ])('answers %s as %s', (text, hex) => {
    expect(hexOf(text)).toBe(hex)
  })

  it('leaves no channel to clipping: a browser that clips paints oklch(0.7 0.4 150) as #00d600', () => {
    const angle = (150 * Math.PI) / 180
    const light = [0.7, 0.4 * Math.cos(angle), 0.4 * Math.sin(angle)] as const
    const clipped = writeLinear(...light, 'srgb', new Float64Array(3))
    const [r, g, b] = [...clipped].map((component) => byteOf(encodedOf(component)))
    expect(formatHex(r!, g!, b!)).toBe('#00d600')
    expect(hexOf('oklch(0.7 0.4 150)')).toBe('#00c248')
  })

  // The engine's example of a button under a white label in a dark theme, truncated to two places.
  it.each([
    ['oklch(0.52 0.17 258)', '5.60'],
    ['oklch(0.47 0.17 258)', '7.02'],
    ['oklch(0.42 0.17 258)', '8.62'],
    ['oklch(0.57 0.17 258)', '4.55'],
    ['oklch(0.62 0.17 258)', '3.69'],
  ])('answers white on %s as %s', (text, ratio) => {
    const { r, g, b } = render(text)
    const measured = contrastRatio(relativeLuminance(r, g, b), relativeLuminance(255, 255, 255))
    expect((Math.floor(measured * 100) / 100).toFixed(2)).toBe(ratio)
  })

  it('answers the narrowest gamut that holds the color', () => {
    expect(render('#ffffff').gamut).toBe('srgb')
    expect(render('color(display-p3 0 1 0)').gamut).toBe('p3')
    expect(render('oklch(0.7 0.4 150)').gamut).toBe('beyond')
  })

  it('answers P3 bytes from the shipped hex inside sRGB, from its own mapping outside', () => {
    const inside = render('#3366cc')
    expect([inside.p3r, inside.p3g, inside.p3b]).toEqual([...srgbBytesToP3Bytes(51, 102, 204)])
    // Rounded to its hex first: on its own, oklch(0.5 0.1 20) would be 138 77 77 in P3.
    const rounded = render('oklch(0.5 0.1 20)')
    expect([rounded.r, rounded.g, rounded.b]).toEqual([148, 74, 75])
    expect([rounded.p3r, rounded.p3g, rounded.p3b]).toEqual([138, 78, 77])
    const outside = render('color(display-p3 0 1 0)')
    expect([outside.p3r, outside.p3g, outside.p3b]).toEqual([0, 255, 0])
    // Value by colorjs.io, toGamut({ method: 'css', space: 'p3' }).
    const beyond = render('oklch(0.7 0.4 150)')
    expect([beyond.p3r, beyond.p3g, beyond.p3b]).toEqual([0, 200, 50])
    expect(formatHex(outside.r, outside.g, outside.b)).toBe('#00fb29')
  })

  it('answers alpha rounded half up to a byte, a missing one as 0', () => {
    expect(render('rgb(0 0 0 / 0.5)').a).toBe(128)
    expect(render('rgb(0 0 0 / 0.001)').a).toBe(0)
    expect(renderColor({ l: 0.5, c: 0, h: null, alpha: null }).a).toBe(0)
  })

  it('answers missing components as 0', () => {
    expect(renderColor({ l: 0.5, c: null, h: null, alpha: 1 })).toEqual(
      renderColor({ l: 0.5, c: 0, h: 0, alpha: 1 }),
    )
  })

  it('answers white and black for any lightness at the ends, whatever the chroma', () => {
    expect(hexOf('oklch(1 0.3 20)')).toBe('#ffffff')
    expect(hexOf('oklch(0 0.3 20)')).toBe('#000000')
  })

  it('answers bytes for any chroma that a double holds', () => {
    const far = renderColor({ l: 0.5, c: 1e6, h: 40, alpha: 1 })
    for (const c of [1e100, 1e103, 1e200, Number.MAX_VALUE, Number.POSITIVE_INFINITY]) {
      expect(renderColor({ l: 0.5, c, h: 40, alpha: 1 })).toEqual(far)
      expect(mappedChroma(0.5, c, 40)).toBeCloseTo(mappedChroma(0.5, 1e6, 40), 2)
    }
  })

  it('answers halves upwards', () => {
    expect([0.5 / 255, 1.5 / 255, 254.5 / 255, -0.1, 1.1].map(byteOf)).toEqual([1, 2, 255, 0, 255])
  })
})

describe('mapToGamut', () => {
  it('leaves in-gamut colors untouched', () => {
    void fc.assert(
      fc.property(byte, byte, byte, (r, g, b) => {
        const reading = parseColor(formatHex(r, g, b))
        if (!reading.ok) throw new Error(reading.reason)
        const { l, c, h } = reading.color
        expect(isInGamut(l!, c!, h ?? 0, 'srgb')).toBe(true)
        const mapped = mapToGamut(l!, c!, h ?? 0, 'srgb')
        for (const [i, channel] of [r, g, b].entries()) {
          expect(Math.abs(mapped[i]! - channel / 255)).toBeLessThan(1e-6)
        }
        expect(mappedChroma(l!, c!, h ?? 0)).toBe(c)
      }),
    )
  })

  it('answers in gamut for any color, with the lightness and hue kept to within a JND', () => {
    const l = fc.double({ min: 0, max: 1, noNaN: true })
    const c = fc.double({ min: 0, max: 0.5, noNaN: true })
    const h = fc.double({ min: 0, max: 360, noNaN: true })
    void fc.assert(
      fc.property(l, c, h, fc.constantFrom('srgb' as const, 'p3' as const), (l, c, h, gamut) => {
        for (const component of mapToGamut(l, c, h, gamut)) {
          expect(component).toBeGreaterThanOrEqual(0)
          expect(component).toBeLessThanOrEqual(1)
        }
        // Clipping moves a color by less than 0.02, so chroma cannot grow by more.
        expect(mappedChroma(l, c, h)).toBeLessThan(c + 0.02)
      }),
    )
  })

  it('answers a grey where the chroma is powerless, 0.000004 or less', () => {
    const [r, g, b] = mapToGamut(0.2, 0.000004, 180, 'srgb')
    expect(Math.max(r!, g!, b!) - Math.min(r!, g!, b!)).toBeLessThan(1e-7)
    const [red, green, blue] = mapToGamut(0.2, 0.0000041, 180, 'srgb')
    expect(Math.max(red!, green!, blue!) - Math.min(red!, green!, blue!)).toBeGreaterThan(1e-6)
  })

  it('answers into the array it is given', () => {
    const out = new Float64Array(3)
    expect(mapToGamut(0.7, 0.4, 150, 'srgb', out)).toBe(out)
    expect(out.some((component) => component > 0)).toBe(true)
  })

  it('answers the chroma left in sRGB, unrounded', () => {
    const left = mappedChroma(0.7, 0.4, 150)
    const reading = parseColor('#00c248')
    if (!reading.ok) throw new Error(reading.reason)
    expect(left).toBeCloseTo(reading.color.c!, 2)
    expect(left).not.toBe(reading.color.c)
    expect(mappedChroma(0.5, 0.05, 150)).toBe(0.05)
  })
})

describe('a pass', () => {
  it('answers by the unrounded ratio: a ratio that only rounds to the threshold is below it', () => {
    const white = relativeLuminance(255, 255, 255)
    void fc.assert(
      fc.property(byte, byte, byte, fc.constantFrom(3, 4.5, 7), (r, g, b, required) => {
        const ratio = contrastRatio(relativeLuminance(r, g, b), white)
        const luminance = (value: number) =>
          value / 255 <= 0.04045 ? value / 255 / 12.92 : ((value / 255 + 0.055) / 1.055) ** 2.4
        const y = 0.2126 * luminance(r) + 0.7152 * luminance(g) + 0.0722 * luminance(b)
        // Multiplied out: no quotient, so nothing that a rounding could lift.
        expect(ratio >= required).toBe(1.05 >= required * (y + 0.05))
      }),
    )
    // #959595 on white is 2.9953: printed with one place it reads 3.0.
    const short = contrastRatio(relativeLuminance(149, 149, 149), white)
    expect(short.toFixed(1)).toBe('3.0')
    expect(short >= 3).toBe(false)
  })
})

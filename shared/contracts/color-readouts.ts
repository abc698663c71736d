import * as z from 'zod'
import type { Readouts } from '#shared/color/readouts.ts'
import { hexSchema } from './findings.ts'

const three = (description: string) =>
  z
    .array(z.union([z.number(), z.null()]))
    .length(3)
    .meta({
      description: `${description}; null where a component means nothing or is more than a number holds`,
    })

const lumaSchema = (standard: string) =>
  z.strictObject({ luma: z.number(), pb: z.number(), pr: z.number() }).meta({
    description: `Luma Y′ of ${standard} with its colour differences: of gamma-coded channels, no luminance`,
  })

/** One colour in every space. */
export const readoutsSchema = z
  .strictObject({
    css: z.string().meta({ description: 'The colour as CSS, unrounded' }),
    oklch: three('Lightness 0 to 1, chroma, hue in degrees'),
    oklab: three('Lightness 0 to 1, a, b'),
    srgb: three('Gamma-coded; outside 0 to 1 where sRGB does not hold the colour'),
    linearSrgb: three('Linear light'),
    displayP3: three('Gamma-coded Display P3'),
    xyzD65: three('White D65; Y of white is 1'),
    xyzD50: three('White D50; Y of white is 1'),
    lab: three('CIE Lab, white D50, L 0 to 100'),
    lch: three('CIE LCH, white D50, hue in degrees'),
    lms: three('Cone responses as OKLab defines them, 1 each for white'),
    shipped: z.strictObject({
      hex: hexSchema,
      gamut: z.enum(['srgb', 'p3', 'beyond']),
      hsl: three('Hue in degrees, saturation and lightness 0 to 100'),
      hsv: three('Hue in degrees, saturation and value 0 to 100'),
      hwb: three('Hue in degrees, whiteness and blackness 0 to 100'),
      relativeLuminance: z
        .number()
        .meta({ description: 'WCAG relative luminance Y, of linear light; 0 to 1' }),
      lumaBt601: lumaSchema('BT.601'),
      lumaBt709: lumaSchema('BT.709'),
      uncalibratedCmyk: z.array(z.number()).length(4).meta({
        description: 'Uncalibrated, 0 to 100: print goes through the profile of the printer',
      }),
    }),
  })
  .meta({ id: 'ColorReadouts' })

/** Readouts as an answer gives them. */
export function presentReadouts(readouts: Readouts): z.infer<typeof readoutsSchema> {
  const { css, shipped, ...spaces } = readouts
  const list = (reading: readonly (number | null)[]) => [...reading]
  return {
    css,
    oklch: list(spaces.oklch),
    oklab: list(spaces.oklab),
    srgb: list(spaces.srgb),
    linearSrgb: list(spaces.linearSrgb),
    displayP3: list(spaces.displayP3),
    xyzD65: list(spaces.xyzD65),
    xyzD50: list(spaces.xyzD50),
    lab: list(spaces.lab),
    lch: list(spaces.lch),
    lms: list(spaces.lms),
    shipped: {
      ...shipped,
      hsl: list(shipped.hsl),
      hsv: list(shipped.hsv),
      hwb: list(shipped.hwb),
      uncalibratedCmyk: [...shipped.uncalibratedCmyk],
    },
  }
}

export const readoutsExample = {
  css: 'oklch(0.5858 0.1278 242.6723)',
  oklch: [0.5858, 0.1278, 242.6723],
  oklab: [0.5858, -0.0586, -0.1135],
  srgb: [0.1333, 0.5137, 0.7569],
  linearSrgb: [0.016, 0.227, 0.5333],
  displayP3: [0.2563, 0.5063, 0.7368],
  xyzD65: [0.184, 0.2042, 0.5343],
  xyzD50: [0.1707, 0.1986, 0.4031],
  lab: [51.678, -10.9755, -40.8282],
  lch: [51.678, 42.2777, 254.9534],
  lms: [0.1558, 0.2152, 0.4013],
  shipped: {
    hex: '#2283c1',
    gamut: 'srgb',
    hsl: [203.3962, 70.0441, 44.5098],
    hsv: [203.3962, 82.3834, 75.6863],
    hwb: [203.3962, 13.3333, 24.3137],
    relativeLuminance: 0.2042,
    lumaBt601: { luma: 0.4277, pb: 0.1858, pr: -0.21 },
    lumaBt709: { luma: 0.4504, pb: 0.1652, pr: -0.2013 },
    uncalibratedCmyk: [82.3834, 32.1244, 0, 24.3137],
  },
} as const

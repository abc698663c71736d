import type { Oklch } from '#shared/color/oklch.ts'
import type { RenderedColor } from '#shared/color/render.ts'

/**
 * A colour rendered as CSS Color 4 words it, step by step: its gamut mapping pseudo-code (binary search with local
 * MINDE) and the matrices of its sample code, written anew and slowly, sharing nothing with the engine but types.
 * https://www.w3.org/TR/css-color-4/#binary-search-with-local-minde
 */
type Triple = [number, number, number]
type Matrix = readonly (readonly [number, number, number])[]

const OKLAB_TO_LMS: Matrix = [
  [1, 0.3963377773761749, 0.2158037573099136],
  [1, -0.1055613458156586, -0.0638541728258133],
  [1, -0.0894841775298119, -1.2914855480194092],
]
const LMS_TO_OKLAB: Matrix = [
  [0.210454268309314, 0.7936177747023054, -0.0040720430116193],
  [1.9779985324311684, -2.42859224204858, 0.450593709617411],
  [0.0259040424655478, 0.7827717124575296, -0.8086757549230774],
]
const LMS_TO_XYZ: Matrix = [
  [1.2268798758459243, -0.5578149944602171, 0.2813910456659647],
  [-0.0405757452148008, 1.112286803280317, -0.0717110580655164],
  [-0.0763729366746601, -0.4214933324022432, 1.5869240198367816],
]
const XYZ_TO_LMS: Matrix = [
  [0.819022437996703, 0.3619062600528904, -0.1288737815209879],
  [0.0329836539323885, 0.9292868615863434, 0.0361446663506424],
  [0.0481771893596242, 0.2642395317527308, 0.6335478284694309],
]
const TO_XYZ: Readonly<Record<Space, Matrix>> = {
  srgb: [
    [506752 / 1228815, 87881 / 245763, 12673 / 70218],
    [87098 / 409605, 175762 / 245763, 12673 / 175545],
    [7918 / 409605, 87881 / 737289, 1001167 / 1053270],
  ],
  p3: [
    [608311 / 1250200, 189793 / 714400, 198249 / 1000160],
    [35783 / 156275, 247089 / 357200, 198249 / 2500400],
    [0, 32229 / 714400, 5220557 / 5000800],
  ],
}
const FROM_XYZ: Readonly<Record<Space, Matrix>> = {
  srgb: [
    [12831 / 3959, -329 / 214, -1974 / 3959],
    [-851781 / 878810, 1648619 / 878810, 36519 / 878810],
    [705 / 12673, -2585 / 12673, 705 / 667],
  ],
  p3: [
    [446124 / 178915, -333277 / 357830, -72051 / 178915],
    [-14852 / 17905, 63121 / 35810, 423 / 17905],
    [11844 / 330415, -50337 / 660830, 316169 / 330415],
  ],
}

type Space = 'srgb' | 'p3'

function times(matrix: Matrix, [x, y, z]: Triple): Triple {
  const row = (at: number) => matrix[at]![0] * x + matrix[at]![1] * y + matrix[at]![2] * z
  return [row(0), row(1), row(2)]
}

function each(triple: Triple, change: (component: number) => number): Triple {
  return [change(triple[0]), change(triple[1]), change(triple[2])]
}

function decode(v: number): number {
  return Math.abs(v) <= 0.04045 ? v / 12.92 : Math.sign(v) * ((Math.abs(v) + 0.055) / 1.055) ** 2.4
}

function encode(v: number): number {
  if (Math.abs(v) <= 0.0031308) return 12.92 * v
  return Math.sign(v) * (1.055 * Math.abs(v) ** (1 / 2.4) - 0.055)
}

/** Up to this chroma hue is powerless, and the colour a grey: https://www.w3.org/TR/css-color-4/#ok-lab */
const POWERLESS = 0.000004

function oklabOf(l: number, c: number, h: number): Triple {
  if (c <= POWERLESS) return [l, 0, 0]
  const angle = (h * Math.PI) / 180
  return [l, c * Math.cos(angle), c * Math.sin(angle)]
}

function fromOklab(oklab: Triple, space: Space): Triple {
  const lms = each(times(OKLAB_TO_LMS, oklab), (root) => root ** 3)
  return each(times(FROM_XYZ[space], times(LMS_TO_XYZ, lms)), encode)
}

function toOklab(rgb: Triple, space: Space): Triple {
  const lms = times(XYZ_TO_LMS, times(TO_XYZ[space], each(rgb, decode)))
  return times(LMS_TO_OKLAB, each(lms, Math.cbrt))
}

function isIn(rgb: Triple, tolerance: number): boolean {
  return rgb.every((component) => component >= -tolerance && component <= 1 + tolerance)
}

function deltaEOk([l1, a1, b1]: Triple, [l2, a2, b2]: Triple): number {
  return Math.sqrt((l1 - l2) ** 2 + (a1 - a2) ** 2 + (b1 - b2) ** 2)
}

const clip = (rgb: Triple) => each(rgb, (component) => Math.max(0, Math.min(1, component)))

function mapped(l: number, c: number, h: number, space: Space): Triple {
  const [jnd, epsilon] = [0.02, 0.0001]
  if (l >= 1) return [1, 1, 1]
  if (l <= 0) return [0, 0, 0]
  const origin = fromOklab(oklabOf(l, c, h), space)
  if (isIn(origin, 1e-6)) return clip(origin)
  let clipped = clip(origin)
  let difference = deltaEOk(toOklab(clipped, space), oklabOf(l, c, h))
  if (difference < jnd) return clipped
  let [min, max, minInGamut] = [0, c, true]
  while (max - min > epsilon) {
    const chroma = (min + max) / 2
    const current = oklabOf(l, chroma, h)
    const rgb = fromOklab(current, space)
    if (minInGamut && isIn(rgb, 0)) {
      min = chroma
      continue
    }
    clipped = clip(rgb)
    difference = deltaEOk(toOklab(clipped, space), current)
    if (difference < jnd) {
      if (jnd - difference < epsilon) return clipped
      minInGamut = false
      min = chroma
    } else {
      max = chroma
    }
  }
  return clipped
}

const byte = (component: number) => Math.floor(Math.max(0, Math.min(1, component)) * 255 + 0.5)

/** The OKLCH chroma that mapping into sRGB leaves; all of it where nothing has to be mapped. */
export function naiveMappedChroma(l: number, c: number, h: number): number {
  if (isIn(fromOklab(oklabOf(l, c, h), 'srgb'), 1e-6)) return c
  const [, a, b] = toOklab(mapped(l, c, h, 'srgb'), 'srgb')
  return Math.hypot(a, b)
}

const KNOWN = new WeakMap<Oklch, RenderedColor>()

/** What ships, worked out once a colour. */
export function naiveRendering(color: Oklch): RenderedColor {
  const known = KNOWN.get(color) ?? rendering(color)
  KNOWN.set(color, known)
  return known
}

/** Bytes in both gamuts; a colour within sRGB shows in P3 as its shipped hex. */
function rendering(color: Oklch): RenderedColor {
  const { l, c, h } = { l: color.l ?? 0, c: color.c ?? 0, h: color.h ?? 0 }
  const isWithin = (space: Space) => isIn(fromOklab(oklabOf(l, c, h), space), 1e-6)
  const [r, g, b] = each(mapped(l, c, h, 'srgb'), byte)
  const gamut = isWithin('srgb') ? 'srgb' : isWithin('p3') ? 'p3' : 'beyond'
  const shipped = each([r, g, b], (channel) => decode(channel / 255))
  const p3 =
    gamut === 'srgb'
      ? each(times(FROM_XYZ.p3, times(TO_XYZ.srgb, shipped)), encode)
      : mapped(l, c, h, 'p3')
  const [p3r, p3g, p3b] = each(p3, byte)
  return { r, g, b, a: byte(color.alpha ?? 0), p3r, p3g, p3b, gamut }
}

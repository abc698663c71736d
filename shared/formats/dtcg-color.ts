import { formatHex } from '#shared/color/format-color.ts'
import type { Oklch } from '#shared/color/oklch.ts'
import type { RenderedColor } from '#shared/color/render.ts'
import { type ColorSpace, type Components, oklchOf } from '#shared/color/to-oklch.ts'
import {
  type DtcgFault,
  fault,
  type JsonObject,
  objectOf,
  quoted,
  pointerTo,
} from './dtcg-fault.ts'

/** A color space of the DTCG color module: those of CSS but `display-p3-linear`. */
export type DtcgColorSpace = Exclude<ColorSpace, 'display-p3-linear'>

/** A component in the units of its space; `none` is a missing one. */
export type DtcgComponent = number | 'none'

/** A colour value of the DTCG color module. */
export interface DtcgColor {
  colorSpace: DtcgColorSpace
  components: [DtcgComponent, DtcgComponent, DtcgComponent]
  alpha?: number
  /** Six digits; alpha is never in it. */
  hex?: string
}

/** The colour in OKLCH, unrounded, or every fault of the value. */
export type DtcgColorReading =
  | { readonly ok: true; readonly color: Oklch }
  | { readonly ok: false; readonly faults: DtcgFault[] }

/** Smallest and largest value; `open` excludes the largest. */
interface Range {
  readonly min: number
  readonly max: number
  readonly open?: boolean
}

const UNIT: Range = { min: 0, max: 1 }
const HUNDRED: Range = { min: 0, max: 100 }
const HUE: Range = { min: 0, max: 360, open: true }
const CHROMA: Range = { min: 0, max: Infinity }
const ANY: Range = { min: -Infinity, max: Infinity }
const UNITS = [UNIT, UNIT, UNIT] as const

const RANGES: { readonly [space in DtcgColorSpace]: readonly [Range, Range, Range] } = {
  srgb: UNITS,
  'srgb-linear': UNITS,
  'display-p3': UNITS,
  'a98-rgb': UNITS,
  'prophoto-rgb': UNITS,
  rec2020: UNITS,
  'xyz-d65': UNITS,
  'xyz-d50': UNITS,
  hsl: [HUE, HUNDRED, HUNDRED],
  hwb: [HUE, HUNDRED, HUNDRED],
  lab: [HUNDRED, ANY, ANY],
  lch: [HUNDRED, CHROMA, HUE],
  oklab: [UNIT, ANY, ANY],
  oklch: [UNIT, CHROMA, HUE],
}

const MEMBERS = ['colorSpace', 'components', 'alpha', 'hex']

/**
 * Reads a DTCG colour value into OKLCH; out of range is refused, never clamped.
 * @param value Anything JSON can hold.
 * @returns The colour unrounded, `none` of an `oklch` value as missing; or every fault, with a pointer from the value.
 * @see https://www.designtokens.org/tr/2025.10/color/ Format, Supported color spaces
 */
export function readDtcgColor(value: unknown): DtcgColorReading {
  const source = objectOf(value)
  if (!source) {
    const detail = 'A color is an object with colorSpace and components.'
    return { ok: false, faults: [fault('color-shape', '', detail)] }
  }
  const space = spaceOf(source)
  const faults = [
    ...Object.keys(source)
      .filter((name) => !MEMBERS.includes(name))
      .map((name) =>
        fault('color-shape', pointerTo('', name), `A color has no member ${quoted(name)}.`),
      ),
    ...(space ? [] : [spaceFault(source)]),
    ...componentFaults(source.components, space),
    ...alphaFaults(source.alpha),
    ...hexFaults(source.hex),
  ]
  if (faults.length > 0 || !space) return { ok: false, faults }
  const reading = oklchOf({
    space,
    components: (source.components as DtcgComponent[]).map(
      numberOrMissing,
    ) as unknown as Components,
    alpha: (source.alpha as number | undefined) ?? 1,
  })
  if (reading.ok) return reading
  return { ok: false, faults: [fault('color-range', '/components', reading.reason)] }
}

/**
 * Writes a stored colour as a DTCG colour in `oklch`, unrounded; a missing component is `none`.
 * @returns The value with its alpha; DTCG has no `none` there, so a missing alpha is written as 0, what it counts as.
 * @see https://www.designtokens.org/tr/2025.10/color/ OKLCH
 */
export function writeDtcgColor({ l, c, h, alpha }: Oklch): DtcgColor & { alpha: number } {
  return {
    colorSpace: 'oklch',
    components: [l ?? 'none', c ?? 'none', h ?? 'none'],
    alpha: alpha ?? 0,
  }
}

/**
 * Writes a rendered colour as a DTCG colour in `srgb`: what ships, k/255 with its hex.
 * @see https://www.designtokens.org/tr/2025.10/color/ sRGB
 */
export function writeDtcgSrgb({ r, g, b, a }: RenderedColor): DtcgColor & { alpha: number } {
  return {
    colorSpace: 'srgb',
    components: [r / 255, g / 255, b / 255],
    alpha: a / 255,
    hex: formatHex(r, g, b),
  }
}

function spaceOf({ colorSpace }: JsonObject): DtcgColorSpace | undefined {
  return typeof colorSpace === 'string' && Object.hasOwn(RANGES, colorSpace)
    ? (colorSpace as DtcgColorSpace)
    : undefined
}

function spaceFault({ colorSpace }: JsonObject): DtcgFault {
  if (colorSpace === undefined) return fault('color-shape', '', 'colorSpace is missing.')
  const known = Object.keys(RANGES).join(', ')
  return fault('color-shape', '/colorSpace', `colorSpace is one of ${known}.`)
}

function componentFaults(components: unknown, space: DtcgColorSpace | undefined): DtcgFault[] {
  if (components === undefined) return [fault('color-shape', '', 'components is missing.')]
  if (!Array.isArray(components) || components.length !== 3) {
    return [fault('color-shape', '/components', 'components is an array of three.')]
  }
  return components.flatMap((component: unknown, i) => {
    const at = `/components/${i}`
    if (component === 'none') return []
    if (typeof component !== 'number' || !Number.isFinite(component)) {
      return [fault('color-component', at, 'A component is a number or "none".')]
    }
    const range = space && RANGES[space][i]
    if (!range || isWithin(component, range)) return []
    return [fault('color-range', at, `${component} lies outside ${rangeText(range)} of ${space}.`)]
  })
}

function alphaFaults(alpha: unknown): DtcgFault[] {
  if (alpha === undefined || (typeof alpha === 'number' && isWithin(alpha, UNIT))) return []
  return [fault('color-alpha', '/alpha', 'alpha is a number from 0 to 1.')]
}

function hexFaults(hex: unknown): DtcgFault[] {
  if (hex === undefined) return []
  if (typeof hex === 'string' && /^#[\da-f]{6}$/i.test(hex)) return []
  return [fault('color-hex', '/hex', 'hex is # and six hex digits, without alpha.')]
}

function isWithin(value: number, { min, max, open = false }: Range): boolean {
  return value >= min && (open ? value < max : value <= max)
}

function rangeText({ min, max, open = false }: Range): string {
  if (max === Infinity) return `${min} and above`
  return open ? `${min} to below ${max}` : `${min} to ${max}`
}

function numberOrMissing(component: DtcgComponent): number | null {
  return component === 'none' ? null : component
}

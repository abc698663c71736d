import { invalidRequest } from '#api/errors.ts'
import { readCssColor } from '#shared/color/css-color.ts'
import { formatHex } from '#shared/color/format-color.ts'
import type { Oklch } from '#shared/color/oklch.ts'
import { parseColor } from '#shared/color/parse-color.ts'
import { renderColor } from '#shared/color/render.ts'
import type { SpacedColor } from '#shared/color/to-oklch.ts'
import type { ColorValue } from '#shared/contracts/fields.ts'
import type { Fault } from '#shared/contracts/problems.ts'
import { readDtcgColor, writeDtcgColor } from '#shared/formats/dtcg-color.ts'

const BLACK: Oklch = { l: 0, c: 0, h: null, alpha: 1 }

/** Reads the colours of one body; whatever is wrong with any of them is gathered and refused at once. */
export class ColorReading {
  readonly #faults: Fault[] = []

  read(value: ColorValue, pointer: string): Oklch {
    if (typeof value === 'string') {
      const parsed = parseColor(value)
      if (parsed.ok) return parsed.color
      this.#faults.push({ pointer, detail: parsed.reason })
      return BLACK
    }
    const read = readDtcgColor(value)
    if (read.ok) return read.color
    for (const fault of read.faults) {
      this.#faults.push({ pointer: `${pointer}${fault.pointer}`, detail: fault.detail })
    }
    return BLACK
  }

  /** A colour that must hide what is under it. */
  readOpaque(value: ColorValue, pointer: string): Oklch {
    const color = this.read(value, pointer)
    if (renderColor(color).a < 255) {
      this.#faults.push({ pointer, detail: 'Expected an opaque colour' })
    }
    return color
  }

  /** A colour in the space in which it was written, missing components and all. */
  readSpaced(value: ColorValue, pointer: string): SpacedColor {
    this.read(value, pointer)
    if (typeof value === 'string') {
      const reading = readCssColor(value)
      if (reading.ok) return reading.value
      return { space: 'oklch', components: [0, 0, null], alpha: 1 }
    }
    const [x, y, z] = value.components.map((part) => (part === 'none' ? null : part))
    const components = [x ?? null, y ?? null, z ?? null] as const
    return { space: value.colorSpace, components, alpha: value.alpha ?? 1 }
  }

  add(fault: Fault): void {
    this.#faults.push(fault)
  }

  /** @throws AppError with every fault, where there is one */
  refuseFaulty(): void {
    if (this.#faults.length > 0) throw invalidRequest(this.#faults)
  }
}

/** A colour as an answer shows it: stored and shipped. */
export function shownColor(color: Oklch) {
  const { r, g, b, a } = renderColor(color)
  return { color: writeDtcgColor(color), hex: formatHex(r, g, b, a) }
}

import { MACHADO_2009, VIENOT_1999 } from './deficiency-matrices.ts'
import type { Matrix3 } from './matrices.ts'
import { byteOf, encodedOf, linearOf } from './transfer.ts'

/** The cones that are missing or weak: long (protan), medium (deutan), short (tritan). */
export const DEFICIENCIES = ['protan', 'deutan', 'tritan'] as const
/** One of the deficiencies. */
export type Deficiency = (typeof DEFICIENCIES)[number]

/** The published models; Viénot 1999 knows protan and deutan at full severity only. */
export const SIMULATION_MODELS = ['machado-2009', 'vienot-1999'] as const
/** One of the models. */
export type SimulationModel = (typeof SIMULATION_MODELS)[number]

/** What is simulated, and how. */
export interface Simulation {
  readonly deficiency: Deficiency
  /** 0 (none) to 1 (the cone is missing). */
  readonly severity: number
  readonly model: SimulationModel
}

/** An opaque sRGB colour in bytes 0 to 255. */
export interface SrgbBytes {
  readonly r: number
  readonly g: number
  readonly b: number
}

/**
 * The matrix of a simulation, for linear sRGB.
 * @returns unrounded; between two of the eleven published severities of Machado 2009, linear between them
 * @throws {TypeError} for a severity outside 0 to 1, and for what Viénot 1999 does not define
 * @see https://doi.org/10.1109/TVCG.2009.113 Machado, Oliveira, Fernandes 2009
 * @see https://doi.org/10.1002/(SICI)1520-6378(199908)24:4%3C243::AID-COL5%3E3.0.CO;2-3 Viénot, Brettel, Mollon 1999
 */
export function simulationMatrix({ deficiency, severity, model }: Simulation): Matrix3 {
  if (!(severity >= 0 && severity <= 1)) {
    throw new TypeError(`a severity is 0 to 1, not ${severity}`)
  }
  if (model === 'vienot-1999') {
    if (deficiency === 'tritan' || severity !== 1) {
      throw new TypeError('Viénot 1999 defines protan and deutan at severity 1 only')
    }
    return VIENOT_1999[deficiency]
  }
  const published = MACHADO_2009[deficiency]
  const step = severity * (published.length - 1)
  const below = published[Math.floor(step)]!
  const above = published[Math.ceil(step)]!
  const part = step - Math.floor(step)
  const entry = (at: number) => below[at]! + part * (above[at]! - below[at]!)
  return [entry(0), entry(1), entry(2), entry(3), entry(4), entry(5), entry(6), entry(7), entry(8)]
}

/**
 * Shows an sRGB colour as a person with a colour-vision deficiency may see it: decoded to linear light, multiplied,
 * clamped and encoded again.
 * @param matrix of `simulationMatrix`
 * @returns bytes, each channel rounded half up
 */
export function simulateBytes({ r, g, b }: SrgbBytes, matrix: Matrix3): SrgbBytes {
  const red = linearOf(r / 255)
  const green = linearOf(g / 255)
  const blue = linearOf(b / 255)
  const channel = (row: number) =>
    byteOf(encodedOf(matrix[row]! * red + matrix[row + 1]! * green + matrix[row + 2]! * blue))
  return { r: channel(0), g: channel(3), b: channel(6) }
}

import { describe, expect, it } from 'vitest'
import { formatHex } from '#shared/color/format-color.ts'
import {
  type Deficiency,
  type Simulation,
  type SimulationModel,
  simulateBytes,
  simulationMatrix,
} from '#shared/color/simulate.ts'
import { encodedOf, linearOf } from '#shared/color/transfer.ts'
import { readVectors } from './read-vectors.ts'

interface Case extends Simulation {
  readonly model: SimulationModel
  readonly deficiency: Deficiency
  readonly input: string
}
const vectors = readVectors<{
  readonly tolerance: number
  readonly cases: readonly (Case & { readonly srgb255: readonly number[] })[]
  readonly halfStep: { readonly matrix: readonly number[] }
  readonly bytes: { readonly cases: readonly (Case & { readonly hex: string })[] }
}>('simulation')

function bytesOf(hex: string): [number, number, number] {
  const at = (start: number) => Number.parseInt(hex.slice(start, start + 2), 16)
  return [at(1), at(3), at(5)]
}

describe('simulation of colour-vision deficiencies', () => {
  it.each(vectors.cases)(
    'answers $input for $deficiency by $model as the reference library does, unclamped',
    (row) => {
      const matrix = simulationMatrix(row)
      const linear = bytesOf(row.input).map((byte) => linearOf(byte / 255))
      for (const [channel, expected] of row.srgb255.entries()) {
        const sum = linear.reduce((total, part, at) => total + matrix[channel * 3 + at]! * part, 0)
        expect(Math.abs(encodedOf(sum) * 255 - expected)).toBeLessThanOrEqual(vectors.tolerance)
      }
    },
  )

  it.each(vectors.bytes.cases)('answers $input for $deficiency by $model as $hex', (row) => {
    const [r, g, b] = bytesOf(row.input)
    const seen = simulateBytes({ r, g, b }, simulationMatrix(row))
    expect(formatHex(seen.r, seen.g, seen.b)).toBe(row.hex)
  })

  it('answers a severity between two published ones by the line between their matrices', () => {
    const matrix = simulationMatrix({ model: 'machado-2009', deficiency: 'protan', severity: 0.55 })
    for (const [at, entry] of vectors.halfStep.matrix.entries()) {
      expect(matrix[at]).toBeCloseTo(entry, 12)
    }
  })

  it.each(['protan', 'deutan', 'tritan'] as const)(
    'leaves every colour as it is at severity 0 of %s, and grey grey at severity 1',
    (deficiency) => {
      const none = simulationMatrix({ model: 'machado-2009', deficiency, severity: 0 })
      expect(simulateBytes({ r: 12, g: 200, b: 99 }, none)).toEqual({ r: 12, g: 200, b: 99 })
      const full = simulationMatrix({ model: 'machado-2009', deficiency, severity: 1 })
      expect(simulateBytes({ r: 118, g: 118, b: 118 }, full)).toEqual({ r: 118, g: 118, b: 118 })
    },
  )

  it.each([
    { model: 'machado-2009', deficiency: 'protan', severity: 1.01 },
    { model: 'machado-2009', deficiency: 'protan', severity: -0.01 },
    { model: 'machado-2009', deficiency: 'protan', severity: Number.NaN },
    { model: 'vienot-1999', deficiency: 'tritan', severity: 1 },
    { model: 'vienot-1999', deficiency: 'deutan', severity: 0.5 },
  ] as const)('refuses $deficiency of $model at severity $severity', (simulation) => {
    expect(() => simulationMatrix(simulation)).toThrow(TypeError)
  })
})

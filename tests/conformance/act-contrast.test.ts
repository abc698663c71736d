import { describe, expect, it } from 'vitest'
import {
  alphaOf,
  blended,
  bytesOf,
  laidOver,
  ratioOfBytes,
  unroundedRatio,
} from './color-measures.ts'
import { readVectors } from './read-vectors.ts'

interface Row {
  readonly rule: string
  readonly example: string
  readonly outcome: 'passed' | 'failed' | 'inapplicable'
  readonly fg: string | null
  readonly bg: string | readonly string[] | null
  readonly opacity: number
  readonly threshold: number
  readonly stated: number | readonly number[] | null
  readonly computed?: number | readonly number[]
  readonly note?: string
}
const { tolerance, cases } = readVectors<{
  readonly tolerance: number
  readonly cases: readonly Row[]
}>('act-contrast')

const many = <T>(value: T | readonly T[]) => (Array.isArray(value) ? value : [value]) as T[]

/** Rows whose ratio needs a page: a background image or gradient extent, an SVG text, an image, hidden text. */
const WITHOUT_COLORS = [
  'afw4f7 failed 2',
  'afw4f7 failed 3',
  'afw4f7 inapplicable 1',
  'afw4f7 inapplicable 4',
  'afw4f7 inapplicable 5',
  '09o5cg passed 3',
  '09o5cg failed 6',
]
const nameOf = (row: Row) => `${row.rule} ${row.example}`
const measured = cases.filter((row) => !WITHOUT_COLORS.includes(nameOf(row)))

describe('ACT rules afw4f7 and 09o5cg', () => {
  it('leaves out only the rows that give no two colors', () => {
    const colorless = cases.filter((row) => row.fg === null || row.bg === null).map(nameOf)
    expect(colorless.sort()).toEqual([...WITHOUT_COLORS].sort())
    expect(measured).toHaveLength(cases.length - WITHOUT_COLORS.length)
  })

  it.each(measured)('answers $rule $example by the formula', (row) => {
    const fg = bytesOf(row.fg!)
    const alpha = alphaOf(row.fg!) * row.opacity
    const computed = many(row.computed!)
    for (const [i, backdrop] of many(row.bg!).entries()) {
      const bg = bytesOf(backdrop)
      const ratio = unroundedRatio(blended(fg, alpha, bg), bg)
      expect(Math.abs(ratio - computed[i]!)).toBeLessThanOrEqual(tolerance)
    }
  })

  // "inapplicable" is about the component, not the colors: see the exemptions of the checks engine.
  it.each(measured.filter((row) => row.outcome !== 'inapplicable'))(
    'answers $rule $example: $outcome, by bytes',
    (row) => {
      const ratios = many(row.bg!).map((backdrop) => {
        const bg = bytesOf(backdrop)
        return ratioOfBytes(laidOver(bytesOf(row.fg!), alphaOf(row.fg!) * row.opacity, bg), bg)
      })
      // ACT asks for the highest contrast of any pixel pair.
      expect(Math.max(...ratios) >= row.threshold).toBe(row.outcome === 'passed')
    },
  )
})

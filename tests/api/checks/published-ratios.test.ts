import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { FindingWire } from '#shared/contracts/findings.ts'
import { readVectors } from '#tests/conformance/read-vectors.ts'
import { createTestApp, type TestApp } from '#tests/support/app.ts'
import { createSampleSystem, dtcgHex, type SampleSystem } from '#tests/support/sample-system.ts'

let test: TestApp
let system: SampleSystem
beforeAll(async () => {
  test = await createTestApp()
  system = await createSampleSystem(test)
})
afterAll(() => test.close())

interface ActRow {
  readonly rule: 'afw4f7' | '09o5cg'
  readonly example: string
  readonly outcome: 'passed' | 'failed' | 'inapplicable'
  readonly fg: string | null
  readonly bg: string | readonly string[] | null
  readonly opacity: number
  readonly large: boolean
  readonly computed?: number
}

interface CompositingRow {
  readonly fg: string
  readonly fgAlpha: number
  readonly bg: string
  readonly ratioAfter8BitRounding: number
  readonly note: string
}

/** Opaque rows of two colours: a ratio of bytes needs no rounding, so the published one is exact. */
const act = readVectors<{ readonly tolerance: number; readonly cases: readonly ActRow[] }>(
  'act-contrast',
)
const opaque = act.cases.filter(
  (row): row is ActRow & { fg: string; bg: string; computed: number } =>
    /^#[0-9a-f]{6}$/.test(row.fg ?? '') &&
    typeof row.bg === 'string' &&
    row.opacity === 1 &&
    row.computed !== undefined,
)

const compositing = readVectors<{
  readonly tolerance: number
  readonly cases: readonly CompositingRow[]
}>('alpha-compositing')

const isByte = (alpha: number) => Math.abs(alpha * 255 - Math.round(alpha * 255)) < 1e-9

interface SentPair {
  readonly fg: string
  readonly bg: string
  readonly alpha?: number
  readonly use: 'text' | 'large-text'
  readonly level: 'AA' | 'AAA'
}

async function measured(pairs: readonly SentPair[]) {
  const tokens = Object.fromEntries(
    pairs.flatMap(({ fg, bg, alpha }, row) => [
      [`fg-${row}`, dtcgHex(fg, alpha)],
      [`bg-${row}`, dtcgHex(bg)],
    ]),
  )
  const sent = pairs.map(({ use, level }, row) => ({
    foreground: `fg-${row}`,
    background: `bg-${row}`,
    use,
    level,
  }))
  const { findings } = await system.check({ tokens, pairs: sent }, '?findings=all')
  return new Map(findings.map((finding): [string, FindingWire] => [finding.foreground, finding]))
}

describe('createCheck', () => {
  it('answers the published ratio and outcome of ACT examples', async () => {
    expect(opaque).toHaveLength(21)
    const findings = await measured(
      opaque.map(({ fg, bg, large, rule }) => ({
        fg,
        bg,
        use: large ? 'large-text' : 'text',
        level: rule === 'afw4f7' ? 'AA' : 'AAA',
      })),
    )
    opaque.forEach((row, at) => {
      const finding = findings.get(`fg-${at}`)
      const about = `${row.rule} ${row.example}`
      expect(Math.abs((finding?.ratio ?? 0) - row.computed), about).toBeLessThanOrEqual(
        act.tolerance,
      )
      if (row.outcome === 'inapplicable') return
      expect(finding?.outcome, about).toBe(row.outcome === 'passed' ? 'pass' : 'breach')
    })
  })

  it('answers the published ratio after 8-bit rounding of translucent examples', async () => {
    const { tolerance } = compositing
    // The others have an alpha that no byte is: they test the compositing, not a colour that ships.
    const cases = compositing.cases.filter(({ fgAlpha }) => isByte(fgAlpha))
    expect(cases).toHaveLength(4)
    const findings = await measured(
      cases.map(({ fg, fgAlpha, bg }) => ({
        fg,
        bg,
        alpha: fgAlpha,
        use: 'text',
        level: 'AA',
      })),
    )
    cases.forEach((row, at) => {
      const ratio = findings.get(`fg-${at}`)?.ratio ?? 0
      const about = `${row.fg} at ${row.fgAlpha} on ${row.bg}`
      expect(Math.abs(ratio - row.ratioAfter8BitRounding), about).toBeLessThanOrEqual(tolerance)
    })
  })
})

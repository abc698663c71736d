import { describe, expect, it } from 'vitest'
import { sarifOf } from '#shared/formats/sarif.ts'
import { everyOutcome } from '#tests/support/sarif-check.ts'
import { readVectors } from './read-vectors.ts'
import { sarifFaults } from './sarif-members.ts'

interface Row {
  readonly name: string
  readonly valid: boolean
  readonly log: unknown
  readonly source: string
}
const { rows, schemaId } = readVectors<{
  readonly schemaId: string
  readonly rows: readonly Row[]
}>('sarif')

describe('published logs, each judged by the OASIS schema', () => {
  it.each(rows.filter(({ valid }) => valid))('leaves $name alone', ({ log }) => {
    expect(sarifFaults(log)).toEqual([])
  })

  it.each(rows.filter(({ valid }) => !valid))('refuses $name', ({ log }) => {
    expect(sarifFaults(log)).not.toEqual([])
  })
})

describe('the log of a check', () => {
  const log = sarifOf(everyOutcome, 'larkhaven')
  const [run] = log.runs
  const rules = run?.tool.driver.rules ?? []

  it('answers the members that the standard requires, and no others than its own', () => {
    expect(sarifFaults(log)).toEqual([])
    expect(log).toMatchObject({ $schema: schemaId, version: '2.1.0' })
    expect(sarifFaults(sarifOf({ ...everyOutcome, findings: [], advisories: [] }, 'x'))).toEqual([])
  })

  it('answers results that name a rule of the log by its id and by its place', () => {
    expect(run?.results.length).toBeGreaterThan(6)
    for (const { ruleId, ruleIndex } of run?.results ?? [])
      expect(rules[ruleIndex]?.id).toBe(ruleId)
    expect(new Set(rules.map(({ id }) => id)).size).toBe(rules.length)
  })

  it('answers a level with failures only', () => {
    for (const { kind, level } of run?.results ?? []) expect(level === 'none').toBe(kind !== 'fail')
  })

  it('answers no file and no line that a check cannot know', () => {
    expect(JSON.stringify(log)).not.toMatch(/physicalLocation|artifactLocation|startLine/)
  })
})

import { readFileSync } from 'node:fs'
import { describe, expect, it } from 'vitest'
import { larkhaven } from '#scripts/demo/larkhaven/larkhaven.ts'
import { wholeAfter } from '#scripts/demo/larkhaven/whole-system.ts'
import { checkSystem } from '#shared/checks/check-system.ts'
import type { SourceValue } from '#shared/checks/model.ts'
import { recheck } from '#shared/checks/recheck.ts'
import { breachRatios, verdictOf } from '#shared/checks/verdict.ts'
import { modelFromWire } from '#shared/contracts/system-model.ts'
import { readDtcgTokens } from '#shared/formats/dtcg-tokens.ts'

const read = (name: string): Record<string, unknown> =>
  JSON.parse(readFileSync(new URL(`../../../scripts/demo/${name}`, import.meta.url), 'utf8'))
const model = modelFromWire(wholeAfter(larkhaven))
const head = checkSystem(model)
if (!head.ok) throw new Error(JSON.stringify(head.faults))
const tokens = new Map(model.tokens.map((token) => [token.name, token]))

/** The verdict on a document merged over the head, only what is new counting. */
const judge = (document: unknown) => {
  const put = readDtcgTokens(document).tokens.map(({ name, value }) => {
    const token = tokens.get(name)
    if (!token) throw new Error(`${name} is no token of the demo`)
    const merged: SourceValue =
      value.kind === 'color'
        ? { kind: 'color', color: value.color }
        : { kind: 'alias', token: value.name }
    return { ...token, value: merged }
  })
  const checked = recheck(head.evaluation, { tokens: { put } })
  if (!checked.ok) throw new Error(JSON.stringify(checked.faults))
  return verdictOf(checked.evaluation, { known: breachRatios(verdictOf(head.evaluation)) })
}

describe('the token file of the demo', () => {
  const document = readDtcgTokens(read('larkhaven.tokens.json'))

  it('answers no fault to the reader', () => {
    expect(document.faults).toEqual([])
  })

  it('answers every token of the head that is not derived, at its value', () => {
    const written = document.tokens.map(({ name, value, description }) => ({
      name,
      value: value.kind === 'color' ? value.color : `{${value.name}}`,
      description,
    }))
    const expected = wholeAfter(larkhaven).tokens.flatMap(({ name, description }) => {
      const { value } = tokens.get(name) ?? {}
      if (value === undefined || value.kind === 'derived') return []
      return [
        { name, value: value.kind === 'color' ? value.color : `{${value.token}}`, description },
      ]
    })
    expect(written).toEqual(expected)
  })

  it('answers a pass where only what is new counts', () => {
    expect(judge(read('larkhaven.tokens.json'))).toMatchObject({
      verdict: 'pass',
      counts: { breach: 0, known: 9 },
    })
  })
})

describe('the shipped change', () => {
  it('answers new breaches of the link and of what follows it', () => {
    const { verdict, findings } = judge(read('breaching-change.tokens.json'))
    const breaching = findings.filter(({ outcome }) => outcome === 'breach')
    expect(verdict).toBe('fail')
    expect(new Set(breaching.map(({ foreground }) => foreground))).toEqual(
      new Set(['text.link', 'status.boarding']),
    )
  })

  it('answers a pass once fixed, with another colour than the head', () => {
    expect(judge(read('fix.tokens.json'))).toMatchObject({ verdict: 'pass', counts: { breach: 0 } })
    const [fixed] = readDtcgTokens(read('fix.tokens.json')).tokens
    const sea = tokens.get('sea.7')
    expect(fixed?.name).toBe('sea.7')
    const lightness = fixed?.value.kind === 'color' ? fixed.value.color.l : undefined
    expect(lightness).not.toBe(sea?.value.kind === 'color' ? sea.value.color.l : undefined)
  })
})

import { describe, expect, it } from 'vitest'
import { readDtcgTokens } from '#shared/formats/dtcg-tokens.ts'

const BLUE = { colorSpace: 'oklch', components: [0.55, 0.2, 260] }
const color = ($value: unknown) => ({ $type: 'color', $value })
const faultsOf = (document: unknown) =>
  readDtcgTokens(document).faults.map(({ code, pointer }) => `${code} ${pointer}`)

describe('readDtcgTokens on hostile documents', () => {
  it('leaves the prototype of objects alone', () => {
    const document = JSON.parse(
      `{"__proto__": {"$type": "color", "$value": ${JSON.stringify(BLUE)}}, "constructor": {"$type": "color", "$value": "{__proto__}"}}`,
    )
    expect(readDtcgTokens(document).tokens.map(({ name }) => name)).toEqual([
      '__proto__',
      'constructor',
    ])
    expect(faultsOf({ a: color('{toString}') })).toEqual(['alias-unresolved /a/$value'])
    expect(faultsOf({ a: { $ref: '#/constructor' } })).toEqual(['pointer-unresolved /a/$ref'])
  })

  it('answers a document 5,000 groups deep', () => {
    let deep: object = { leaf: color(BLUE) }
    for (let i = 0; i < 5000; i++) deep = { g: deep }
    const { tokens, faults } = readDtcgTokens(deep)
    expect(faults).toEqual([])
    expect(tokens[0]!.name.split('.')).toHaveLength(5001)
  })

  it('answers a group of 150,000 members without running out of stack', () => {
    const wide = Object.fromEntries(Array.from({ length: 150_000 }, (_, i) => [`m${i}`, {}]))
    expect(faultsOf(wide)).toEqual(['too-many-tokens '])
  })

  it('answers 20,000 chained aliases', () => {
    const document: Record<string, unknown> = { t0: color(BLUE) }
    for (let i = 1; i < 20_000; i++) document[`t${i}`] = { $value: `{t${i - 1}}` }
    const { tokens, faults } = readDtcgTokens(document)
    expect(faults).toEqual([])
    expect(tokens).toHaveLength(20_000)
  })

  it('refuses groups that multiply by extending each other', () => {
    const document: Record<string, unknown> = { g0: { $type: 'color', t: { $value: BLUE } } }
    for (let i = 1; i < 40; i++) {
      document[`g${i}`] = { x: { $extends: `{g${i - 1}}` }, y: { $extends: `{g${i - 1}}` } }
    }
    const [text, ...others] = faultsOf(document)
    expect(text).toMatch(/^too-many-tokens \/g\d+\/[xy]\/\$extends$/)
    expect(others).toEqual([])
  })

  it('refuses a document that doubles 25 times before the work is done', () => {
    const document: Record<string, unknown> = { g0: { $type: 'color', t: { $value: BLUE } } }
    for (let i = 1; i <= 25; i++) {
      document[`g${i}`] = { x: { $extends: `{g${i - 1}}` }, y: { $extends: `{g${i - 1}}` } }
    }
    const faults = faultsOf(document)
    expect(faults).toHaveLength(1)
    // Group n holds 2 to the n tokens, so the 10,000 are passed at the 13th: nothing beyond it is built.
    const [, group] = /^too-many-tokens \/g(\d+)\//.exec(faults[0]!) ?? []
    expect(Number(group)).toBeLessThanOrEqual(13)
  })

  it('answers 10,000 tokens that one group takes from another', () => {
    const all = Array.from({ length: 10_000 }, (_, at) => [`t${at}`, { $value: BLUE }])
    const document = {
      a: { $type: 'color', ...Object.fromEntries(all) },
      b: { $extends: '{a}' },
    }
    const { tokens, faults } = readDtcgTokens(document)
    expect(faults).toEqual([])
    expect(tokens).toHaveLength(20_000)
  })

  it('refuses groups that extend each other without end of depth', () => {
    const document: Record<string, unknown> = { g0: { $type: 'color', t: { $value: BLUE } } }
    for (let i = 1; i < 3000; i++) document[`g${i}`] = { $extends: `{g${i - 1}}` }
    const reversed = Object.fromEntries(Object.entries(document).reverse())
    for (const each of [document, reversed]) {
      expect(faultsOf(each).some((text) => text.startsWith('extends-circular'))).toBe(true)
    }
  })

  it('refuses references that would take for ever to follow', () => {
    const members: Record<string, unknown> = { o0: {} }
    for (let i = 1; i < 60; i++) {
      members[`o${i}`] = { s: { $ref: `#/t/$value/o${i - 1}/s/s/s/s` } }
    }
    const document = {
      t: { $type: 'shadow', $value: members },
      u: color({ $ref: '#/t/$value/o59/s' }),
    }
    // 5 to the 60 steps without a limit: this line would not return.
    expect(faultsOf(document)).toHaveLength(1)
  })
})

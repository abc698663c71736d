import { describe, expect, it } from 'vitest'
import type * as z from 'zod'
import { createCheck } from '#shared/contracts/checks.contract.ts'
import { mixColor, rampColor } from '#shared/contracts/colors.contract.ts'
import { createDistinctSet } from '#shared/contracts/distinct-sets.contract.ts'
import { faultsOf } from '#shared/contracts/faults.ts'
import { dtcgColorSchema, momentSchema, slugSchema } from '#shared/contracts/fields.ts'
import { createKey } from '#shared/contracts/keys.contract.ts'
import { createToken } from '#shared/contracts/tokens.contract.ts'

/** Answers each fault as `pointer detail`. */
function faultsIn(schema: z.ZodType, input: unknown): string[] {
  const { error } = schema.safeParse(input)
  if (error === undefined) throw new TypeError('Nothing is wrong with it')
  return faultsOf(error, input).map(({ pointer, detail }) => `${pointer} ${detail}`)
}

describe('a list, a text or a number out of its bounds', () => {
  it('answers what is expected, in plain words', () => {
    expect(faultsIn(dtcgColorSchema, { colorSpace: 'srgb', components: [1], alpha: 2 })).toEqual([
      '/components Expected exactly 3 items',
      '/alpha Expected at most 1',
    ])
    expect(faultsIn(createDistinctSet.body, { name: 'x'.repeat(121), tokens: ['a'] })).toEqual([
      '/name Expected at most 120 characters',
      '/tokens Expected at least 2 items',
    ])
    expect(faultsIn(createKey.body, { name: '', scopes: ['themes:read'], days: 0 })).toEqual([
      '/name Expected at least 1 character',
      '/days Expected at least 1',
    ])
  })
})

describe('a text of another form', () => {
  it('answers what the form is, not its pattern', () => {
    expect(faultsIn(slugSchema, 'Not A Slug')).toEqual([
      ' Expected lower-case letters, digits and single hyphens',
    ])
    expect(faultsIn(momentSchema, 'yesterday')).toEqual([
      ' Expected a day or an instant of RFC 3339, such as 2026-11-24',
    ])
    const token = {
      name: 'a',
      value: { derive: 'sand' },
      values: { 'A b': {} },
      deprecated: { sunset: 'soon' },
    }
    expect(faultsIn(createToken.body, token)).toEqual([
      '/value/derive Expected a token name in braces, such as {sand.1}',
      '/values/A b Expected lower-case letters, digits and single hyphens',
      '/deprecated/sunset Expected a day, such as 2026-11-24',
    ])
    expect(faultsIn(createCheck.body, { source: { pipelineUrl: 'run 7' } })).toContain(
      '/source/pipelineUrl Expected an absolute URL, such as https://ci.example/1',
    )
    const hex = { colorSpace: 'srgb', components: [0, 0, 0], hex: 'red' }
    expect(faultsIn(dtcgColorSchema, hex)).toEqual(['/hex Expected # and six hexadecimal digits'])
  })
})

describe('a value of the wrong type', () => {
  it('answers nothing but that, also within a choice', () => {
    const color = { colorSpace: 'lch', components: 'deck ' }
    expect(faultsIn(dtcgColorSchema, color)).toEqual(['/components Expected a list'])
    expect(faultsIn(mixColor.body, { first: color, second: '#fff' })).toEqual([
      '/first/components Expected a list',
    ])
    expect(faultsIn(rampColor.body, { seed: color, ground: '#fff', ratios: [3] })).toEqual([
      '/seed/components Expected a list',
    ])
  })
})

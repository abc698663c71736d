import { describe, expect, it } from 'vitest'
import { readDtcgColor } from '#shared/formats/dtcg-color.ts'
import type { DtcgFault } from '#shared/formats/dtcg-fault.ts'
import { readDtcgResolver } from '#shared/formats/dtcg-resolver.ts'
import { type DtcgDocument, readDtcgTokens } from '#shared/formats/dtcg-tokens.ts'
import { readVectors } from './read-vectors.ts'

interface Expectation {
  readonly resolved?: { readonly [name: string]: unknown }
  readonly types?: { readonly [name: string]: string }
  readonly tokenCount?: number
  readonly permutations?: number
  readonly cases?: readonly {
    readonly input: { readonly [modifier: string]: string }
    readonly resolved: { readonly [name: string]: unknown }
  }[]
}
interface Case {
  readonly file: string
  readonly about: string
  readonly source: string
  readonly document: object
}
const valid = readVectors<{ readonly cases: readonly (Case & { readonly expect: Expectation })[] }>(
  'dtcg-valid',
)
const invalid = readVectors<{
  readonly cases: readonly (Case & { readonly error: string })[]
  readonly inputs: {
    readonly cases: readonly {
      readonly doc: string
      readonly input: unknown
      readonly error?: string
    }[]
  }
}>('dtcg-invalid')

const isResolver = ({ file }: Case) => file.endsWith('.resolver.json')
const resolverOf = (document: unknown) => {
  const reading = readDtcgResolver(document)
  if (!reading.ok) throw new Error(JSON.stringify(reading.faults))
  return reading.resolver
}

/** The value of a token once every alias is followed, a colour read. */
function finalValue(document: DtcgDocument, name: string): unknown {
  const other = document.others.find((token) => token.name === name)
  if (other) return other.value
  const token = document.tokens.find((each) => each.name === name)
  if (!token) return undefined
  return token.value.kind === 'alias' ? finalValue(document, token.value.name) : token.value.color
}

function expectResolved(document: DtcgDocument, resolved: Expectation['resolved'] = {}): void {
  expect(document.faults).toEqual([])
  for (const [name, value] of Object.entries(resolved)) {
    const color = readDtcgColor(value)
    expect(finalValue(document, name)).toEqual(color.ok ? color.color : value)
  }
}

describe('a sound DTCG document', () => {
  it.each(valid.cases.filter((each) => !isResolver(each)))(
    'answers $file: $about',
    ({ document, expect: expected }) => {
      const read = readDtcgTokens(document)
      expectResolved(read, expected.resolved)
      const all = [...read.tokens, ...read.others]
      for (const [name, type] of Object.entries(expected.types ?? {})) {
        expect(all.find((token) => token.name === name)?.type).toBe(type)
      }
      if (expected.tokenCount !== undefined) expect(all).toHaveLength(expected.tokenCount)
      else expect(all.length).toBeGreaterThan(0)
    },
  )

  it.each(valid.cases.filter(isResolver))(
    'answers $file: $about',
    ({ document, expect: expected }) => {
      const resolver = resolverOf(document)
      for (const { input, resolved } of expected.cases!) {
        const reading = resolver.documentFor(input)
        if (!reading.ok) throw new Error(JSON.stringify(reading.faults))
        expectResolved(readDtcgTokens(reading.document), resolved)
      }
      expect(resolver.permutations()).toHaveLength(resolver.permutationCount)
      if (expected.permutations) expect(resolver.permutationCount).toBe(expected.permutations)
    },
  )
})

/** The collection's names for faults, and ours. */
const CODES: { readonly [error: string]: DtcgFault['code'] } = {
  ALIAS_CIRCULAR: 'alias-circular',
  ALIAS_UNRESOLVED: 'alias-unresolved',
  ALIAS_TARGET_NOT_TOKEN: 'alias-not-token',
  ALIAS_SYNTAX: 'alias-syntax',
  VALUE_AND_REF: 'value-and-ref',
  TYPE_UNKNOWN: 'type-unknown',
  NAME_INVALID: 'name-invalid',
  DESCRIPTION_TYPE: 'description-type',
  DEPRECATED_TYPE: 'deprecated-type',
  EXTENSIONS_TYPE: 'extensions-type',
  COLOR_SHAPE: 'color-shape',
  COLOR_COMPONENT_RANGE: 'color-range',
  COLOR_COMPONENT_TYPE: 'color-component',
  COLOR_HEX: 'color-hex',
  EXTENDS_CIRCULAR: 'extends-circular',
  RESOLVER_VERSION: 'resolver-version',
  RESOLVER_ORDER: 'resolver-order',
  RESOLVER_SET: 'resolver-set',
  RESOLVER_CONTEXTS: 'resolver-contexts',
  RESOLVER_DEFAULT: 'resolver-default',
  RESOLVER_POINTER: 'resolver-pointer',
  RESOLVER_CIRCULAR: 'resolver-circular',
  RESOLVER_NAME: 'resolver-name',
  RESOLVER_INLINE: 'resolver-inline',
  RESOLVER_UNRESOLVED: 'resolver-unresolved',
}

/** Where each invalid sample is at fault; cycles at every member. */
const POINTERS: { readonly [file: string]: readonly string[] } = {
  'alias-array-index.tokens.json': ['/h/$value'],
  'alias-circular.tokens.json': ['/a/$value', '/b/$value', '/c/$value'],
  'alias-group-with-root.tokens.json': ['/a/$value'],
  'alias-missing.tokens.json': ['/a/$value'],
  'color-chroma-negative.tokens.json': ['/a/$value/components/1'],
  'color-component-null.tokens.json': ['/a/$value/components/2'],
  'color-component-string.tokens.json': ['/a/$value/components/0'],
  'color-hex-3.tokens.json': ['/a/$value/hex'],
  'color-hex-8.tokens.json': ['/a/$value/hex'],
  'color-hex-string.tokens.json': ['/a/$value'],
  'color-hue-360.tokens.json': ['/a/$value/components/2'],
  'color-space-missing.tokens.json': ['/a/$value'],
  'color-srgb-255.tokens.json': [0, 1, 2].map((i) => `/a/$value/components/${i}`),
  'default-unknown.resolver.json': ['/modifiers/m/default'],
  'deprecated-number.tokens.json': ['/a/$deprecated'],
  'description-number.tokens.json': ['/a/$description'],
  'extends-circular.tokens.json': ['/a/$extends', '/b/$extends', '/c/$extends'],
  'extends-parent.tokens.json': ['/button/secondary/$extends'],
  'extensions-array.tokens.json': ['/a/$extensions'],
  'inline-duplicate-name.resolver.json': ['/resolutionOrder/1'],
  'inline-no-type.resolver.json': ['/resolutionOrder/0'],
  'missing-set.resolver.json': ['/resolutionOrder/0/$ref'],
  'modifier-one-context.resolver.json': ['/modifiers/m/contexts'],
  'modifier-refs-modifier.resolver.json': ['/modifiers/n/contexts/x/0/$ref'],
  'name-brace.tokens.json': ['/brand{1}'],
  'name-dollar.tokens.json': ['/$brand'],
  'name-period.tokens.json': ['/brand.blue'],
  'no-order.resolver.json': [''],
  'pointer-circular.tokens.json': ['/a/$ref', '/b/$ref'],
  'refs-order-item.resolver.json': ['/sets/s/sources/0/$ref'],
  'set-circular.resolver.json': ['/sets/s', '/sets/t'],
  'set-without-sources.resolver.json': ['/sets/s'],
  'type-unknown.tokens.json': ['/a/$type'],
  'value-and-ref.tokens.json': ['/b'],
  'wrong-version.resolver.json': ['/version'],
}

describe('a faulty DTCG document', () => {
  it.each(invalid.cases)('refuses $file: $about', (row) => {
    const reading = isResolver(row) ? readDtcgResolver(row.document) : readDtcgTokens(row.document)
    const faults = 'faults' in reading ? reading.faults : []
    expect(faults.map(({ pointer }) => pointer).sort()).toEqual(POINTERS[row.file])
    for (const { code, detail } of faults) {
      expect(code).toBe(CODES[row.error])
      expect(detail).toMatch(/^[^\n]{10,}\.$/)
    }
  })

  const INPUT_CODES: { readonly [error: string]: DtcgFault['code'] } = {
    INPUT_MISSING: 'input-missing',
    INPUT_CONTEXT: 'input-context',
    INPUT_UNKNOWN_MODIFIER: 'input-unknown-modifier',
    INPUT_NOT_STRING: 'input-not-string',
  }

  it.each(invalid.inputs.cases)('answers $doc for $input with $error', ({ doc, input, error }) => {
    const resolver = resolverOf(valid.cases.find(({ file }) => file === doc)!.document)
    const reading = resolver.documentFor(input)
    const codes = reading.ok ? [] : reading.faults.map(({ code }) => code)
    // The row without an error differs in case alone, which a tool should accept: ours does.
    expect(codes).toEqual(error === undefined ? [] : [INPUT_CODES[error]])
  })
})

import fc from 'fast-check'
import { expect, it } from 'vitest'
import { canonicalJson, sha256Hex } from '#api/canonical-json.ts'

/** @see https://www.rfc-editor.org/rfc/rfc8785 section 3.2.2 and 3.2.3: the document's own samples */
it('answers the samples of RFC 8785', () => {
  expect(
    canonicalJson({
      // biome-ignore lint/correctness/noPrecisionLoss: the sample's own spelling
      numbers: [333333333.33333329, 1e30, 4.5, 2e-3, 0.000000000000000000000000001],
      string: '\u20ac$\u000F\u000aA\'\u0042\u0022\u005c\\"\u002f',
      literals: [null, true, false],
    }),
  ).toBe(
    '{"literals":[null,true,false],"numbers":[333333333.3333333,1e+30,4.5,0.002,1e-27],"string":"€$\\u000f\\nA\'B\\"\\\\\\\\\\"/"}',
  )
  const sorted = canonicalJson({
    '\u20ac': 'Euro Sign',
    '\r': 'Carriage Return',
    '\ufb33': 'Hebrew Letter Dalet With Dagesh',
    '1': 'One',
    '\ud83d\ude00': 'Emoji: Grinning Face',
    '\u0080': 'Control',
    '\u00f6': 'Latin Small Letter O With Diaeresis',
  })
  expect(Object.values(JSON.parse(sorted))).toEqual([
    'One',
    'Carriage Return',
    'Control',
    'Latin Small Letter O With Diaeresis',
    'Euro Sign',
    'Emoji: Grinning Face',
    'Hebrew Letter Dalet With Dagesh',
  ])
})

it('answers one text whatever the order of the members', () => {
  fc.assert(
    fc.property(fc.dictionary(fc.string(), fc.jsonValue()), (value) => {
      const reversed = Object.fromEntries(Object.entries(value).reverse())
      expect(canonicalJson(reversed)).toBe(canonicalJson(value))
    }),
  )
})

it('refuses what JSON cannot hold', () => {
  expect(() => canonicalJson({ a: Number.NaN })).toThrow(TypeError)
  expect(() => canonicalJson([Number.POSITIVE_INFINITY])).toThrow(TypeError)
})

/** @see https://csrc.nist.gov/projects/cryptographic-standards-and-guidelines/example-values (SHA-256 of "abc") */
it('answers the published SHA-256', () => {
  expect(sha256Hex('abc')).toBe('ba7816bf8f01cfea414140de5dae2223b00361a396177a9cb410ff61f20015ad')
})

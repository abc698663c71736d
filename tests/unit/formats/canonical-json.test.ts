import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { canonicalJson } from '#shared/formats/canonical-json.ts'

describe('canonicalJson', () => {
  it('answers the published example of sorted members', () => {
    // RFC 8785, 3.2.3: sorting by UTF-16 code units.
    const value = {
      '\u20ac': 'Euro Sign',
      '\r': 'Carriage Return',
      '\ufb33': 'Hebrew Letter Dalet With Dagesh',
      1: 'One',
      '\ud83d\ude00': 'Emoji: Grinning Face',
      '\u0080': 'Control',
      '\u00f6': 'Latin Small Letter O With Diaeresis',
    }
    expect(Object.values(JSON.parse(canonicalJson(value)))).toHaveLength(7)
    expect([...canonicalJson(value).matchAll(/:"([A-Z]\w+)/g)].map(([, word]) => word)).toEqual([
      'Carriage',
      'One',
      'Control',
      'Latin',
      'Euro',
      'Emoji',
      'Hebrew',
    ])
  })

  it('answers numbers as ECMAScript prints them', () => {
    // RFC 8785, 3.2.2.3 and appendix B.
    expect(canonicalJson(JSON.parse('[333333333.33333329,1E30,4.50,2e-3,1e-27,-0]'))).toBe(
      '[333333333.3333333,1e+30,4.5,0.002,1e-27,0]',
    )
  })

  it('answers one text for one value, in any order of members, and reads back', () => {
    fc.assert(
      fc.property(fc.jsonValue(), (value) => {
        const text = canonicalJson(value)
        expect(canonicalJson(reversed(value))).toBe(text)
        expect(canonicalJson(JSON.parse(text))).toBe(text)
      }),
    )
  })

  it('answers the string sample with its escapes', () => {
    // RFC 8785, 3.2.2.
    const string = '\u20ac$\u000F\u000aA\'\u0042\u0022\u005c\\"\u002f'
    expect(canonicalJson({ string })).toBe('{"string":"€$\\u000f\\nA\'B\\"\\\\\\\\\\"/"}')
  })

  it('answers a date as its text', () => {
    expect(canonicalJson({ at: new Date(0) })).toBe('{"at":"1970-01-01T00:00:00.000Z"}')
  })

  it('leaves members out that are undefined', () => {
    expect(canonicalJson({ a: undefined, b: 1 })).toBe('{"b":1}')
  })

  it.each([[Number.NaN], [Number.POSITIVE_INFINITY], [[undefined]]])('refuses %j', (value) => {
    expect(() => canonicalJson(value)).toThrow(TypeError)
  })
})

function reversed(value: unknown): unknown {
  if (Array.isArray(value)) return value.map(reversed)
  if (typeof value !== 'object' || value === null) return value
  const members = Object.entries(value).reverse()
  return Object.fromEntries(members.map(([name, member]) => [name, reversed(member)]))
}

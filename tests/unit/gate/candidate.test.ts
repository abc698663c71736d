import { describe, expect, it } from 'vitest'
import { candidateFrom, placeOf } from '#scripts/gate/candidate.ts'

const load = (files: Record<string, string>, pairs?: string) => {
  const loaded = candidateFrom(
    { tokens: Object.keys(files).filter((path) => path !== pairs), ...(pairs ? { pairs } : {}) },
    (path) => ({ ok: true, text: files[path] ?? '' }),
  )
  if (!loaded.ok) throw new Error(loaded.faults.join())
  return loaded.candidate
}
const sea = (value: string) => ({ $value: value, $type: 'color' })

describe('token files merged in order', () => {
  it('answers the groups of all, the later token whole, and says which', () => {
    const { tokens, notes } = load({
      'core.json': JSON.stringify({
        sea: { '1': sea('#012'), '2': { ...sea('#123'), $description: 'x' } },
      }),
      'site.json': JSON.stringify({ sea: { '2': { $value: '#456' }, '3': sea('#789') } }),
    })
    expect(tokens).toEqual({ sea: { '1': sea('#012'), '2': { $value: '#456' }, '3': sea('#789') } })
    expect(notes).toEqual(['sea.2 is set in two files; site.json wins'])
  })

  it('leaves unsaid what two files set alike', () => {
    const text = JSON.stringify({ $description: 'same', a: sea('#fff') })
    expect(load({ 'a.json': text, 'b.json': text }).notes).toEqual([])
  })

  it('answers the later one where a token and a group share a name', () => {
    const { tokens, notes } = load({
      'a.json': '{"a":{"$value":"#fff"}}',
      'b.json': '{"a":{"b":{}}}',
    })
    expect(tokens).toEqual({ a: { b: {} } })
    expect(notes).toHaveLength(1)
  })

  it('leaves a member called __proto__ a member', () => {
    const { tokens } = load({
      'a.json': '{"__proto__":{"a":{}}}',
      'b.json': '{"__proto__":{"b":{}}}',
    })
    expect(JSON.stringify(tokens)).toBe('{"__proto__":{"a":{},"b":{}}}')
    expect(({} as { a?: unknown }).a).toBeUndefined()
  })

  it('answers a file that starts with a byte order mark', () => {
    expect(load({ 'a.json': '\uFEFF{"a":{}}' }).tokens).toEqual({ a: {} })
  })

  it('answers no tokens at all where no file is given', () => {
    expect(load({}).tokens).toBeUndefined()
  })
})

describe('the place of a pointer', () => {
  const candidate = load(
    {
      'core.json': '{"sea":{"1":{"$value":"#012"},"a/b":{"$value":"x"}}}',
      'site.json': '{"sea":{"2":{"$value":"y"}}}',
      'pairs.json': '[{"foreground":"x"}]',
    },
    'pairs.json',
  )
  it.each([
    ['/tokens/sea/1/$value', 'core.json#/sea/1/$value'],
    ['/tokens/sea/a~1b/$value', 'core.json#/sea/a~1b/$value'],
    ['/tokens/sea/2/$value/components', 'site.json#/sea/2/$value/components'],
    ['/tokens/sea', 'site.json#/sea'],
    ['/tokens', 'site.json'],
    ['/pairs/0/foreground', 'pairs.json#/0/foreground'],
    ['/against', '/against'],
  ])('answers the file of %s', (pointer, place) => {
    expect(placeOf(pointer, candidate)).toBe(place)
  })
})

import { describe, expect, it } from 'vitest'
import { readDtcgTokens } from '#shared/formats/dtcg-tokens.ts'

const BLUE = { colorSpace: 'oklch', components: [0.55, 0.2, 260] }
const INK = { colorSpace: 'oklch', components: [0.25, 0.02, 260] }
const blue = { kind: 'color', color: { l: 0.55, c: 0.2, h: 260, alpha: 1 }, authored: BLUE }
const color = ($value: unknown) => ({ $type: 'color', $value })

const valuesOf = (document: unknown) => {
  const { tokens, faults } = readDtcgTokens(document)
  expect(faults).toEqual([])
  return Object.fromEntries(tokens.map(({ name, value }) => [name, value]))
}
const faultsOf = (document: unknown) =>
  readDtcgTokens(document).faults.map(({ code, pointer }) => `${code} ${pointer}`)

describe('readDtcgTokens', () => {
  it('answers colours in document order with names, pointers, descriptions and deprecations', () => {
    const { tokens, others, groups, faults } = readDtcgTokens({
      $schema: 'https://www.designtokens.org/schemas/2025.10/format.json',
      $description: 'Ferry board',
      action: {
        $type: 'color',
        $description: 'What can be pressed',
        $deprecated: 'use board',
        $root: { $value: BLUE },
        'fill/a~b': { $value: '{action.$root}', $deprecated: false, $description: 'Fill' },
        gap: { $type: 'dimension', $value: { value: 4, unit: 'px' } },
        text: { $value: INK, $extensions: { 'org.example': { kept: true } }, note: 'kept too' },
      },
      first: color(INK),
    })
    expect(faults).toEqual([])
    expect(tokens.map(({ name, pointer }) => [name, pointer])).toEqual([
      ['action.$root', '/action/$root'],
      ['action.fill/a~b', '/action/fill~1a~0b'],
      ['action.text', '/action/text'],
      ['first', '/first'],
    ])
    expect(tokens[0]).toMatchObject({ value: blue, deprecated: 'use board' })
    expect(tokens[1]).toEqual({
      name: 'action.fill/a~b',
      pointer: '/action/fill~1a~0b',
      type: 'color',
      description: 'Fill',
      value: { kind: 'alias', name: 'action.$root' },
    })
    expect(tokens[2]).toMatchObject({
      extensions: { 'org.example': { kept: true } },
      unknown: { note: 'kept too' },
    })
    expect(others).toEqual([
      {
        name: 'action.gap',
        pointer: '/action/gap',
        type: 'dimension',
        deprecated: 'use board',
        authored: { value: 4, unit: 'px' },
        value: { value: 4, unit: 'px' },
      },
    ])
    expect(groups).toEqual([
      { name: 'action', description: 'What can be pressed', deprecated: 'use board' },
    ])
  })

  it('answers none as missing', () => {
    const values = valuesOf({ a: color({ ...INK, components: [0.6, 'none', 'none'], alpha: 0.4 }) })
    expect(values.a).toMatchObject({ color: { l: 0.6, c: null, h: null, alpha: 0.4 } })
  })

  it('answers $extends as a deep merge in which local tokens win', () => {
    const values = valuesOf({
      button: {
        $type: 'color',
        fill: { $value: BLUE },
        label: { $value: INK },
        on: { a: { $value: INK } },
      },
      ghost: {
        $extends: '{button}',
        fill: { $value: '{button.label}' },
        on: { b: { $value: BLUE } },
      },
      bare: { $extends: '#/ghost' },
    })
    expect(Object.keys(values)).toEqual([
      'button.fill',
      'button.label',
      'button.on.a',
      'ghost.fill',
      'ghost.label',
      'ghost.on.a',
      'ghost.on.b',
      'bare.fill',
      'bare.label',
      'bare.on.a',
      'bare.on.b',
    ])
    expect(values['ghost.fill']).toEqual({ kind: 'alias', name: 'button.label' })
    expect(values['bare.fill']).toEqual({ kind: 'alias', name: 'button.label' })
    expect(values['ghost.on.b']).toEqual(blue)
  })

  it('answers a local group in place of an inherited token, and a local token in place of a group', () => {
    const values = valuesOf({
      a: { $type: 'color', x: { $value: BLUE }, y: { deep: { $value: INK } } },
      b: { $extends: '{a}', x: { on: { $value: INK } }, y: { $value: BLUE } },
    })
    expect(Object.keys(values).filter((name) => name.startsWith('b.'))).toEqual(['b.x.on', 'b.y'])
    expect(values['b.y']).toEqual(blue)
  })

  it('answers an alias to an inherited token', () => {
    const values = valuesOf({
      a: { $type: 'color', x: { $value: BLUE } },
      b: { $extends: '{a}' },
      c: { $value: '{b.x}' },
      d: { $ref: '#/b/x' },
      e: color({ ...INK, components: [0.2, 0.1, { $ref: '#/b/x/$value/components/2' }] }),
    })
    expect(values.c).toEqual({ kind: 'alias', name: 'b.x' })
    expect(values.d).toEqual({ kind: 'alias', name: 'b.x' })
    expect(values.e).toMatchObject({ color: { h: 260 } })
  })

  it('answers a sibling that extends a sibling, which is no cycle', () => {
    const values = valuesOf({
      a: { y: { $type: 'color', t: { $value: BLUE } }, x: { $extends: '{a.y}' } },
    })
    expect(values['a.x.t']).toEqual(blue)
  })

  it('answers references into values, through references and aliases on the way', () => {
    const values = valuesOf({
      base: { ...color(BLUE), $extensions: { 'org.example': { spare: INK } } },
      link: { $ref: '#/base' },
      alias: { $value: '{link}' },
      whole: color({ $ref: '#/base/$value' }),
      parts: color({
        colorSpace: { $ref: '#/base/$value/colorSpace' },
        components: { $ref: '#/alias/$value/components' },
        alpha: { $ref: '#/half/$value' },
      }),
      half: { $type: 'number', $value: 0.5 },
      spare: color({ $ref: '#/base/$extensions/org.example/spare' }),
    })
    expect(values.whole).toEqual({ kind: 'alias', name: 'base' })
    expect(values.spare).toMatchObject({ kind: 'color', color: { l: 0.25, c: 0.02, h: 260 } })
    expect(values.parts).toMatchObject({ color: { ...blue.color, alpha: 0.5 } })
  })

  it('answers the type in its order: own, of what it refers to, of the nearest group', () => {
    const { tokens, others, faults } = readDtcgTokens({
      $type: 'number',
      one: { $value: 1 },
      tint: color(BLUE),
      group: { $type: 'dimension', alias: { $value: '{tint}' }, gap: { $value: '4px' } },
    })
    expect(faults).toEqual([])
    expect(tokens.map(({ name }) => name)).toEqual(['tint', 'group.alias'])
    expect(others.map(({ name, type }) => [name, type])).toEqual([
      ['one', 'number'],
      ['group.gap', 'dimension'],
    ])
  })

  it('refuses with every fault at once', () => {
    expect(
      faultsOf({
        $type: 'colour',
        a: { $value: BLUE, $description: 1 },
        'b.c': color(BLUE),
        '': color(BLUE),
        $d: color(BLUE),
        e: color({ ...BLUE, components: [2, -1, 360], alpha: 2, hex: '#fff', extra: 1 }),
        f: 3,
        g: { ...color(BLUE), child: color(BLUE) },
        h: { $root: { nested: color(BLUE) } },
        i: color('{e'),
        j: { $type: 'number', $value: '{e}' },
        k: { $ref: 'other.json#/x' },
        l: { $ref: '#/f' },
        m: { $extends: '{nowhere}' },
        n: { $extends: '{e}' },
        o: { $extends: 7 },
        p: { $ref: '#/nothing' },
      }).sort(),
    ).toEqual(
      [
        'alias-syntax /i/$value',
        'color-alpha /e/$value/alpha',
        'color-hex /e/$value/hex',
        'color-range /e/$value/components/0',
        'color-range /e/$value/components/1',
        'color-range /e/$value/components/2',
        'color-shape /e/$value/extra',
        'description-type /a/$description',
        'extends-syntax /o/$extends',
        'extends-unresolved /m/$extends',
        'extends-unresolved /n/$extends',
        'name-invalid /',
        'name-invalid /$d',
        'name-invalid /b.c',
        'pointer-syntax /k/$ref',
        'pointer-unresolved /p/$ref',
        'type-missing /l',
        'token-shape /f',
        'token-shape /g/child',
        'token-shape /h/$root',
        'type-mismatch /j',
        'type-missing /a',
        'type-unknown /$type',
      ].sort(),
    )
  })

  it('refuses what is no document', () => {
    for (const bad of [null, [], 'x', 1, true]) expect(faultsOf(bad)).toEqual(['document-shape '])
    expect(faultsOf({ ...color(BLUE) })).toEqual(['document-shape '])
  })

  it('refuses every member of a cycle, and no token that only leads into it', () => {
    expect(
      faultsOf({ $type: 'color', a: { $value: '{b}' }, b: { $ref: '#/a' }, c: { $value: '{a}' } }),
    ).toEqual(['alias-circular /a/$value', 'alias-circular /b/$ref'])
    expect(faultsOf({ a: color('{a}') })).toEqual(['alias-circular /a/$value'])
    const part = { $ref: '#/a/$value/components/0' }
    expect(faultsOf({ a: color({ ...BLUE, components: [part, 0, 0] }) })).toEqual([
      'alias-circular /a/$value/components/0',
    ])
  })

  it('refuses a group that comes to contain itself through what it extends', () => {
    expect(faultsOf({ a: { x: { $extends: '{b}' } }, b: { $extends: '{a}' } }).sort()).toEqual([
      'extends-circular /a/x/$extends',
      'extends-circular /b/$extends',
    ])
    expect(faultsOf({ a: { $extends: '{a}' } })).toEqual(['extends-circular /a/$extends'])
  })
})

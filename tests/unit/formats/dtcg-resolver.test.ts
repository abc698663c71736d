import { describe, expect, it } from 'vitest'
import { mergedDocument } from '#shared/formats/dtcg-merge.ts'
import { readDtcgResolver } from '#shared/formats/dtcg-resolver.ts'

const number = ($value: number) => ({ $type: 'number', $value })
const file = (rest: object) => ({ version: '2025.10', ...rest })

function documentOf(resolver: unknown, input: unknown = {}) {
  const reading = readDtcgResolver(resolver)
  if (!reading.ok) throw new Error(JSON.stringify(reading.faults))
  const document = reading.resolver.documentFor(input)
  if (!document.ok) throw new Error(JSON.stringify(document.faults))
  return document.document
}

const faultsOf = (resolver: unknown) => {
  const reading = readDtcgResolver(resolver)
  return reading.ok ? [] : reading.faults.map(({ code, pointer }) => `${code} ${pointer}`)
}

describe('readDtcgResolver', () => {
  it('answers the later source and the later modifier, groups merged', () => {
    const resolver = file({
      sets: {
        base: { sources: [{ a: { x: number(1), y: number(1) } }, { a: { x: number(2) } }] },
        all: { sources: [{ $ref: '#/sets/base' }, { b: number(1) }] },
      },
      modifiers: {
        size: { contexts: { small: [], large: [{ a: { y: number(9) } }] }, default: 'small' },
      },
      resolutionOrder: [{ $ref: '#/sets/all' }, { $ref: '#/modifiers/size' }],
    })
    expect(documentOf(resolver)).toEqual({ a: { x: number(2), y: number(1) }, b: number(1) })
    expect(documentOf(resolver, { size: 'large' })).toEqual({
      a: { x: number(2), y: number(9) },
      b: number(1),
    })
  })

  it('answers members beside $ref in place of those it refers to', () => {
    const resolver = file({
      sets: { base: { sources: [{ a: number(1) }] } },
      modifiers: { m: { contexts: { p: [{ b: number(1) }], q: [] }, default: 'p' } },
      resolutionOrder: [
        { $ref: '#/sets/base', sources: [{ a: number(2) }] },
        { $ref: '#/modifiers/m', default: 'q' },
      ],
    })
    expect(documentOf(resolver)).toEqual({ a: number(2) })
    expect(documentOf(resolver, { m: 'p' })).toEqual({ a: number(2), b: number(1) })
  })

  it('answers every choice once, in the order of the file', () => {
    const reading = readDtcgResolver(
      file({
        resolutionOrder: [
          { type: 'modifier', name: 'theme', contexts: { light: [], dark: [] } },
          { type: 'modifier', name: 'state', contexts: { rest: [], hover: [], active: [] } },
        ],
      }),
    )
    if (!reading.ok) throw new Error('refused')
    expect(reading.resolver.permutationCount).toBe(6)
    expect(reading.resolver.permutations().map(({ input }) => Object.values(input).join())).toEqual(
      ['light,rest', 'light,hover', 'light,active', 'dark,rest', 'dark,hover', 'dark,active'],
    )
    expect(reading.resolver.modifiers[0]).toEqual({ name: 'theme', contexts: ['light', 'dark'] })
  })

  it('refuses with every fault at once', () => {
    expect(
      faultsOf({
        version: 1,
        sets: {
          s: {},
          t: { sources: [1, { $ref: '#/sets/ghost' }, { $ref: '#/modifiers/m' }] },
          u: 3,
        },
        modifiers: { m: { contexts: { only: 'x' }, default: 'z' }, n: {} },
        resolutionOrder: [{ $ref: '#/sets/none' }, { $ref: '#/x/y' }, {}, 5],
      }).sort(),
    ).toEqual(
      [
        'document-shape /sets/t/sources/0',
        'document-shape /sets/u',
        'resolver-contexts /modifiers/m/contexts',
        'resolver-contexts /modifiers/m/contexts/only',
        'resolver-contexts /modifiers/n/contexts',
        'resolver-default /modifiers/m/default',
        'resolver-inline /resolutionOrder/2',
        'resolver-inline /resolutionOrder/3',
        'resolver-pointer /resolutionOrder/1/$ref',
        'resolver-pointer /sets/t/sources/2/$ref',
        'resolver-set /sets/s',
        'resolver-unresolved /resolutionOrder/0/$ref',
        'resolver-unresolved /sets/t/sources/1/$ref',
        'resolver-version /version',
      ].sort(),
    )
    expect(faultsOf([])).toEqual(['document-shape '])
  })

  it('refuses more choices than 256', () => {
    const contexts = Object.fromEntries(Array.from({ length: 17 }, (_, i) => [`c${i}`, []]))
    const items = ['a', 'b'].map((name) => ({ type: 'modifier', name, contexts }))
    expect(faultsOf(file({ resolutionOrder: items }))).toEqual(['too-many-contexts /modifiers'])
  })

  it('answers sets that name each other twice over, without multiplying them', () => {
    const sets: Record<string, unknown> = { s0: { sources: [{ a: number(1) }] } }
    for (let i = 1; i < 60; i++) {
      const inner = { $ref: `#/sets/s${i - 1}` }
      sets[`s${i}`] = { sources: [inner, { a: number(0) }, inner] }
    }
    expect(documentOf(file({ sets, resolutionOrder: [{ $ref: '#/sets/s59' }] }))).toEqual({
      a: number(1),
    })
  })
})

describe('mergedDocument', () => {
  it('answers a later token whole in place of a group or a token', () => {
    const merged = mergedDocument([
      { a: { $description: 'first', x: number(1) }, b: { ...number(1), $description: 'gone' } },
      { a: { $description: 'second', y: number(2) }, b: number(2) },
      { c: { d: number(1) } },
      { c: number(3) },
    ])
    expect(merged).toEqual({
      a: { $description: 'second', x: number(1), y: number(2) },
      b: number(2),
      c: number(3),
    })
  })

  it('answers documents 5,000 groups deep and leaves them unchanged', () => {
    const deep = (leaf: number) => {
      let document: Record<string, unknown> = { leaf: number(leaf) }
      for (let i = 0; i < 5000; i++) document = { g: document }
      return document
    }
    const first = deep(1)
    let node = mergedDocument([first, deep(2)])
    for (let i = 0; i < 5000; i++) node = node.g as typeof node
    expect(node).toEqual({ leaf: number(2) })
    let kept = first
    for (let i = 0; i < 5000; i++) kept = kept.g as typeof kept
    expect(kept).toEqual({ leaf: number(1) })
  })
})

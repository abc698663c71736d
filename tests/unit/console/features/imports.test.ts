import { describe, expect, it } from 'vitest'
import { changeCells } from '#console/features/imports/change-cells.ts'
import { chosenChanges, readChangeFilter } from '#console/features/imports/change-filter.ts'
import {
  changedMembers,
  changeInWords,
  checkInWords,
  talliesInWords,
} from '#console/features/imports/change-words.ts'
import {
  contentOf,
  mayBringThemes,
  readGivenFile,
  sizeInWords,
} from '#console/features/imports/given-file.ts'
import { queryOf, readImportOptions } from '#console/features/imports/import-options.ts'
import {
  type ImportChangeWire,
  importExample,
  importSchema,
} from '#shared/contracts/import-outcome.ts'

const example = importSchema.parse(importExample)
const given = (text: string, name?: string) => ({
  text,
  bytes: text.length,
  ...(name === undefined ? {} : { name }),
})

describe('what was given', () => {
  it('answers a document as JSON and a style sheet as its text, by name or by how it begins', () => {
    expect(contentOf(given(' {"a":1}'))).toEqual({ ok: true, content: { a: 1 } })
    expect(contentOf(given(':root{}'))).toEqual({ ok: true, content: ':root{}' })
    expect(contentOf(given('{"a":1}', 'a.css'))).toEqual({ ok: true, content: '{"a":1}' })
    expect(contentOf(given(':root{}', 'a.json'))).toMatchObject({ ok: false })
  })

  it('refuses what is no object', () => {
    for (const text of ['[]', '"a"', '{']) expect(contentOf(given(text)).ok, text).toBe(false)
  })

  it('refuses bytes that are not UTF-8 by the name of their file', async () => {
    const read = await readGivenFile(new File([new Uint8Array([0xff, 0xfe])], 'odd.json'))
    expect(read).toEqual({ ok: false, detail: 'odd.json is not text in UTF-8.' })
  })

  it('leaves no size over the limit reading as the limit', () => {
    expect(sizeInWords(8 * 2 ** 20)).toBe('8 MiB')
    expect(sizeInWords(8 * 2 ** 20 + 1)).toBe('8.1 MiB')
  })

  it('answers that themes may come without ground and ink, but not of a file of this service', () => {
    expect(mayBringThemes(':root{}')).toBe(true)
    expect(mayBringThemes({ resolutionOrder: [] })).toBe(true)
    expect(mayBringThemes({ resolutionOrder: [], $extensions: { 'dev.dyewright': {} } })).toBe(
      false,
    )
    expect(mayBringThemes({ a: {} })).toBe(false)
  })
})

describe('the address', () => {
  it('answers how a file is read, and nothing of what is so anyway', () => {
    const search = 'mode=replace&hyphensAsDots=true&ground=paper'
    expect(new URLSearchParams(queryOf(readImportOptions(new URLSearchParams(search))))).toEqual(
      new URLSearchParams(search),
    )
    expect(queryOf(readImportOptions(new URLSearchParams('mode=else&legacyHex=1')))).toEqual({})
  })
})

const change = (parts: Partial<ImportChangeWire>): ImportChangeWire => ({
  item: 'token',
  operation: 'edited',
  name: 'a',
  ...parts,
})

describe('a change', () => {
  it('answers only the parts of a member that differ, values as a person writes them', () => {
    const oklch = (l: number) => ({ colorSpace: 'oklch', components: [l, 0.1, 240], alpha: 1 })
    const before = { value: '{b}', values: { dark: { rest: oklch(0.5), hover: oklch(0.4) } } }
    const after = { value: oklch(0.6), values: { dark: { rest: oklch(0.5), hover: oklch(0.3) } } }
    expect(changedMembers(change({ before, after }))).toEqual([
      { member: 'value', before: '{b}', after: 'oklch(0.6 0.1 240)' },
      { member: 'values dark hover', before: 'oklch(0.4 0.1 240)', after: 'oklch(0.3 0.1 240)' },
    ])
  })

  it('answers what an edit takes away without an after, and an emptied list as none', () => {
    const edited = change({
      before: { description: 'x', states: ['hover'] },
      after: { states: [] },
    })
    expect(changedMembers(edited)).toEqual([
      { member: 'description', before: 'x' },
      { member: 'states', before: 'hover', after: 'none' },
    ])
  })

  it('leaves out of what is added what says nothing', () => {
    const after = { id: 'tok_1', name: 'a', value: '{b}', states: [], locked: false }
    expect(changedMembers(change({ operation: 'added', after }))).toEqual([
      { member: 'value', after: '{b}' },
    ])
  })

  it('answers its kind, but once only of what there is one of', () => {
    expect(changeInWords(change({}))).toBe('token, changed')
    expect(changeInWords(change({ item: 'rules', name: 'rules' }))).toBe('changed')
  })

  it('answers to the filter of the address', () => {
    const all = [change({}), change({ operation: 'added' }), change({ item: 'pair' })]
    const chosen = (search: string) =>
      chosenChanges(all, readChangeFilter(new URLSearchParams(search)))
    expect(chosen('')).toHaveLength(3)
    expect(chosen('show=token&did=added')).toEqual([all[1]])
    expect(chosen('show=nonsense')).toHaveLength(3)
  })
})

describe('the cells of a change', () => {
  it('answers both sides on their grounds, cut after where a breach is new', () => {
    const [first] = example.changes
    if (first === undefined) throw new TypeError('The example has a change')
    const breach = { ...example.effect.opened[0]!, foreground: first.name, theme: 'light' }
    const check = { ...example.check, findings: [breach] }
    const effect = { ...example.effect, opened: [breach], resolved: [] }
    const cells = changeCells({ ...example, check, effect }, () => 'dark')
    const [before, after] = [cells.of(first, 'before'), cells.of(first, 'after')]
    expect(before?.themes).toEqual({ light: 'light', dark: 'dark' })
    expect([before?.light.breaches, after?.light.breaches]).toEqual([false, true])
    expect([before?.light.rest, after?.light.rest]).toEqual(['#1273b1', '#2283c1'])
    expect(after?.dark.breaches).toBe(false)
    expect(after?.dark.ground).toBe('#0b1722')
  })

  it('answers no cell of what has no colour', () => {
    const cells = changeCells(example, () => 'light')
    expect(cells.of(change({ item: 'pair' }), 'after')).toBeUndefined()
  })
})

describe('an outcome', () => {
  it('answers counts and check in words', () => {
    expect(talliesInWords(example)).toEqual([
      'Tokens: 1 changed, 116 as before',
      'Pairs: 160 as before',
      'Themes: 3 as before',
    ])
    expect(checkInWords(example)).toBe(
      'one newly breaching, no newly passing, no breaches as before',
    )
  })
})

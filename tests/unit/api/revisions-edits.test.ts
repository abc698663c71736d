import { describe, expect, it } from 'vitest'
import { editsOf, type Touched } from '#api/features/revisions/revision-edits.rules.ts'

const NOTHING: Touched = {
  tokens: [],
  pairs: [],
  themes: [],
  rules: [],
  settings: [],
  others: [],
  distinctSets: [],
}
const names = {
  tokenName: (id: string) => (id === 'tok_a' ? 'ink' : id),
  themeKey: (id: string) => id,
}
const edits = (touched: Partial<Touched>) => editsOf({ ...NOTHING, ...touched }, 7, names)

describe('editsOf', () => {
  it('answers added where a version begins and none ends', () => {
    expect(edits({ tokens: [{ id: 'tok_a', name: 'ink', fromRevision: 7 }] })).toEqual([
      { item: 'token', operation: 'added', id: 'tok_a', name: 'ink' },
    ])
  })

  it('answers removed, by the last name, where a version ends and none begins', () => {
    expect(edits({ tokens: [{ id: 'tok_z', name: 'old', fromRevision: 2 }] })).toEqual([
      { item: 'token', operation: 'removed', id: 'tok_z', name: 'old' },
    ])
  })

  it('answers edited, by the new name, where one ends as another begins', () => {
    const tokens = [
      { id: 'tok_a', name: 'ink', fromRevision: 7 },
      { id: 'tok_a', name: 'black', fromRevision: 2 },
    ]
    const edited = [{ item: 'token', operation: 'edited', id: 'tok_a', name: 'ink' }]
    expect(edits({ tokens })).toEqual(edited)
    expect(edits({ tokens: tokens.toReversed() })).toEqual(edited)
  })

  it('calls a pair by its tokens, also by one that went with it', () => {
    const touched = {
      tokens: [{ id: 'tok_z', name: 'old', fromRevision: 2 }],
      pairs: [{ id: 'pair_1', foreground: 'tok_a', background: 'tok_z', fromRevision: 3 }],
    }
    expect(edits(touched)).toContainEqual({
      item: 'pair',
      operation: 'removed',
      id: 'pair_1',
      name: 'ink on old',
    })
  })

  it('tells the rules of each prefix apart', () => {
    const rules = [
      { prefix: '', fromRevision: 7 },
      { prefix: 'action', fromRevision: 7 },
      { prefix: 'action', fromRevision: 3 },
    ]
    expect(edits({ rules })).toEqual([
      { item: 'rules', operation: 'added', id: 'rules', name: 'states' },
      { item: 'rules', operation: 'edited', id: 'rules', name: 'action' },
    ])
  })

  it('answers settings and themes as items of their own', () => {
    const settings = [{ fromRevision: 7 }, { fromRevision: 0 }]
    const themes = [{ id: 'thm_1', name: 'dark', fromRevision: 7 }]
    expect(edits({ settings, themes })).toEqual([
      { item: 'theme', operation: 'added', id: 'thm_1', name: 'dark' },
      { item: 'settings', operation: 'edited', id: 'settings', name: 'settings' },
    ])
  })
})

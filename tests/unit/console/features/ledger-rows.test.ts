import { describe, expect, it } from 'vitest'
import { chosenRows, groupRows, namesNear, rowsOf } from '#console/features/tokens/ledger-rows.ts'
import {
  EVERY_TOKEN,
  readTokenFilter,
  writeTokenFilter,
} from '#console/features/tokens/token-filter.ts'
import type { LedgerTokenWire, StandingWire } from '#shared/contracts/tokens.contract.ts'

function token(name: string, mark: StandingWire['mark'], ratio?: number): LedgerTokenWire {
  const lowest =
    ratio === undefined
      ? null
      : {
          ratio,
          required: 4.5,
          theme: 'light',
          state: 'rest/rest',
          outcome: 'pass' as const,
          foreground: name,
          background: 'surface.deck',
        }
  return {
    id: `tok_${name}`,
    name,
    value: '{sand.1}',
    states: [],
    values: {},
    locked: false,
    resolved: {},
    etag: '"1"',
    standing: { pairs: 1, pairsThroughAliases: 0, breaches: 0, mark, lowest },
  }
}

const tokens = [
  token('text.primary', null, 12),
  token('surface.deck', 'breach-on-it', 4.25),
  token('text.muted', 'breach', 3.97),
  token('plain', null),
]
const chosen = (filter: Partial<typeof EVERY_TOKEN>) =>
  chosenRows(rowsOf(tokens), { ...EVERY_TOKEN, ...filter }).map((row) => row.token.name)

describe('the rows of the ledger', () => {
  it('leaves ledger order alone, and parts the name into group and rest', () => {
    expect(rowsOf(tokens).map(({ group, rest }) => [group, rest])).toEqual([
      ['text', '.primary'],
      ['surface', '.deck'],
      ['text', '.muted'],
      ['plain', 'plain'],
    ])
    expect(chosen({})).toEqual(tokens.map(({ name }) => name))
  })

  it('answers a part of a name, in any case', () => {
    expect(chosen({ named: ' MUT' })).toEqual(['text.muted'])
  })

  it('answers both kinds of breach for a breach, and what has no mark for none', () => {
    expect(chosen({ mark: 'breach' })).toEqual(['surface.deck', 'text.muted'])
    expect(chosen({ mark: 'none' })).toEqual(['text.primary', 'plain'])
  })

  it('answers furthest short first, and what nothing measures last', () => {
    expect(chosen({ order: 'short' })).toEqual([
      'text.muted',
      'surface.deck',
      'text.primary',
      'plain',
    ])
    expect(chosen({ order: 'name', group: 'text' })).toEqual(['text.muted', 'text.primary'])
  })

  it('answers rows that follow each other as one group', () => {
    expect(groupRows(rowsOf(tokens)).map(({ name, rows }) => [name, rows.length])).toEqual([
      ['text', 1],
      ['surface', 1],
      ['text', 1],
      ['plain', 1],
    ])
  })

  it('answers the names that begin as the one looked for does', () => {
    expect(namesNear(tokens, 'Text.mutter')).toEqual({ start: 'text.mut', names: ['text.muted'] })
    expect(namesNear(tokens, 'text.x').start).toBe('text.')
    expect(namesNear(tokens, 'zzz')).toEqual({ start: '', names: [] })
  })

  it('answers that a token passes by its group alone where nothing of it has a line of its own', () => {
    const byGroup = new Set(['tok_plain', 'tok_text.primary'])
    expect(rowsOf(tokens, { byGroup }).map(({ isByGroup }) => isByGroup)).toEqual([
      false,
      false,
      false,
      true,
    ])
    expect(rowsOf(tokens).some(({ isByGroup }) => isByGroup)).toBe(false)
  })

  it('answers the standings of one theme in place of those over all', () => {
    const lone = { pairs: 1, pairsThroughAliases: 0, breaches: 3, mark: 'breach', lowest: null }
    const standings = new Map([['plain', lone as StandingWire]])
    const measured = rowsOf(tokens, { standings, byGroup: new Set() })
    expect(measured.map(({ standing }) => standing.breaches)).toEqual([0, 0, 0, 3])
  })

  it('answers the filter from the address and writes only what differs', () => {
    const filter = { ...EVERY_TOKEN, named: 'board', mark: 'breach', theme: 'dark' } as const
    expect(writeTokenFilter(filter).toString()).toBe('named=board&mark=breach&theme=dark')
    expect(readTokenFilter(writeTokenFilter(filter))).toEqual(filter)
    expect(writeTokenFilter(EVERY_TOKEN).toString()).toBe('')
    expect(readTokenFilter(new URLSearchParams('mark=purple&order=up'))).toEqual(EVERY_TOKEN)
  })
})

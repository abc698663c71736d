import { expect, it } from 'vitest'
import {
  chosenPairs,
  EVERY_PAIR,
  type PairFilter,
  readPairFilter,
  writePairFilter,
} from '#console/features/pairs/pair-filter.ts'
import { findingsByPair } from '#console/features/pairs/pair-outcomes.ts'
import { checkSystem } from '#shared/checks/check-system.ts'
import type { PairWire } from '#shared/contracts/pairs.contract.ts'
import { presentPair } from '#shared/contracts/present-items.ts'
import { pair, system, token } from '#tests/unit/checks/model-builder.ts'

const model = system({
  tokens: [
    token('faint', '#bbbbbb'),
    token('dark', '#111111'),
    token('paper', '#ffffff'),
    token('cover', '#ffffff'),
  ],
  pairs: [
    pair('dark', 'paper', { id: 'p1', product: 'site', themes: ['light'] }),
    pair('faint', 'paper', { id: 'p2', product: 'kiosk', themes: ['light'] }),
    pair('faint', 'cover', { id: 'p3', use: 'non-text', themes: ['light', 'dark'] }),
    pair('dark', 'cover', { id: 'p4', exempt: { kind: 'decorative', reason: 'a wave' } }),
  ],
})
const checked = checkSystem(model)
if (!checked.ok) throw new TypeError('the model resolves')
const measured = findingsByPair(checked.evaluation)
const names = { tokenName: (id: string) => id, themeKey: (id: string) => id }
const pairs: PairWire[] = model.pairs.map((each) => ({ ...presentPair(each, names), etag: '""' }))

const chosen = (part: Partial<PairFilter>) =>
  chosenPairs(pairs, measured, {
    filter: { ...EVERY_PAIR, ...part },
    themeId: (key) => model.themes.find((theme) => theme.key === key)?.id,
  }).map((row) => row.pair.id)

it('answers every pair in the order of declaration where the sentence asks for nothing', () => {
  expect(chosen({})).toEqual(['p1', 'p2', 'p3', 'p4'])
})

it.each<[Partial<PairFilter>, string[]]>([
  [{ use: 'non-text' }, ['p3']],
  [{ product: 'kiosk' }, ['p2']],
  [{ product: 'none' }, ['p3', 'p4']],
  [{ theme: 'dark' }, ['p3', 'p4']],
  [{ token: 'cover' }, ['p3', 'p4']],
  [{ outcome: 'pass' }, ['p1']],
  [{ outcome: 'exempt' }, ['p4']],
  [{ outcome: 'breach', token: 'paper' }, ['p2']],
  [{ theme: 'nowhere' }, ['p4']],
])('answers %j with the pairs that it names', (part, ids) => {
  expect(chosen(part)).toEqual(ids)
})

it('answers the furthest short first, and last what cannot fall short', () => {
  const order = chosen({ order: 'short' })
  expect(order.slice(0, 2).sort()).toEqual(['p2', 'p3'])
  expect(order.at(-1)).toBe('p4')
})

it('leaves pairs without findings while they are being measured, but for one outcome', () => {
  const options = { filter: EVERY_PAIR, themeId: () => undefined }
  const rows = chosenPairs(pairs, undefined, options)
  expect(rows.map(({ findings }) => findings)).toEqual(Array(4).fill(undefined))
  const filter = { ...EVERY_PAIR, outcome: 'breach' } as const
  expect(chosenPairs(pairs, undefined, { ...options, filter })).toEqual([])
})

it('answers the address that a sentence was written to with the same sentence', () => {
  const filter: PairFilter = {
    use: 'text',
    product: 'a & b',
    theme: 'dark',
    outcome: 'breach',
    token: 'päper.1',
    order: 'short',
  }
  expect(readPairFilter(new URLSearchParams(String(writePairFilter(filter))))).toEqual(filter)
  expect(String(writePairFilter(EVERY_PAIR))).toBe('')
  expect(readPairFilter(new URLSearchParams('use=shouting&order=up'))).toEqual(EVERY_PAIR)
})

import { expect, it } from 'vitest'
import {
  EMPTY_PAIR,
  fieldsOf,
  leftOf,
  pairEdits,
  patchOf,
  readPair,
} from '#console/features/pairs/pair-draft.ts'
import { pairVersions } from '#console/features/pairs/pair-versions.ts'
import { type PairWire, patchPairBody } from '#shared/contracts/pairs.contract.ts'
import { presentPair } from '#shared/contracts/present-items.ts'
import { pair, system, token } from '#tests/unit/checks/model-builder.ts'

const PAIR: PairWire = {
  id: 'pair_1',
  foreground: 'text',
  background: 'fill',
  use: 'text',
  relation: 'inside',
  backdrop: ['deck'],
  states: ['rest', 'focus'],
  themes: ['light'],
  level: 'AAA',
  minimum: 8,
  anyOf: 'rings',
  product: 'kiosk',
  exempt: { kind: 'logotype', reason: 'The line of the name' },
  etag: '"1"',
}

const read = (fields: Parameters<typeof readPair>[0]) => {
  const reading = readPair(fields)
  if (!reading.ok) throw new TypeError(JSON.stringify(reading.faults))
  return reading.input
}

it('answers what the fields of a pair hold with the very pair, whatever it has', () => {
  const { id: _, etag: __, ...members } = PAIR
  expect(read(fieldsOf(PAIR))).toEqual(members)
  const plain = { ...PAIR, backdrop: undefined, states: undefined, exempt: undefined }
  const { backdrop, states, exempt, ...rest } = members
  expect([backdrop, states, exempt].includes(undefined)).toBe(false)
  expect(read(fieldsOf(plain as PairWire))).toEqual(rest)
  expect(read(fieldsOf({ ...PAIR, backdrop: 'unknown' }))).toEqual({
    ...members,
    backdrop: 'unknown',
  })
})

it('answers an edit with the edited members alone, null where one is taken away', () => {
  const standing = fieldsOf(PAIR)
  const draft = leftOf(standing, {
    use: 'large-text',
    product: 'kiosk',
    minimum: '',
    themes: undefined,
    backdrop: [],
    exempt: 'none',
    reason: '',
  })
  const body = patchOf(draft, read({ ...standing, ...draft }))
  expect(body).toEqual({
    use: 'large-text',
    minimum: null,
    themes: null,
    backdrop: null,
    exempt: null,
  })
  expect(patchPairBody.safeParse(body).success).toBe(true)
})

it('answers another reason alone with the whole exemption, as the body has it', () => {
  const standing = fieldsOf(PAIR)
  const draft = leftOf(standing, { reason: 'The mark of the line' })
  expect(patchOf(draft, read({ ...standing, ...draft }))).toEqual({
    exempt: { kind: 'logotype', reason: 'The mark of the line' },
  })
})

it('answers unfinished fields with every fault at once, by pointer', () => {
  const reading = readPair({
    ...EMPTY_PAIR,
    minimum: 'seven',
    themes: [],
    exempt: 'decorative',
    reason: ' ',
  })
  expect(reading.ok ? [] : reading.faults.map(({ pointer }) => pointer).sort()).toEqual([
    '/background',
    '/exempt/reason',
    '/foreground',
    '/minimum',
    '/themes',
  ])
})

it('answers with edits of the head, or what the pair names that is not there', () => {
  const model = system({
    tokens: [token('text', '#000000'), token('fill', '#ffffff')],
    pairs: [pair('text', 'fill', { id: 'pair_1' })],
  })
  const input = { ...EMPTY_PAIR, foreground: 'text', background: 'fill' }
  const done = pairEdits(model, 'pair_1', read({ ...input, minimum: '7' }))
  const put = done.ok ? done.edits.pairs?.put?.[0] : undefined
  const names = { tokenName: (id: string) => id, themeKey: (id: string) => id }
  expect(put && presentPair(put, names)).toEqual({
    id: 'pair_1',
    foreground: 'text',
    background: 'fill',
    use: 'text',
    relation: 'inside',
    minimum: 7,
  })
  const missing = pairEdits(
    model,
    'new',
    read({ ...input, background: 'nowhere', themes: ['dusk'] }),
  )
  expect(missing.ok ? [] : missing.faults.map(({ pointer }) => pointer)).toEqual([
    '/background',
    '/themes/0',
  ])
})

it('answers both versions of the members that were edited here, and of no others', () => {
  const now = { ...PAIR, minimum: 9, product: 'crew' }
  expect(pairVersions(now, { minimum: '10', states: undefined })).toEqual([
    { member: 'States', now: 'rest and focus', yours: 'all states' },
    { member: 'Minimum', now: '9', yours: '10' },
  ])
})

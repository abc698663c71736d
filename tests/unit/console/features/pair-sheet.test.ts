import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { sheetBands, type SheetPoint } from '#console/features/pairs/sheet-bands.ts'
import { sheetLines, type SheetRoom } from '#console/features/pairs/sheet-layout.ts'
import {
  readSheetView,
  type SheetView,
  writeSheetView,
} from '#console/features/pairs/sheet-view.ts'
import { specimenText } from '#console/features/pairs/specimen-text.ts'
import { checkSystem } from '#shared/checks/check-system.ts'
import type { SystemModel } from '#shared/checks/model.ts'
import { ratioPosition } from '#console/ui/ratio-scale.ts'
import { pair, system, token } from '#tests/unit/checks/model-builder.ts'

const VIEW: SheetView = {
  theme: 'light',
  state: 'rest',
  use: 'any',
  product: 'all',
  order: 'short',
}

function bandsOf(model: SystemModel, view: Partial<SheetView> = {}) {
  const checked = checkSystem(model)
  if (!checked.ok) throw new TypeError(JSON.stringify(checked.faults))
  return sheetBands(checked.evaluation, { ...VIEW, ...view })
}

describe('the bands of a sheet', () => {
  const model = system({
    tokens: [
      token('text', '#000000', { states: ['hover'] }),
      token('faint', '#bbbbbb'),
      token('twin', '#000000'),
      token('paper', '#ffffff'),
      token('veil', 'rgb(0 0 0 / 0.5)'),
    ],
    pairs: [
      pair('text', 'paper', { product: 'site' }),
      pair('twin', 'paper'),
      pair('faint', 'paper', { use: 'non-text' }),
      pair('paper', 'veil', { backdrop: ['paper'], use: 'large-text' }),
    ],
  })

  it('answers a band a background, the one furthest short first', () => {
    expect(bandsOf(model).map(({ background }) => background)).toEqual(['paper', 'veil'])
    expect(bandsOf(model, { order: 'ledger' }).map(({ background }) => background)).toEqual([
      'paper',
      'veil',
    ])
  })

  it('answers short words first, then by ratio, equal ratios on one point', () => {
    const [paper] = bandsOf(model)
    expect(
      paper?.points.map(({ words, isShort }) => [
        isShort,
        words.map(({ foreground }) => foreground),
      ]),
    ).toEqual([
      [true, ['faint']],
      [false, ['text', 'twin']],
    ])
    expect(paper?.breaches).toBe(1)
  })

  it('answers a translucent background as it is painted, layer on layer', () => {
    // Half of black over white, source-over on gamma-coded bytes: 255 × (1 − 128/255) = 127.
    const veil = bandsOf(model).find(({ background }) => background === 'veil')
    expect(veil).toMatchObject({ color: '#7f7f7f', note: '#000000', backdrop: ['paper'] })
  })

  it('leaves out what another state, use or product shows', () => {
    expect(bandsOf(model, { state: 'hover' }).flatMap(({ points }) => points)).toHaveLength(1)
    expect(bandsOf(model, { use: 'non-text' }).map(({ pairs }) => pairs)).toEqual([1])
    expect(bandsOf(model, { product: 'site' }).map(({ pairs }) => pairs)).toEqual([1])
    expect(bandsOf(model, { state: 'disabled' })).toEqual([])
    expect(bandsOf(model, { theme: 'nowhere' })).toEqual([])
  })
})

describe('the lines of a band', () => {
  const word = (ratio: number, at: number, name: string) =>
    ({
      pair: `p${at}`,
      foreground: name,
      text: specimenText(name),
      use: at % 3 === 0 ? 'non-text' : at % 3 === 1 ? 'text' : 'large-text',
      color: '#000000',
      finding: { identity: `${at}`, ratio },
    }) as unknown as SheetPoint['words'][number]

  const points = fc
    .array(
      fc.record({
        ratio: fc.double({ min: 1, max: 21, noNaN: true }),
        names: fc.array(fc.stringMatching(/^[a-z]{1,12}\.[a-z]{1,14}$/), {
          minLength: 1,
          maxLength: 4,
        }),
      }),
      { maxLength: 14 },
    )
    .map((drafts) =>
      drafts
        .map(({ ratio, names }, at): SheetPoint => {
          const isShort = ratio < 4.5
          return {
            key: `${at}`,
            ratio,
            required: 4.5,
            outcome: isShort ? 'breach' : 'pass',
            isShort,
            words: names.map((name, each) => word(ratio, at * 4 + each, name)),
          }
        })
        .sort((a, b) => Number(b.isShort) - Number(a.isShort) || a.ratio - b.ratio),
    )

  it('leaves every word on the sheet once, none of a line over another, at any width', () => {
    fc.assert(
      fc.property(
        points,
        fc.integer({ min: 240, max: 1400 }),
        fc.boolean(),
        (given, width, hasNames) => {
          const room: SheetRoom = {
            width,
            placeOf: (ratio) => ratioPosition(ratio, width),
            hasNames,
            isStacked: width < 720,
          }
          const lines = sheetLines(given, room)
          const placed = lines.flatMap((line) => line.points)
          const words = placed.flatMap(({ point }) =>
            point.words.map((each) => each.finding.identity),
          )
          const wanted = given.flatMap(({ words: all }) => all.map((each) => each.finding.identity))
          expect(words.sort()).toEqual(wanted.sort())
          for (const line of lines) {
            if (line.points.some(({ point }) => point.isShort)) expect(line.points).toHaveLength(1)
            const taken = line.points
              .map(({ point, side }) => {
                const x = room.placeOf(point.ratio)
                const own = point.words.reduce(
                  (sum, { text, use }) => sum + (use === 'non-text' ? 26 : text.length * 8),
                  0,
                )
                return side === 'right' ? [x, x + own] : [x - own, x]
              })
              .sort(([a = 0], [b = 0]) => a - b)
            for (const [at, [, end = 0]] of taken.entries()) {
              const next = taken[at + 1]
              if (next !== undefined) expect(next[0]).toBeGreaterThanOrEqual(end)
            }
          }
        },
      ),
      { numRuns: 200 },
    )
  })
})

it.each([
  ['action.board.text', 'Board'],
  ['status.delayed', 'Delayed'],
  ['sea.7', 'Sea 7'],
  ['ink', 'Ink'],
  ['surface.card.$root', 'Card'],
])('answers %s with the word %s', (name, text) => {
  expect(specimenText(name)).toBe(text)
})

it('answers the address of a view with the same view, and an unknown theme with the base', () => {
  const view: SheetView = {
    theme: 'dark',
    state: 'focus',
    use: 'text',
    product: 'x',
    order: 'ledger',
  }
  const themes = ['light', 'dark']
  expect(readSheetView(new URLSearchParams(writeSheetView(view, 'light')), themes)).toEqual(view)
  expect(writeSheetView(VIEW, 'light')).toBe('')
  expect(readSheetView(new URLSearchParams('theme=dusk&state=asleep'), themes)).toEqual(VIEW)
})

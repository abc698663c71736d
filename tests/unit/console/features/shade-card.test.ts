import { describe, expect, it } from 'vitest'
import {
  type CardChip,
  cutCard,
  type CutCard,
  nearestRun,
  shapeEdges,
} from '#console/features/shade-card/card-cut.ts'
import { cardGeometry, columnsFor } from '#console/features/shade-card/card-geometry.ts'
import { readTrial, shortOklch } from '#console/features/tokens/trial.ts'
import { checkSystem } from '#shared/checks/check-system.ts'
import { createColorProbe } from '#shared/checks/color-probe.ts'
import { recheck } from '#shared/checks/recheck.ts'
import { verdictOf } from '#shared/checks/verdict.ts'
import { pair, system, token } from '#tests/unit/checks/model-builder.ts'

const model = system({
  tokens: [
    token('fill', 'oklch(0.58512345678 0.1281234567 243.123456)', { states: ['focus'] }),
    token('label', '#ffffff'),
    token('night', '#10202e'),
    token('edge', '{fill}'),
  ],
  pairs: [
    pair('label', 'fill', { relation: 'together', themes: ['light'] }),
    pair('fill', 'night', { use: 'non-text', themes: ['light'] }),
    pair('edge', 'night', { use: 'non-text', themes: ['light'] }),
  ],
  settings: { p3: true },
})

function wholeCard(columns = 21): CutCard {
  const checked = checkSystem(model)
  if (!checked.ok) throw new TypeError('the model resolves')
  const probe = createColorProbe(checked.evaluation, { token: 'fill', theme: model.themes[0]!.id })
  const cut = { center: probe.present, columns, hueStepDegrees: 5 }
  return [...cutCard(probe, cut, shortOklch)].at(-1)!
}

/** What trying the chip's own text says. */
function triedBreaches({ css }: CardChip): { pair: string; ratio: number }[] {
  const checked = checkSystem(model)
  const reading = readTrial(css, () => undefined)
  if (!checked.ok || reading.kind === 'unread') throw new TypeError('it can be tried')
  const fill = model.tokens.find(({ id }) => id === 'fill')!
  const tried = recheck(checked.evaluation, {
    tokens: { put: [{ ...fill, value: reading.value }] },
  })
  if (!tried.ok) throw new TypeError('it resolves')
  return verdictOf(tried.evaluation)
    .findings.filter(({ outcome }) => outcome === 'breach')
    .map(({ identity, ratio }) => ({ pair: identity, ratio }))
    .sort((a, b) => (a.pair < b.pair ? -1 : 1))
}

describe('a shade card', () => {
  const card = wholeCard()
  const chips = [...card.rows.flat(), ...card.hues].filter((chip) => chip !== undefined)

  it('answers each chip with what trying its text says, breach by breach', () => {
    const outcomes = new Set<string>()
    for (const chip of chips) {
      const shown = chip.breaches
        .map(({ finding, ratio }) => ({ pair: finding.identity, ratio }))
        .sort((a, b) => (a.pair < b.pair ? -1 : 1))
      expect([chip.css, shown]).toEqual([chip.css, triedBreaches(chip)])
      outcomes.add(chip.outcome)
    }
    expect([...outcomes].sort()).toEqual(['breaching', 'whole'])
  })

  it('leaves out what Display P3 cannot hold', () => {
    expect(card.rows.flat().some((chip) => chip === undefined)).toBe(true)
    expect(new Set(card.rows.flat().map((chip) => chip?.gamut))).toEqual(
      new Set(['srgb', 'p3', undefined]),
    )
  })

  it('answers what ends the allowed shape with the first breach on each side', () => {
    const run = nearestRun(card.rows, card.grid.center)!
    const row = card.rows[run.row]!
    expect(row.slice(run.from, run.to + 1).every((chip) => chip?.outcome === 'whole')).toBe(true)
    expect(run.lighter?.breach).toBe(row[run.to + 1]?.breaches[0])
    expect(run.lighter?.breach.finding).toMatchObject({ foreground: 'label', background: 'fill' })
    expect(run.darker?.breach).toBe(row[run.from - 1]?.breaches[0])
  })
})

/** A card of `#` whole, `.` breaching and blank. */
function drawn(...lines: string[]): CutCard['rows'] {
  const chip = (sign: string) => {
    if (sign === ' ') return undefined
    const breaches = sign === '#' ? [] : [{ ratio: 1, finding: { identity: sign } }]
    return { outcome: sign === '#' ? 'whole' : 'breaching', breaches } as unknown as CardChip
  }
  return lines.map((line) => [...line].map(chip))
}

describe('the allowed shape', () => {
  it('answers with one line round all whole chips, holes and all', () => {
    const edges = shapeEdges(drawn('###', '#.#', '###'))
    expect(edges).toHaveLength(12 + 4)
    expect(shapeEdges(drawn('#'))).toHaveLength(4)
    expect(shapeEdges(drawn('..'))).toEqual([])
  })

  it('answers with the run nearest to the centre, in its row or the nearest that has one', () => {
    expect(nearestRun(drawn('##.##'), { row: 0, column: 2 })).toMatchObject({ from: 0, to: 1 })
    expect(nearestRun(drawn('#....', '.....', '....#'), { row: 2, column: 1 })).toMatchObject({
      row: 2,
      from: 4,
      to: 4,
    })
    expect(nearestRun(drawn('..', '#.'), { row: 0, column: 1 })).toMatchObject({ row: 1, from: 0 })
    expect(nearestRun(drawn('..'), { row: 0, column: 0 })).toBeUndefined()
  })

  it('leaves a side without a limit where the card, not a pair, ends it', () => {
    const run = nearestRun(drawn(' ##.'), { row: 0, column: 1 })
    expect(run?.darker).toBeUndefined()
    expect(run?.lighter?.column).toBe(3)
  })
})

it('leaves every chip 24 px to be hit at least, at every width of a window', () => {
  for (let window = 320; window <= 1600; window++) {
    const content = Math.min(733, window - (window <= 720 ? 58 : 160))
    const geometry = cardGeometry(content, columnsFor(window))
    expect([window, geometry.pitch >= 24]).toEqual([window, true])
    expect(geometry.labels + geometry.columns * geometry.pitch).toBeLessThanOrEqual(content)
  }
})

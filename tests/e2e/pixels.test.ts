import Color from 'colorjs.io'
import type { Browser, Page } from 'playwright-core'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { larkhaven } from '#scripts/demo/larkhaven/larkhaven.ts'
import { wholeAfter } from '#scripts/demo/larkhaven/whole-system.ts'
import { checkSystem } from '#shared/checks/check-system.ts'
import {
  type Evaluation,
  type PairMeasure,
  ROW_EXEMPT,
  ROW_UNDER_FLOOR,
} from '#shared/checks/evaluation.ts'
import { type Basis, createPixel, paintLayer } from '#shared/checks/layers.ts'
import { statesOfRow } from '#shared/checks/measured-row.ts'
import type { State, SystemModel } from '#shared/checks/model.ts'
import { colorOf, statesOf } from '#shared/checks/resolved.ts'
import type { RenderedColor } from '#shared/color/render.ts'
import { modelFromWire } from '#shared/contracts/system-model.ts'
import { customProperty, themeCss } from '#shared/formats/theme-css.ts'
import { launchBrowser, launchWideBrowser } from '#tests/support/browser.ts'
import { PAINTED_VIEWPORT, type Painted, paintStacks } from '#tests/support/painted-stacks.ts'
import { naiveRatio } from '#tests/unit/checks/naive-contrast.ts'
import { tightPairs } from '#tests/unit/checks/random-pairs.ts'
import { Dice } from '#tests/unit/checks/random-system.ts'
import { randomGoverned } from '#tests/unit/formats/random-governed.ts'

interface Layer {
  readonly property: string
  readonly rendered: RenderedColor
}
type Layers = readonly Layer[]

/** One theme of a system: its style sheet, what stands alone on its ground, and its pairs. */
interface Sheet {
  readonly css: string
  readonly swatches: readonly Layers[]
  readonly rows: readonly Row[]
}
interface Row {
  readonly measure: PairMeasure
  readonly row: number
  readonly over: Layers
  readonly under: Layers
}

function sheetOf(evaluation: Evaluation, theme: number): Sheet {
  const { resolved } = evaluation
  const { model } = resolved
  const { id, ground } = model.themes[theme]!
  const layer = (token: string, state: State): Layer => {
    const { name } = resolved.tokens.get(token)!.token
    const isRest = !statesOf(resolved, token).includes(state) || state === 'rest'
    return {
      property: customProperty(isRest ? name : `${name}.${state}`),
      rendered: colorOf(resolved, { token, theme: id, state }).rendered,
    }
  }
  const tokens = model.tokens.map((token) => ({
    name: token.name,
    states: statesOf(resolved, token.id).map((state) => ({
      state,
      rendered: layer(token.id, state).rendered,
    })),
  }))
  const written = themeCss(tokens, model.settings.p3)
  if (!written.ok) throw new Error(JSON.stringify(written.collisions))
  const swatches = model.tokens.flatMap((token) =>
    statesOf(resolved, token.id).map((state) => [layer(ground, 'rest'), layer(token.id, state)]),
  )
  const rows = evaluation.measures.flatMap((measure) => {
    const at = measure.themes.indexOf(theme)
    if (at < 0) return []
    const { pair, combinations } = measure
    // Of a backdrop that is not known, the ground is one.
    const backdrop = pair.backdrop === 'unknown' ? [] : pair.backdrop
    const below = [ground, ...backdrop].map((token) => layer(token, 'rest'))
    return combinations.map((_, place) => {
      const row = at * combinations.length + place
      const states = statesOfRow(measure, row)
      const under = [...below, layer(pair.background, states.background)]
      const isBeside = pair.use === 'link-in-text' || pair.use === 'focus-adjacent'
      const beneath = isBeside ? below : under
      return { measure, row, under, over: [...beneath, layer(pair.foreground, states.foreground)] }
    })
  })
  return { css: written.css, swatches, rows }
}

function expected(layers: Layers, basis: Basis): Painted {
  const pixel = createPixel()
  for (const { rendered } of layers) paintLayer(pixel, rendered, basis)
  return [pixel.r, pixel.g, pixel.b]
}

/** Layers that show and can be seen through. */
function translucent(layers: Layers): number {
  const from = layers.findLastIndex(({ rendered }) => rendered.a === 255)
  return layers.slice(from + 1).filter(({ rendered }) => rendered.a > 0).length
}

/**
 * Chromium converts a hex to its screen's P3 with less precision than a double has: where a channel comes to rest this
 * near to the half between two levels, it may round the other way.
 */
const NEAR_HALF = 0.03

function isNearHalf({ r, g, b, gamut }: RenderedColor): boolean {
  if (gamut !== 'srgb') return false
  const { coords } = new Color('srgb', [r / 255, g / 255, b / 255]).to('p3')
  return coords.some((channel) => Math.abs((((channel ?? 0) * 255) % 1) - 0.5) < NEAR_HALF)
}

/** Levels by which a pixel may differ: one a blended layer, and one for a hex that P3 shows from near a half. */
function slackOf(layers: Layers, basis: Basis): number {
  const opaque = layers.findLast(({ rendered }) => rendered.a === 255)
  const rounding = basis === 'p3' && opaque && isNearHalf(opaque.rendered) ? 1 : 0
  return translucent(layers) + rounding
}

const keyOf = (layers: Layers) => layers.map(({ property }) => property).join('|')

interface Tally {
  opaque: number
  blended: number
  /** Opaque ones that are not equal to the byte: a hex on a P3 screen, from near a half. */
  off: number
  /** Findings whose verdict was held against the pixels. */
  rows: number
  tight: number
}

/** Paints a theme and holds every pixel against the engine's bytes, and every verdict against the pixels. */
async function holdTheme(
  page: Page,
  evaluation: Evaluation,
  theme: number,
  { basis, tally: counts }: { readonly basis: Basis; readonly tally: Tally },
) {
  const { css, swatches, rows } = sheetOf(evaluation, theme)
  const stacks = new Map<string, Layers>()
  for (const layers of [...swatches, ...rows.flatMap(({ over, under }) => [over, under])]) {
    stacks.set(keyOf(layers), layers)
  }
  const all = [...stacks.values()]
  const pixels = await paintStacks(
    page,
    css,
    all.map((layers) => layers.map(({ property }) => property)),
  )
  const seen = new Map(all.map((layers, at) => [keyOf(layers), pixels[at]!]))
  const wrong: string[] = []
  for (const [key, pixel] of seen) {
    const layers = stacks.get(key)!
    const bytes = expected(layers, basis)
    const off = Math.max(...bytes.map((byte, at) => Math.abs(byte - pixel[at]!)))
    if (off > slackOf(layers, basis)) wrong.push(`${key}: ${bytes} painted as ${pixel}`)
    const isBlended = translucent(layers) > 0
    if (isBlended) counts.blended++
    else counts.opaque++
    if (off > 0 && !isBlended) counts.off++
  }
  expect(wrong).toEqual([])
  for (const { measure, row, over, under } of rows) {
    const shown = naiveRatio(seen.get(keyOf(over))!, seen.get(keyOf(under))!, basis)
    const verdict = shownVerdict(evaluation, measure, row, { basis, shown })
    if (verdict === undefined) continue
    counts.rows++
    counts.tight += measure.tight[row]!
    if (!verdict.flips) continue
    expect({ pair: measure.pair, row, tight: measure.tight[row] }).toEqual({
      pair: measure.pair,
      row,
      tight: 1,
    })
  }
}

/** Whether a row would be judged otherwise by the ratio that a screen shows; of some rows it cannot be said. */
function shownVerdict(
  { resolved }: Evaluation,
  measure: PairMeasure,
  row: number,
  { basis, shown }: { readonly basis: Basis; readonly shown: number },
): { readonly flips: boolean } | undefined {
  const { settings } = resolved.model
  const { pair, required, combinations, status, ratio } = measure
  // Of backdrops that are not known one is painted, the ground; an exempt row has nothing to flip.
  if (pair.backdrop === 'unknown' || status[row] === ROW_EXEMPT) return undefined
  const p3 = measure.p3[row] ?? Number.NaN
  if (basis === 'p3' && !(settings.p3Gates && p3 > 0)) return undefined
  const other = basis === 'srgb' ? p3 : measure.srgb[row]!
  const lower = settings.p3Gates && other < shown ? other : shown
  const threshold =
    status[row] === ROW_UNDER_FLOOR
      ? settings.disabledFloor!
      : required[Math.floor(row / combinations.length)]!
  return { flips: lower >= threshold !== ratio[row]! >= threshold }
}

/** Random systems under names with quotes, slashes and emoji, every fifth color translucent, many out of gamut. */
function hostileSystems(count: number): SystemModel[] {
  const found: SystemModel[] = []
  for (let seed = 1; found.length < count; seed++) {
    const model = randomGoverned(new Dice(seed), 16)
    const settings = { ...model.settings, p3: true }
    const checked = checkSystem({ ...model, settings })
    if (checked.ok) found.push({ ...model, settings })
  }
  return found
}

/** Four hundred of them, all of which a level more or less may turn over. */
function tightSystem(): SystemModel {
  const model = tightPairs(new Dice(400), 400)
  return { ...model, settings: { ...model.settings, p3: true, p3Gates: true } }
}

const SYSTEMS: readonly {
  readonly name: string
  readonly models: readonly SystemModel[]
  /** Findings, at least, that carry `tight`. */
  readonly tight: number
}[] = [
  { name: 'the demo', models: [modelFromWire(wholeAfter(larkhaven))], tight: 0 },
  { name: 'hostile systems', models: hostileSystems(4), tight: 1 },
  { name: 'pairs a hair from their threshold', models: [tightSystem()], tight: 50 },
]

describe.each([
  { basis: 'srgb', launch: launchBrowser },
  { basis: 'p3', launch: launchWideBrowser },
] as const)('what Chromium paints, $basis', ({ basis, launch }) => {
  let browser: Browser
  let page: Page
  beforeAll(async () => {
    browser = await launch()
    page = await browser.newPage({ viewport: PAINTED_VIEWPORT })
  })
  afterAll(() => browser.close())

  it('answers the color gamut that the style sheets ask for', async () => {
    const isWide = await page.evaluate(() => matchMedia('(color-gamut: p3)').matches)
    expect(isWide).toBe(basis === 'p3')
  })

  it.each(SYSTEMS)(
    "answers the engine's bytes for every token and pair of $name",
    async ({ models, tight }) => {
      const tally = { opaque: 0, blended: 0, off: 0, rows: 0, tight: 0 }
      for (const model of models) {
        const checked = checkSystem(model)
        if (!checked.ok) throw new Error(JSON.stringify(checked.faults))
        for (const theme of model.themes.keys()) {
          await holdTheme(page, checked.evaluation, theme, { basis, tally })
        }
      }
      expect(tally.opaque).toBeGreaterThan(100)
      expect(tally.blended).toBeGreaterThan(50)
      expect(tally.rows).toBeGreaterThan(50)
      expect(tally.off).toBeLessThanOrEqual(basis === 'srgb' ? 0 : tally.opaque * 0.02)
      expect(tally.tight).toBeGreaterThanOrEqual(tight)
    },
  )
})

import type { Evaluation } from '#shared/checks/evaluation.ts'
import { createPixel, paintLayer } from '#shared/checks/layers.ts'
import type { Finding, PairModel, State, Use } from '#shared/checks/model.ts'
import { colorOf } from '#shared/checks/resolved.ts'
import { verdictOf } from '#shared/checks/verdict.ts'
import { formatHex } from '#shared/color/format-color.ts'
import { contrastRatio, relativeLuminance } from '#shared/color/luminance.ts'
import { reachOf } from './pair-outcomes.ts'
import { specimenText } from './specimen-text.ts'
import type { SheetView } from './sheet-view.ts'

/** One declared foreground as it stands on a band. */
export interface SheetWord {
  /** The pair that the word leads to. */
  readonly pair: string
  readonly foreground: string
  readonly text: string
  readonly use: Use
  /** As hex, alpha and all. */
  readonly color: string
  readonly finding: Finding
}

/** Words of one ratio and one line. */
export interface SheetPoint {
  readonly key: string
  readonly ratio: number
  /** 0 where nothing is asked. */
  readonly required: number
  readonly outcome: Finding['outcome']
  readonly isShort: boolean
  readonly words: readonly SheetWord[]
}

/** A background as it is seen, and all that stands on it. */
export interface SheetBand {
  readonly key: string
  readonly background: string
  /** What lies between it and the ground, by name, bottom first; or not known. */
  readonly backdrop: readonly string[] | 'unknown'
  /** As painted, opaque hex. */
  readonly color: string
  /** Black or white, whichever is told better from it. */
  readonly note: string
  readonly pairs: number
  readonly breaches: number
  /** Short ones first, then from the lowest ratio up. */
  readonly points: readonly SheetPoint[]
}

/** The bands of a sheet: what stands on each background in one theme and state. */
export function sheetBands(evaluation: Evaluation, view: SheetView): SheetBand[] {
  const { model } = evaluation.resolved
  const theme = model.themes.find(({ key }) => key === view.theme)
  if (theme === undefined) return []
  const pairs = new Map(model.pairs.map((pair) => [pair.id, pair]))
  const gathered = new Map<string, { finding: Finding; pair: PairModel }[]>()
  for (const finding of verdictOf(evaluation).findings) {
    if (finding.theme !== theme.id || !isSeenIn(finding, view.state)) continue
    const pair = pairs.get(finding.pairs.find((id) => isChosen(pairs.get(id), view)) ?? '')
    if (pair === undefined) continue
    const backdrop = pair.backdrop === 'unknown' ? '?' : pair.backdrop.join(' ')
    const key = `${pair.background} ${finding.backgroundState} ${backdrop}`
    const band = gathered.get(key)
    if (band === undefined) gathered.set(key, [{ finding, pair }])
    else band.push({ finding, pair })
  }
  const bands = [...gathered].map(([key, on]) => bandOf(evaluation, key, on))
  const places = new Map(model.tokens.map(({ name }, place) => [name, place]))
  const place = (band: SheetBand) => places.get(band.background) ?? 0
  return bands.sort((a, b) =>
    view.order === 'ledger'
      ? place(a) - place(b)
      : shortest(a) - shortest(b) || place(a) - place(b),
  )
}

/** A state is seen where one side is in it, and the other too or, where it has or shows no more, at rest. */
function isSeenIn({ foregroundState, backgroundState }: Finding, state: State): boolean {
  const sides = [foregroundState, backgroundState]
  return sides.includes(state) && sides.every((side) => side === state || side === 'rest')
}

const TEXT_USES = new Set<Use>(['text', 'large-text', 'link-in-text'])

function isChosen(pair: PairModel | undefined, { use, product }: SheetView): boolean {
  if (pair === undefined) return false
  const kind = TEXT_USES.has(pair.use) ? 'text' : 'non-text'
  return (use === 'any' || use === kind) && (product === 'all' || pair.product === product)
}

function bandOf(
  evaluation: Evaluation,
  key: string,
  on: readonly { readonly finding: Finding; readonly pair: PairModel }[],
): SheetBand {
  const { resolved } = evaluation
  const [{ finding, pair }] = on as [(typeof on)[number]]
  const name = (id: string) => resolved.tokens.get(id)?.token.name ?? id
  const { color, note } = paintedBand(evaluation, finding, pair)
  return {
    key,
    background: name(pair.background),
    backdrop: pair.backdrop === 'unknown' ? 'unknown' : pair.backdrop.map(name),
    color,
    note,
    pairs: new Set(on.map((each) => each.pair.id)).size,
    breaches: on.filter((each) => each.finding.outcome === 'breach').length,
    points: pointsOf(on, name),
  }
}

/** The background over its backdrop over the ground, rounded layer by layer as it is measured. */
function paintedBand({ resolved }: Evaluation, finding: Finding, pair: PairModel) {
  const ground = resolved.model.themes.find(({ id }) => id === finding.theme)?.ground ?? ''
  const backdrop = pair.backdrop === 'unknown' ? [] : pair.backdrop
  const pixel = createPixel()
  const layers = [
    ...[ground, ...backdrop].map((token) => ({ token, state: 'rest' as const })),
    { token: pair.background, state: finding.backgroundState },
  ]
  for (const layer of layers) {
    const { rendered } = colorOf(resolved, { ...layer, theme: finding.theme })
    paintLayer(pixel, rendered, 'srgb')
  }
  const luminance = relativeLuminance(pixel.r, pixel.g, pixel.b)
  const isLight = contrastRatio(luminance, 0) >= contrastRatio(1, luminance)
  return {
    color: formatHex(pixel.r, pixel.g, pixel.b, 255),
    note: isLight ? '#000000' : '#ffffff',
  }
}

function pointsOf(
  on: readonly { readonly finding: Finding; readonly pair: PairModel }[],
  name: (id: string) => string,
): SheetPoint[] {
  const points = new Map<string, SheetPoint>()
  for (const { finding, pair } of on) {
    const { ratio, outcome } = finding
    const required = outcome === 'exempt' ? 0 : finding.required
    const key = `${ratio} ${required} ${outcome}`
    const foreground = name(pair.foreground)
    const word: SheetWord = {
      pair: pair.id,
      foreground,
      text: specimenText(foreground),
      use: pair.use,
      color: finding.rendered.foreground,
      finding,
    }
    const words = [...(points.get(key)?.words ?? []), word]
    const isShort = outcome !== 'pass' && ratio < required
    points.set(key, { key, ratio, required, outcome, isShort, words })
  }
  return [...points.values()].sort(
    (a, b) => Number(b.isShort) - Number(a.isShort) || a.ratio - b.ratio,
  )
}

function shortest({ points }: SheetBand): number {
  const reaches = points.flatMap(({ words }) => words.map(({ finding }) => reachOf(finding)))
  return Math.min(...reaches, Number.MAX_VALUE)
}

import type { PairModel, State, SystemModel } from '#shared/checks/model.ts'
import type { RenderedColor } from '#shared/color/render.ts'
import {
  type Basis,
  type Bytes,
  moved,
  naiveLuminance,
  naiveRatio,
  paintAll,
} from './naive-contrast.ts'
import { naiveRendering } from './naive-rendering.ts'
import { NaiveSystem } from './naive-resolution.ts'

const REQUIRED = {
  text: [4.5, 7],
  'large-text': [3, 4.5],
  'non-text': [3, 3],
  'focus-adjacent': [3, 3],
  'focus-change': [0, 3],
  'link-in-text': [3, 3],
} as const
const KIND = {
  text: 'text',
  'large-text': 'text',
  'non-text': 'non-text',
  'focus-adjacent': 'focus',
  'focus-change': 'focus',
  'link-in-text': 'link',
} as const

/** What the two implementations must agree on, entry by entry. */
export interface NaiveFinding {
  readonly identity: string
  readonly ratio: number
  readonly required: number
  readonly basis: Basis
  readonly outcome: string
  readonly reason: string | undefined
  readonly tight: boolean
  readonly use: string
}

function combinations(system: NaiveSystem, pair: PairModel): [State, State][] {
  const fg: State[] = ['rest', ...system.lists(pair.foreground)]
  const bg: State[] = ['rest', ...system.lists(pair.background)]
  const every = fg.flatMap((f) => bg.map((b): [State, State] => [f, b]))
  let occurring: [State, State][]
  if (pair.use === 'link-in-text') {
    occurring = every.filter(([f]) => f === 'rest')
  } else if (pair.relation === 'together') {
    const or = (s: State, listed: State[]): State => (listed.includes(s) ? s : 'rest')
    occurring = [...new Set([...fg, ...bg])].map((s) => [or(s, fg), or(s, bg)])
  } else {
    occurring = every.filter(([f, b]) => {
      const pointed = (s: State) => s === 'hover' || s === 'active'
      if (pointed(f) && bg.includes('hover') && !pointed(b)) return false
      return !(f !== 'disabled' && b === 'disabled' && fg.includes('disabled'))
    })
  }
  const allowed = (s: State) => s === 'rest' || !pair.states || pair.states.includes(s)
  return occurring.filter(([f, b]) => allowed(f) && allowed(b))
}

/** Layers of a side that can be seen, from the topmost opaque one up. */
function visible(layers: readonly RenderedColor[]): RenderedColor[] {
  const seen = layers.filter((layer) => layer.a > 0)
  const opaque = seen.findLastIndex((layer) => layer.a === 255)
  return seen.slice(Math.max(0, opaque))
}

interface Sides {
  readonly over: readonly RenderedColor[]
  readonly under: readonly RenderedColor[]
  readonly isUnknown: boolean
}

const GRID: Bytes[] = []
for (let r = 0; r < 256; r += 17) {
  for (let g = 0; g < 256; g += 17) for (let b = 0; b < 256; b += 17) GRID.push([r, g, b])
}

function sideRatio(sides: Sides, basis: Basis, [up, down]: readonly [number, number]): number {
  let least = 22
  const signs = new Set<number>()
  for (const start of sides.isUnknown ? GRID : [[0, 0, 0] as const]) {
    const over = moved(paintAll(sides.over, basis, start), up)
    const under = moved(paintAll(sides.under, basis, start), down)
    signs.add(Math.sign(naiveLuminance(over, basis) - naiveLuminance(under, basis)))
    least = Math.min(least, naiveRatio(over, under, basis))
  }
  return signs.has(1) && signs.has(-1) ? 1 : least
}

export function naiveFindings(model: SystemModel): NaiveFinding[] {
  const system = new NaiveSystem(model)
  const { settings } = model
  const raw = model.pairs.flatMap((pair) =>
    model.themes
      .filter(({ id }) => !pair.themes || pair.themes.includes(id))
      .flatMap((theme) =>
        combinations(system, pair).map(([fs, bs]) => {
          const at = (id: string, s: State) => naiveRendering(system.R(id, theme.id, s))
          const isUnknown = pair.backdrop === 'unknown'
          const backdrop = pair.backdrop === 'unknown' ? [] : pair.backdrop
          const below = isUnknown ? [] : [theme.ground, ...backdrop].map((id) => at(id, 'rest'))
          const fg = at(pair.foreground, fs)
          const bg = at(pair.background, bs)
          const beside = pair.use === 'link-in-text' || pair.use === 'focus-adjacent'
          const under = [...below, bg]
          const over = beside ? [...below, fg] : [...under, fg]
          const sides = { over, under, isUnknown }
          const srgb = sideRatio(sides, 'srgb', [0, 0])
          const seen = [...visible(over), ...visible(under)]
          const wide = settings.p3 && seen.some((layer) => layer.a < 255 || layer.gamut !== 'srgb')
          const p3 = wide && settings.p3Gates ? sideRatio(sides, 'p3', [0, 0]) : 22
          const ratio = Math.min(srgb, p3)
          const isAaa = [settings.level, theme.level, pair.level].includes('AAA')
          const required = Math.max(REQUIRED[pair.use][isAaa ? 1 : 0], pair.minimum ?? 0)
          const together = pair.relation === 'together' && pair.use !== 'link-in-text'
          const isDisabled = fs === 'disabled' || (together && bs === 'disabled')
          const exemption = pair.exempt?.kind ?? (isDisabled ? 'disabled' : undefined)
          const floored = exemption === 'disabled' || exemption === 'inactive'
          const threshold = exemption ? (floored ? settings.disabledFloor : undefined) : required
          const meets = threshold === undefined || ratio >= threshold
          const count = (layers: RenderedColor[]) => layers.filter((layer) => layer.a < 255).length
          const [up, down] = [count(visible(over)), count(visible(under))]
          const tight =
            threshold !== undefined &&
            up + down > 0 &&
            [-1, 1].some((x) =>
              [-1, 1].some((y) => {
                const by = [x * up, y * down] as const
                const other = wide && settings.p3Gates ? sideRatio(sides, 'p3', by) : 22
                return Math.min(sideRatio(sides, 'srgb', by), other) >= threshold !== meets
              }),
            )
          const under2 = isUnknown ? '?' : (backdrop.length ? backdrop : [theme.ground]).join('+')
          const place = `${theme.id}/${fs}/${bs}`
          const outcome = exemption ? (meets ? 'exempt' : 'breach') : meets ? 'pass' : 'breach'
          const reason =
            outcome === 'exempt'
              ? exemption
              : outcome === 'breach' && exemption
                ? 'disabled-floor'
                : isUnknown
                  ? 'backdrop-unknown'
                  : undefined
          return {
            identity: `${pair.foreground}/${pair.background}/${under2}/${KIND[pair.use]}/${place}`,
            group: pair.anyOf && `${pair.anyOf} ${place}`,
            ownMet: required > 0 && ratio >= required,
            ratio,
            required: reason === 'disabled-floor' ? settings.disabledFloor! : required,
            basis: p3 < srgb ? ('p3' as const) : ('srgb' as const),
            outcome,
            reason,
            tight,
            use: pair.use,
          }
        }),
      ),
  )
  const met = new Set(raw.filter((one) => one.ownMet).map((one) => one.group))
  const judged = raw.map(
    ({ group, ownMet: _, ...one }): NaiveFinding =>
      group && one.outcome === 'breach' && met.has(group)
        ? { ...one, outcome: 'pass', reason: 'any-of', required: one.required, tight: false }
        : one,
  )
  const strictness = ['breach', 'pass', 'exempt']
  const byIdentity = new Map<string, NaiveFinding[]>()
  for (const one of judged) {
    byIdentity.set(one.identity, [...(byIdentity.get(one.identity) ?? []), one])
  }
  return [...byIdentity.values()].map(
    (same) =>
      same.toSorted(
        (a, b) =>
          strictness.indexOf(a.outcome) - strictness.indexOf(b.outcome) ||
          (a.required === 0 ? 1e9 : a.ratio / a.required) -
            (b.required === 0 ? 1e9 : b.ratio / b.required),
      )[0]!,
  )
}

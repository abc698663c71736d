import type {
  DerivedState,
  Reference,
  SourceValue,
  State,
  StateRule,
  SystemModel,
  ThemeRule,
  TokenModel,
} from '#shared/checks/model.ts'
import type { Oklch } from '#shared/color/oklch.ts'
import { naiveRatio, paintAll } from './naive-contrast.ts'
import { naiveMappedChroma, naiveRendering } from './naive-rendering.ts'

/** Resolution written again from DEVELOPERS.md: slow, for models without faults, sharing nothing with the engine but types. */
const ORDER: readonly DerivedState[] = ['hover', 'active', 'focus', 'disabled']
const clamp = (x: number) => Math.max(0, Math.min(1, x))
const L = (color: Oklch) => color.l ?? 0
const alphaOf = (color: Oklch) => color.alpha ?? 0

export class NaiveSystem {
  readonly #seen = new Map<string, Oklch>()
  constructor(readonly model: SystemModel) {}

  token(id: string): TokenModel {
    return this.model.tokens.find((token) => token.id === id)!
  }

  theme(id: string) {
    return this.model.themes.find((one) => one.id === id)!
  }

  base(): string {
    return this.model.themes[0]!.id
  }

  parent(theme: string): string {
    return this.theme(theme).from ?? this.base()
  }

  /** From a theme to the base, both included. */
  line(theme: string): string[] {
    return theme === this.base() ? [theme] : [theme, ...this.line(this.parent(theme))]
  }

  lists(id: string): readonly DerivedState[] {
    const token = this.token(id)
    if (token.states.length > 0 || token.value.kind !== 'alias') return token.states
    return this.lists(token.value.token)
  }

  found(n: string, theme: string, s: State): { theme: string; value: SourceValue } | undefined {
    const token = this.token(n)
    for (const at of this.line(theme)) {
      const isBase = at === this.base()
      const set = token.values[at] ?? {}
      if (s === 'rest') {
        const value = isBase ? token.value : set.rest
        if (value) return { theme: at, value }
        continue
      }
      if (set[s]) return { theme: at, value: set[s] }
      if (!isBase && set.rest) return undefined
    }
    return undefined
  }

  live(n: string, from: string, to: string): boolean {
    const between = this.line(to).slice(0, this.line(to).indexOf(from))
    return between.every((theme) => {
      const rule = this.token(n).rules?.themes?.[theme]
      return rule === undefined || Object.keys(rule).length === 0
    })
  }

  covering(name: string) {
    return this.model.prefixes
      .filter(({ prefix }) => `${name}.`.startsWith(`${prefix}.`))
      .toSorted((a, b) => a.prefix.length - b.prefix.length)
  }

  stateRule(n: string, s: DerivedState): Required<StateRule> {
    const token = this.token(n)
    const own = {
      hover: { lightness: 0.05 },
      active: { lightness: 0.1 },
      focus: {},
      disabled: { chroma: 0.35, alpha: 0.45 },
    }[s]
    const away = { direction: 'away', reference: 'ground' } as const
    return Object.assign(
      { lightness: 0, chroma: 1, hue: 0, alpha: 1, towards: away },
      own,
      this.model.states[s],
      ...this.covering(token.name).map((rules) => rules.states?.[s] ?? {}),
      token.rules?.states?.[s],
    )
  }

  themeRule(n: string, theme: string): ThemeRule {
    const token = this.token(n)
    return Object.assign(
      { kind: 'keep' },
      this.theme(theme).rule,
      ...this.covering(token.name).map((rules) => rules.themes?.[theme] ?? {}),
      token.rules?.themes?.[theme],
    )
  }

  referred(reference: Reference, theme: string): string {
    return typeof reference === 'string' ? this.theme(theme)[reference] : reference.token
  }

  R(n: string, theme: string, s: State): Oklch {
    const key = `${n} ${theme} ${s}`
    const known = this.#seen.get(key)
    if (known) return known
    const color = this.#compute(n, theme, s)
    this.#seen.set(key, color)
    return color
  }

  #orRest(target: string, theme: string, s: State): Oklch {
    return this.R(target, theme, s === 'rest' || this.lists(target).includes(s) ? s : 'rest')
  }

  #value(n: string, theme: string, s: State, value: SourceValue): Oklch {
    if (value.kind === 'color') return value.color
    let state: State = s
    if (s !== 'rest') {
      const rest = this.found(n, theme, 'rest')!
      const follows =
        this.live(n, rest.theme, theme) &&
        rest.value.kind === value.kind &&
        'token' in rest.value &&
        rest.value.token === value.token
      if (!follows) state = 'rest'
    }
    const target = this.#orRest(value.token, theme, state)
    if (value.kind === 'alias') return target
    return {
      l: value.lightness ? clamp(L(target) + value.lightness) : target.l,
      c: target.c === null ? null : target.c * (value.chroma ?? 1),
      h: turn(target.h, value.hue ?? 0),
      alpha: target.alpha === null ? null : clamp(target.alpha * (value.alpha ?? 1)),
    }
  }

  #compute(n: string, theme: string, s: State): Oklch {
    const found = this.found(n, theme, s)
    if (found) {
      if (found.theme === theme) return this.#value(n, theme, s, found.value)
      if (found.value.kind !== 'color' && this.live(n, found.theme, theme)) {
        return this.#value(n, theme, s, found.value)
      }
      return this.#themed(n, theme, s)
    }
    const state = s as DerivedState
    const rest = this.found(n, theme, 'rest')!
    const ownRule = this.token(n).rules?.states?.[state]
    if (
      rest.value.kind === 'alias' &&
      this.live(n, rest.theme, theme) &&
      (ownRule === undefined || Object.keys(ownRule).length === 0) &&
      this.lists(rest.value.token).includes(state)
    ) {
      return this.R(rest.value.token, theme, s)
    }
    return this.#stated(n, theme, state)
  }

  #stated(n: string, theme: string, s: DerivedState): Oklch {
    const rest = this.R(n, theme, 'rest')
    const rule = this.stateRule(n, s)
    const c = rest.c === null ? null : rest.c * rule.chroma
    const h = turn(rest.h, rule.hue)
    const alpha = rest.alpha === null ? null : rest.alpha * rule.alpha
    if (rule.lightness === 0) return { l: rest.l, c, h, alpha }
    if (alphaOf(rest) < 1) {
      const step = s === 'hover' ? 0.05 : s === 'active' ? 0.1 : 0
      return { l: rest.l, c, h, alpha: clamp((alpha ?? 0) + step) }
    }
    return { l: clamp(L(rest) + this.#direction(n, theme, rest) * rule.lightness), c, h, alpha }
  }

  #direction(n: string, theme: string, rest: Oklch): number {
    let largest: Required<StateRule> | undefined
    for (const s of ORDER) {
      if (!this.lists(n).includes(s)) continue
      const rule = this.stateRule(n, s)
      if (!largest || rule.lightness > largest.lightness) largest = rule
    }
    const { lightness: S, towards } = largest!
    const l = L(rest)
    const ink = L(this.R(this.theme(theme).ink, theme, 'rest'))
    const ref = L(this.R(this.referred(towards!.reference, theme), theme, 'rest'))
    let preferred: number
    if (Math.abs(l - ref) < 0.02) {
      preferred = n === this.theme(theme).ink ? 1 : ink < l ? -1 : 1
    } else {
      preferred = Math.sign(l - ref) * (towards!.direction === 'away' ? 1 : -1)
    }
    const chroma = (lightness: number) => naiveMappedChroma(lightness, rest.c ?? 0, rest.h ?? 0)
    const room = (sign: number) => {
      const to = l + sign * S
      if (!(0 <= to && to <= 1)) return false
      return chroma(l) < 0.02 || chroma(to) >= chroma(l) / 2
    }
    if (room(preferred)) return preferred
    if (room(-preferred)) return -preferred
    if (1 - l === l) return preferred
    return 1 - l > l ? 1 : -1
  }

  #themed(n: string, theme: string, s: State): Oklch {
    const parent = this.parent(theme)
    const before = this.R(n, parent, s)
    const {
      kind,
      k = 1,
      chroma = 1,
      lightness = 0,
      hue = 0,
      against = 'ground',
    } = this.themeRule(n, theme)
    if (kind === 'keep') return before
    const c = before.c === null ? null : before.c * chroma
    const rest = (role: Reference, of: string) => this.R(this.referred(role, of), of, 'rest')
    const [g, i] = [L(rest('ground', parent)), L(rest('ink', parent))]
    const [g2, i2] = [L(rest('ground', theme)), L(rest('ink', theme))]
    if (kind === 'shift') {
      return {
        ...before,
        l: lightness === 0 ? before.l : clamp(L(before) + lightness),
        c,
        h: turn(before.h, hue),
      }
    }
    if (kind === 'mirror') {
      return { ...before, l: clamp(g2 + ((L(before) - g) * (i2 - g2)) / (i - g)), c }
    }
    if (kind === 'relative') return { ...before, l: clamp(g2 + k * (L(before) - g)), c }
    if (this.referred(against, theme) === n) return before
    return this.#matched({ ...before, c }, before, {
      theirs: {
        ground: rest('ground', parent),
        ink: rest('ink', parent),
        ref: rest(against, parent),
      },
      ours: { ground: rest('ground', theme), ink: rest('ink', theme), ref: rest(against, theme) },
    })
  }

  #matched(
    candidate: Oklch,
    before: Oklch,
    { theirs, ours }: Record<'theirs' | 'ours', Side>,
  ): Oklch {
    const ratio = (color: Oklch, side: Side) => {
      const under = [side.ground, side.ref].map(naiveRendering)
      return naiveRatio(
        paintAll([...under, naiveRendering(color)], 'srgb'),
        paintAll(under, 'srgb'),
        'srgb',
      )
    }
    const t = ratio(before, theirs)
    const up = (side: Side) =>
      Math.sign(L(side.ink) - L(side.ref)) || Math.sign(L(side.ink) - L(side.ground))
    const isInkSide = Math.sign(L(before) - L(theirs.ref)) !== -up(theirs)
    const first = (isInkSide ? up(ours) : -up(ours)) > 0 ? 1 : 0
    for (const extreme of [first, 1 - first]) {
      if (ratio({ ...candidate, l: extreme }, ours) < t) continue
      let [near, far] = [L(ours.ref), extreme]
      for (let n = 0; n < 14; n++) {
        const middle = (near + far) / 2
        if (ratio({ ...candidate, l: middle }, ours) >= t) far = middle
        else near = middle
      }
      return { ...candidate, l: far }
    }
    const other = { ...candidate, l: 1 - first }
    const chosen = { ...candidate, l: first }
    return ratio(other, ours) > ratio(chosen, ours) ? other : chosen
  }
}

interface Side {
  readonly ground: Oklch
  readonly ink: Oklch
  readonly ref: Oklch
}

function turn(h: number | null, by: number): number | null {
  if (h === null || by === 0) return h
  const to = (h + by) % 360
  return to < 0 ? to + 360 : to
}

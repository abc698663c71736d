import { EXEMPTIONS, type PairModel, type SystemModel, USES } from '#shared/checks/model.ts'
import type { Oklch } from '#shared/color/oklch.ts'
import { renderColor } from '#shared/color/render.ts'
import { pair, system, theme, token, value } from './model-builder.ts'
import { naiveRatio, paintAll } from './naive-contrast.ts'
import type { Dice } from './random-system.ts'

const GROUNDS = [
  ['#ffffff', '#000000'],
  ['oklch(0.97 0.01 80)', 'oklch(0.25 0.02 250)'],
  ['oklch(0.2 0.05 265)', 'oklch(0.93 0.02 90)'],
  ['#767676', '#ffffff'],
] as const
const WANTED = [3, 4.5, 7]

/** Half of them within sRGB or near it, half as far out as people write them; a third can be seen through. */
function anyColor(dice: Dice): Oklch {
  return {
    l: dice.next(),
    c: dice.chance(0.1) ? 0 : dice.next() * (dice.chance(0.5) ? 0.12 : 0.4),
    h: dice.next() * 360,
    alpha: dice.chance(0.33) ? dice.next() : 1,
  }
}

/** Moved in lightness until its ratio on an opaque colour is within a hair of a threshold, where that can be. */
function aimed(dice: Dice, under: Oklch, alpha: number, aim?: number): Oklch {
  const color = { ...anyColor(dice), alpha }
  const below = renderColor(under)
  const wanted = aim ?? dice.pick(WANTED)
  const ratio = (l: number) => {
    const over = paintAll([below, renderColor({ ...color, l })], 'srgb')
    return naiveRatio(over, [below.r, below.g, below.b], 'srgb')
  }
  let [short, far] = [under.l ?? 0, dice.chance(0.5) ? 1 : 0]
  for (let n = 0; n < 14; n++) {
    const middle = (short + far) / 2
    if (ratio(middle) >= wanted) far = middle
    else short = middle
  }
  return { ...color, l: dice.chance(0.5) ? far : short }
}

/** Translucent text on opaque grounds, a hair from 4.5: what a screen's rounding may turn over. */
export function tightPairs(dice: Dice, count: number): SystemModel {
  const model = randomPairs(dice, count)
  const backgrounds = new Map<string, Oklch>()
  const tokens = model.tokens.map((one) => {
    const at = one.id.slice(1)
    if (!/^[fb]\d+$/.test(one.id)) return one
    const under = backgrounds.get(at) ?? { ...anyColor(dice), alpha: 1 }
    backgrounds.set(at, under)
    const color = one.id.startsWith('b') ? under : aimed(dice, under, 0.3 + dice.next() * 0.6, 4.5)
    return { ...one, value: { kind: 'color', color } as const }
  })
  const pairs = model.pairs.map(({ foreground, background }) => pair(foreground, background))
  return { ...model, tokens, pairs }
}

function declaration(dice: Dice, at: number, backdrops: readonly string[]): PairModel {
  return pair(`f${at}`, `b${at}`, {
    use: dice.pick(USES),
    relation: dice.pick(['inside', 'together']),
    backdrop: dice.chance(0.001) ? 'unknown' : dice.some(backdrops, 0.15),
    ...dice.maybe(0.2, () => ({ level: 'AAA' as const })),
    ...dice.maybe(0.05, () => ({ minimum: 9.5 })),
    ...dice.maybe(0.05, () => ({ exempt: { kind: dice.pick(EXEMPTIONS), reason: 'drawn' } })),
  })
}

/** A system of one theme whose pairs each have two colours of their own, so that each makes one finding. */
export function randomPairs(dice: Dice, count: number): SystemModel {
  const [ground, ink] = dice.pick(GROUNDS)
  const colored = (id: string, color: Oklch) =>
    token(id, '#000', { value: { kind: 'color', color } })
  const backdrops = ['u0', 'u1', 'u2']
  const tokens = backdrops.map((id) => colored(id, anyColor(dice)))
  const pairs = Array.from({ length: count }, (_, at) => {
    const isAimed = dice.chance(0.4)
    const under = isAimed ? { ...anyColor(dice), alpha: 1 } : anyColor(dice)
    const over = isAimed ? aimed(dice, under, dice.chance(0.7) ? 1 : dice.next()) : anyColor(dice)
    tokens.push(colored(`f${at}`, over), colored(`b${at}`, under))
    return declaration(dice, at, backdrops)
  })
  const { tokens: roles, ...model } = system({
    themes: [theme('light')],
    settings: {
      p3: dice.chance(0.5),
      p3Gates: dice.chance(0.8),
      ...dice.maybe(0.3, () => ({ disabledFloor: 1.5 })),
    },
  })
  const [groundToken, inkToken] = roles as [(typeof roles)[0], (typeof roles)[0]]
  return {
    ...model,
    tokens: [
      { ...groundToken, value: value(ground), values: {} },
      { ...inkToken, value: value(ink), values: {} },
      ...tokens,
    ],
    pairs,
  }
}

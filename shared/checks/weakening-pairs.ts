import { isLaidOn } from './pair-requirements.ts'
import { LEVELS, type PairModel, STATES, type SystemModel, type ThemeModel } from './model.ts'
import type { ResolvedSystem } from './resolved.ts'
import { requiredRatio } from './uses.ts'
import {
  createPairTitles,
  createTokenNames,
  isLevelLowered,
  type Weakening,
  type WeakeningCode,
} from './weakening-kinds.ts'

/** Pairs that go, or are declared to ask for less. */
export function pairWeakenings(before: ResolvedSystem, after: ResolvedSystem): Weakening[] {
  if (before.model.pairs === after.model.pairs) return []
  const standing = new Map(after.model.pairs.map((pair) => [pair.id, pair]))
  const titleOf = createPairTitles(before, after)
  const nameOf = createTokenNames(after, before)
  const found = before.model.pairs.flatMap((was): Weakening[] => {
    const is = standing.get(was.id)
    standing.delete(was.id)
    if (is === was) return []
    const title = titleOf(was)
    if (is === undefined) {
      const item = { kind: 'pair', id: was.id } as const
      return [{ code: 'pair-removed', item, detail: `${title} is measured no longer` }]
    }
    const sides: Sides = { was, is, title, nameOf, model: after.model }
    return RULES.flatMap((rule) => rule(sides)).map(({ code, member, detail }) => {
      return { code, item: { kind: 'pair', id: was.id }, member, detail } as const
    })
  })
  return [...found, ...newlyExempt([...standing.values()], titleOf)]
}

/** What is left are the pairs declared by the edit. */
function newlyExempt(
  pairs: readonly PairModel[],
  titleOf: (pair: PairModel) => string,
): Weakening[] {
  return pairs.flatMap(({ exempt, ...pair }) => {
    if (exempt === undefined) return []
    const item = { kind: 'pair', id: pair.id } as const
    const detail = `${titleOf(pair)} is exempt as ${exempt.kind}`
    return [{ code: 'exempted', item, member: 'exempt', detail } as const]
  })
}

interface Sides {
  readonly was: PairModel
  readonly is: PairModel
  readonly title: string
  readonly nameOf: (id: string) => string
  /** With the edits. */
  readonly model: SystemModel
}

interface Found {
  readonly code: WeakeningCode
  readonly member: string
  readonly detail: string
}

const RULES: readonly ((sides: Sides) => Found[])[] = [
  movedTokens,
  lowerAsk,
  otherMeasure,
  lowerLevel,
  togetherNow,
  narrowerStates,
  pointerLost,
  narrowerThemes,
  exemptNow,
  floorLost,
]

function movedTokens({ was, is, title, nameOf }: Sides): Found[] {
  const layers = ({ backdrop }: PairModel) =>
    backdrop === 'unknown'
      ? 'an unknown backdrop'
      : backdrop.map((id) => nameOf(id)).join(', ') || 'the ground'
  const moved = (member: string, from: string, to: string): Found => ({
    code: 'pair-moved',
    member,
    detail: `${title} has ${member} ${to} instead of ${from}`,
  })
  const found: Found[] = []
  if (was.foreground !== is.foreground) {
    found.push(moved('foreground', nameOf(was.foreground), nameOf(is.foreground)))
  }
  if (was.background !== is.background) {
    found.push(moved('background', nameOf(was.background), nameOf(is.background)))
  }
  if (String(was.backdrop) !== String(is.backdrop)) {
    found.push(moved('backdrop', layers(was), layers(is)))
  }
  return found
}

/** Compared at every level, so that what is no less now is no less under a stricter theme either. */
function lowerAsk({ was, is, title }: Sides): Found[] {
  const isLower = LEVELS.some(
    (level) =>
      Math.max(requiredRatio(is.use, level), is.minimum ?? 0) <
      Math.max(requiredRatio(was.use, level), was.minimum ?? 0),
  )
  if (!isLower) return []
  const found: Found[] = []
  if (LEVELS.some((level) => requiredRatio(is.use, level) < requiredRatio(was.use, level))) {
    const detail = `${title} asks for less as ${is.use} than as ${was.use}`
    found.push({ code: 'use-asks-less', member: 'use', detail })
  }
  if (was.minimum !== undefined && (is.minimum ?? 0) < was.minimum) {
    const now = is.minimum === undefined ? 'no minimum' : `a minimum of ${is.minimum}`
    const detail = `${title} has ${now} instead of ${was.minimum}`
    found.push({ code: 'minimum-lowered', member: 'minimum', detail })
  }
  return found
}

/** Measured beside its background instead of on it or the other way round; a link has states of its own. */
function otherMeasure({ was, is, title }: Sides): Found[] {
  const isLink = ({ use }: PairModel) => use === 'link-in-text'
  if (isLaidOn(was.use) === isLaidOn(is.use) && isLink(was) === isLink(is)) return []
  const detail = `${title} is measured otherwise as ${is.use} than as ${was.use}`
  return [{ code: 'use-asks-less', member: 'use', detail }]
}

function lowerLevel({ was, is, title }: Sides): Found[] {
  if (!isLevelLowered(was.level, is.level)) return []
  const detail = `${title} asks for ${was.level} no longer`
  return [{ code: 'level-lowered', member: 'level', detail }]
}

function togetherNow({ was, is, title }: Sides): Found[] {
  if (was.relation === is.relation || is.relation !== 'together') return []
  const detail = `${title} is taken as one component, in one state at a time`
  return [{ code: 'taken-together', member: 'relation', detail }]
}

function narrowerStates({ was, is, title }: Sides): Found[] {
  const occurs = ({ states }: PairModel, state: (typeof STATES)[number]) =>
    state === 'rest' || (states?.includes(state) ?? true)
  const lost = STATES.filter((state) => occurs(was, state) && !occurs(is, state))
  if (lost.length === 0) return []
  const detail = `${title} is measured no longer in ${lost.join(', ')}`
  return [{ code: 'pair-narrowed', member: 'states', detail }]
}

/** A foreground under the pointer has its container under it as well: with one of the two states left out it is lost. */
function pointerLost({ was, is, title }: Sides): Found[] {
  if (was.relation === is.relation || is.relation !== 'inside') return []
  const pointed = (['hover', 'active'] as const).filter((state) => is.states?.includes(state))
  if (pointed.length !== 1) return []
  const detail = `${title} may be measured no longer in ${pointed[0]}: its states leave out the other`
  return [{ code: 'pair-narrowed', member: 'relation', detail }]
}

/** Of a theme that goes, nothing more is said. */
function narrowerThemes({ was, is, title, model }: Sides): Found[] {
  const occurs = (pair: PairModel, { id }: ThemeModel) => pair.themes?.includes(id) ?? true
  const lost = model.themes.filter((theme) => occurs(was, theme) && !occurs(is, theme))
  if (lost.length === 0) return []
  const detail = `${title} is measured no longer in ${lost.map(({ key }) => key).join(', ')}`
  return [{ code: 'pair-narrowed', member: 'themes', detail }]
}

/** Another kind counts too: one that a floor for disabled holds may become one that it does not. */
function exemptNow({ was, is, title }: Sides): Found[] {
  if (is.exempt === undefined || is.exempt.kind === was.exempt?.kind) return []
  return [{ code: 'exempted', member: 'exempt', detail: `${title} is exempt as ${is.exempt.kind}` }]
}

/** What is exempt in disabled keeps to the system's floor there; what is not, may ask for less than that. */
function floorLost({ was, is, title, model }: Sides): Found[] {
  const floor = model.settings.disabledFloor ?? 0
  if (Math.max(requiredRatio(is.use, 'AA'), is.minimum ?? 0) >= floor) return []
  const detail = `${title} keeps no longer to the floor of ${floor} for disabled`
  const found: Found[] = []
  if (was.exempt?.kind === 'inactive' && is.exempt === undefined) {
    found.push({ code: 'floor-lowered', member: 'exempt', detail })
  }
  if (was.relation === 'together' && is.relation === 'inside') {
    found.push({ code: 'floor-lowered', member: 'relation', detail })
  }
  return found
}

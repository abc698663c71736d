import type { SystemModel } from './model.ts'
import type { ResolvedSystem } from './resolved.ts'
import { isLevelLowered, type Weakening, type WeakeningCode } from './weakening-kinds.ts'
import { pairWeakenings } from './weakening-pairs.ts'
import { standInWeakenings } from './weakening-stand-ins.ts'
import { stateWeakenings } from './weakening-states.ts'

/**
 * Everything that asks for less after an edit than before it: nothing where it only moves colours or asks for
 * more. Judged from what is declared, whether or not anything breaches now.
 * @param before the system as it stands, resolved
 * @param after the same system with the edits
 * @returns in the order system, themes, pairs, tokens, groups
 */
export function weakeningsBetween(before: ResolvedSystem, after: ResolvedSystem): Weakening[] {
  if (before === after) return []
  const models = { before: before.model, after: after.model }
  return [
    ...systemWeakenings(models),
    ...themeWeakenings(models),
    ...pairWeakenings(before, after),
    ...stateWeakenings(before, after),
    ...standInWeakenings(before, after),
  ]
}

interface Models {
  readonly before: SystemModel
  readonly after: SystemModel
}

function systemWeakenings({ before, after }: Models): Weakening[] {
  const was = before.settings
  const is = after.settings
  if (was === is) return []
  const found: Weakening[] = []
  const add = (code: WeakeningCode, member: string, detail: string) =>
    found.push({ code, item: { kind: 'system' }, member, detail })
  if (isLevelLowered(was.level, is.level)) {
    add('level-lowered', 'level', `The system asks for ${is.level} instead of ${was.level}`)
  }
  if (was.p3 && !is.p3) {
    add('p3-switched-off', 'p3', 'Nothing is measured on Display P3 any more')
  } else if (was.p3 && was.p3Gates && !is.p3Gates) {
    add('p3-switched-off', 'p3Gates', 'A ratio on Display P3 fails nothing any more')
  }
  if (was.disabledFloor !== undefined && (is.disabledFloor ?? 0) < was.disabledFloor) {
    const now = is.disabledFloor === undefined ? 'nothing' : String(is.disabledFloor)
    const detail = `In disabled the system asks for ${now} instead of ${was.disabledFloor}`
    add('floor-lowered', 'disabledFloor', detail)
  }
  return found
}

/** A ground lies under every pair whose backdrop is known; with another one, other colours are measured. */
function themeWeakenings({ before, after }: Models): Weakening[] {
  if (before.themes === after.themes) return []
  const standing = new Map(after.themes.map((theme) => [theme.id, theme]))
  const nameOf = (id: string) =>
    [...after.tokens, ...before.tokens].find((token) => token.id === id)!.name
  return before.themes.flatMap((was): Weakening[] => {
    const item = { kind: 'theme', id: was.id } as const
    const is = standing.get(was.id)
    const pairs = before.pairs.filter(({ themes }) => themes?.includes(was.id) ?? true)
    if (is === undefined) {
      if (pairs.length === 0) return []
      const detail = `Theme ${was.key} goes, and with it what is measured there`
      return [{ code: 'theme-removed', item, detail }]
    }
    const found: Weakening[] = []
    if (isLevelLowered(was.level, is.level)) {
      const detail = `Theme ${is.key} asks for ${was.level} no longer`
      found.push({ code: 'level-lowered', item, member: 'level', detail })
    }
    if (was.gating && !is.gating) {
      const detail = `Theme ${is.key} only reports: its breaches fail no check`
      found.push({ code: 'gating-stopped', item, member: 'gating', detail })
    }
    if (was.ground !== is.ground && pairs.some(({ backdrop }) => backdrop !== 'unknown')) {
      const detail = `In theme ${is.key} pairs lie on ${nameOf(is.ground)} instead of ${nameOf(was.ground)}`
      found.push({ code: 'ground-moved', item, member: 'ground', detail })
    }
    return found
  })
}

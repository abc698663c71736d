import { contrastRatio, relativeLuminance } from '#shared/color/luminance.ts'
import type { RenderedColor } from '#shared/color/render.ts'
import { isRoleUnset, type ModelGraph } from './model-graph.ts'
import type { ModelFault, ThemeModel } from './model.ts'

/** What a theme's ink must have to its ground. */
export const SPAN_RATIO = 4.5

/** Parents that are missing or lead back to themselves, and a base that has one. */
function parentFaults(graph: ModelGraph): ModelFault[] {
  const { themes } = graph.model
  const faults: ModelFault[] = []
  const [base] = themes
  if (base?.from !== undefined) {
    const detail = `The base ${base.key} has no parent`
    faults.push({ code: 'theme-cycle', detail, theme: base.id })
  }
  for (const [start, theme] of themes.entries()) {
    if (theme.from !== undefined && !graph.themeAt.has(theme.from)) {
      const detail = `Theme ${theme.key} derives from ${theme.from}, which is missing`
      faults.push({ code: 'reference-missing', detail, theme: theme.id })
    }
    const path = [start]
    let at = graph.parents[start]!
    while (at > 0 && !path.includes(at)) {
      path.push(at)
      at = graph.parents[at]!
    }
    if (at === start && start > 0 && start === Math.min(...path)) {
      const keys = [...path, start].map((position) => themes[position]!.key)
      const detail = `Themes derive from each other: ${keys.join(' → ')}`
      faults.push({ code: 'theme-cycle', detail, theme: theme.id })
    }
  }
  return faults
}

function roleFaults(graph: ModelGraph, theme: ThemeModel, at: number): ModelFault[] {
  const faults: ModelFault[] = []
  for (const role of ['ground', 'ink'] as const) {
    const id = theme[role]
    const position = graph.tokenAt.get(id)
    const about = { theme: theme.id, token: id }
    if (position === undefined) {
      const detail = `The ${role} of theme ${theme.key} refers to ${id}, which is missing`
      faults.push({ code: 'reference-missing', detail, ...about })
      continue
    }
    if (isRoleUnset(graph, { token: position, theme: at })) {
      const { name } = graph.model.tokens[position]!
      const detail = `Theme ${theme.key} sets no value for its ${role} ${name}`
      faults.push({ code: 'theme-unset', detail, ...about })
    }
  }
  return faults
}

/** Everything wrong with the themes that can be seen before a colour is computed. */
export function themeFaults(graph: ModelGraph): ModelFault[] {
  const { themes, settings } = graph.model
  const lower = themes
    .filter((theme) => settings.level === 'AAA' && theme.level === 'AA')
    .map((theme): ModelFault => {
      const detail = `Theme ${theme.key} asks for AA where the system holds AAA`
      return { code: 'level-lower', detail, theme: theme.id }
    })
  const roles = themes.flatMap((theme, position) => roleFaults(graph, theme, position))
  return [...parentFaults(graph), ...roles, ...lower]
}

/** The ratio of ink on ground as they render. */
export function spanRatio(ground: RenderedColor, ink: RenderedColor): number {
  return contrastRatio(
    relativeLuminance(ground.r, ground.g, ground.b),
    relativeLuminance(ink.r, ink.g, ink.b),
  )
}

/** What is wrong with a theme's ground and ink as they render: both opaque, and 4.5:1 apart. */
export function spanFaults(
  theme: ThemeModel,
  ground: RenderedColor,
  ink: RenderedColor,
): ModelFault[] {
  const faults: ModelFault[] = []
  for (const [role, color] of [['ground', ground] as const, ['ink', ink] as const]) {
    if (color.a === 255) continue
    const detail = `The ${role} of theme ${theme.key} is translucent`
    faults.push({ code: 'theme-span', detail, theme: theme.id, token: theme[role] })
  }
  const ratio = spanRatio(ground, ink)
  if (ratio < SPAN_RATIO) {
    const shown = (Math.floor(ratio * 100) / 100).toFixed(2)
    const detail = `Ink on the ground of theme ${theme.key} is ${shown}:1, less than ${SPAN_RATIO}:1`
    faults.push({ code: 'theme-span', detail, theme: theme.id })
  }
  return faults
}

import type { ModelGraph } from './model-graph.ts'
import type { ModelFault, PairModel, SourceValue, TokenModel } from './model.ts'
import { ruleReferences } from './rule-scopes.ts'
import { themeFaults } from './theme-faults.ts'
import { effectiveLevel, requiredRatio } from './uses.ts'

type Fault = Omit<ModelFault, 'code' | 'detail'>

function missing(id: string, what: string, about: Fault): ModelFault {
  return {
    code: 'reference-missing',
    detail: `${what} refers to ${id}, which is missing`,
    ...about,
  }
}

function valueFaults(
  graph: ModelGraph,
  value: SourceValue,
  about: Fault & { name: string },
): ModelFault[] {
  const { name, ...where } = about
  if (value.kind !== 'color') {
    return graph.tokenAt.has(value.token) ? [] : [missing(value.token, name, where)]
  }
  const l = value.color.l ?? 0
  if (l >= 0 && l <= 1) return []
  return [{ code: 'lightness-range', detail: `Lightness of ${name} lies outside 0 to 1`, ...where }]
}

function tokenFaults(graph: ModelGraph, token: TokenModel): ModelFault[] {
  const about = { token: token.id, name: token.name }
  const faults = valueFaults(graph, token.value, about)
  for (const theme of graph.model.themes) {
    for (const [state, value] of Object.entries(token.values[theme.id] ?? {})) {
      if (value === undefined) continue
      const where = {
        ...about,
        theme: theme.id,
        state: state as keyof TokenModel['values'][string],
      }
      faults.push(...valueFaults(graph, value, where))
    }
  }
  for (const id of ruleReferences(token.rules)) {
    if (!graph.tokenAt.has(id))
      faults.push(missing(id, `A rule of ${token.name}`, { token: token.id }))
  }
  return faults
}

/** Rules of the system, its themes and prefixes; they belong to no token. */
function scopeFaults(graph: ModelGraph): ModelFault[] {
  const { model } = graph
  const scopes = [
    { name: 'A state rule of the system', scope: { states: model.states }, about: {} },
    ...model.themes.map((theme) => ({
      name: `The rule of theme ${theme.key}`,
      scope: { themes: theme.rule ? { [theme.id]: theme.rule } : {} },
      about: { theme: theme.id },
    })),
    ...model.prefixes.map((rules) => ({
      name: `A rule of prefix ${rules.prefix}`,
      scope: rules,
      about: {},
    })),
  ]
  return scopes.flatMap(({ name, scope, about }) =>
    ruleReferences(scope)
      .filter((id) => !graph.tokenAt.has(id))
      .map((id) => missing(id, name, about)),
  )
}

function pairFaults(graph: ModelGraph, pair: PairModel): ModelFault[] {
  const about = { pair: pair.id }
  const { settings } = graph.model
  const backdrop = pair.backdrop === 'unknown' ? [] : pair.backdrop
  const faults = [pair.foreground, pair.background, ...backdrop]
    .filter((id) => !graph.tokenAt.has(id))
    .map((id) => missing(id, 'The pair', about))
  for (const id of pair.themes ?? []) {
    if (!graph.themeAt.has(id)) faults.push(missing(id, 'The pair', { ...about, theme: id }))
  }
  if (settings.level === 'AAA' && pair.level === 'AA') {
    faults.push({
      code: 'level-lower',
      detail: 'The pair asks for AA where the system holds AAA',
      ...about,
    })
  }
  const required = requiredRatio(pair.use, effectiveLevel(settings.level, pair.level))
  if (pair.minimum !== undefined && !(pair.minimum >= required)) {
    faults.push({
      code: 'minimum-lower',
      detail: `The pair asks for ${pair.minimum} where ${required} is required`,
      ...about,
    })
  }
  return faults
}

function setFaults({ model, tokenAt }: ModelGraph): ModelFault[] {
  return (model.distinctSets ?? []).flatMap(({ id, name, tokens }) =>
    tokens
      .filter((token) => !tokenAt.has(token))
      .map((token) => missing(token, `The distinct set ${name}`, { distinctSet: id })),
  )
}

/** Everything wrong with a model that can be seen before a colour is computed, in the model's order. */
export function modelFaults(graph: ModelGraph): ModelFault[] {
  return [
    ...themeFaults(graph),
    ...scopeFaults(graph),
    ...graph.model.tokens.flatMap((token) => tokenFaults(graph, token)),
    ...graph.model.pairs.flatMap((pair) => pairFaults(graph, pair)),
    ...setFaults(graph),
  ]
}

/** Faults that an edit can bring: of rules and sets that name tokens, and of some tokens and pairs. */
export function editFaults(
  graph: ModelGraph,
  edited: { readonly tokens: readonly TokenModel[]; readonly pairs: readonly PairModel[] },
): ModelFault[] {
  return [
    ...scopeFaults(graph),
    ...edited.tokens.flatMap((token) => tokenFaults(graph, token)),
    ...edited.pairs.flatMap((pair) => pairFaults(graph, pair)),
    ...setFaults(graph),
  ]
}

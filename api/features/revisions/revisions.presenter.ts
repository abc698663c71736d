import type * as z from 'zod'
import type { SystemIndex } from '#shared/contracts/governed-system.ts'
import {
  presentDistinctSet,
  presentPair,
  presentSettings,
  presentTheme,
  presentToken,
} from '#shared/contracts/present-items.ts'
import type { revisionSchema, revisionSummarySchema } from '#shared/contracts/revisions.contract.ts'
import { writeRuleScope, writeStateRules } from '#shared/contracts/wire-values.ts'
import type { RevisionEdit } from './revision-edits.rules.ts'
import type { ListedRevision } from './revisions.reads.ts'

type RevisionSummary = z.infer<typeof revisionSummarySchema>

/** A revision without its state. */
export function presentRevisionSummary({ revision, author }: ListedRevision): RevisionSummary {
  const { number, at, message, origin, verdict, counts, digest } = revision
  const { engineVersion: version, gamutMap, ruleSet } = revision
  return {
    number,
    at: at.toISOString(),
    author,
    ...(message === null ? {} : { message }),
    origin,
    verdict,
    counts,
    engine: { version, gamutMap, ruleSet },
    digest,
  }
}

/** A revision with what it did and the system as it left it. */
export function presentRevision(
  row: ListedRevision,
  { model, names }: SystemIndex,
  edits: RevisionEdit[],
): z.infer<typeof revisionSchema> {
  return {
    ...presentRevisionSummary(row),
    edits,
    settings: presentSettings(model.settings),
    states: writeStateRules(model.states, names),
    prefixes: model.prefixes.map(({ prefix, ...scope }) => ({
      prefix,
      ...writeRuleScope(scope, names),
    })),
    themes: model.themes.map((theme) => presentTheme(theme, { model, names })),
    tokens: model.tokens.map((token) => presentToken(token, names)),
    pairs: model.pairs.map((pair) => presentPair(pair, names)),
    distinctSets: (model.distinctSets ?? []).map((set) => presentDistinctSet(set, names)),
    ...(model.remainder === undefined ? {} : { other: JSON.parse(model.remainder) }),
  }
}

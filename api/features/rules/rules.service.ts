import type { SystemAccess } from '#api/caller.ts'
import type { HeadWriteService } from '#api/features/revisions/head-write.service.ts'
import type { Head, HeadsService } from '#api/features/revisions/heads.service.ts'
import { etagOf, type IfMatch } from '#api/precondition.ts'
import type { RulesWire } from '#shared/contracts/rules.contract.ts'
import { writeRuleScope, writeStateRules } from '#shared/contracts/wire-values.ts'
import { decideReplace, type PutRulesBody } from './rules.rules.ts'

export interface RulesDeps {
  readonly heads: HeadsService
  readonly writes: HeadWriteService
}

/** Reads the rules of a system off the head and replaces them. */
export function createRulesService({ heads, writes }: RulesDeps) {
  return {
    async get(system: SystemAccess): Promise<RulesWire> {
      return taggedRules(await heads.current(system.id))
    },

    async replace(system: SystemAccess, ifMatch: IfMatch, body: PutRulesBody) {
      const { head, effect } = await writes.write({
        system,
        message: body.message,
        expected: { ifMatch, current: taggedRules },
        decide: ({ index }) => decideReplace(index, body),
        audit: { action: 'rules.edited', subject: system.id },
      })
      return { ...taggedRules(head), effect }
    },
  }
}
export type RulesService = ReturnType<typeof createRulesService>

function taggedRules({ model, index: { names } }: Head): RulesWire {
  const wire = {
    states: writeStateRules(model.states, names),
    prefixes: model.prefixes.map(({ prefix, ...scope }) => ({
      prefix,
      ...writeRuleScope(scope, names),
    })),
  }
  return { ...wire, etag: etagOf(wire) }
}
